'use client';

import { useRef, useState, type ReactNode } from 'react';
import { useRouter } from 'next/navigation';
import { LeaveGuard } from '@/components/forms/LeaveGuard';
import { ProblemMessage } from '@/components/forms/ProblemMessage';
import { Sheet } from '@/components/shell/Sheet';
import { useKey } from '@/components/shell/keys';
import { Button } from '@/components/ui/Button';
import { EmptyLine } from '@/components/ui/EmptyLine';
import { Message } from '@/components/ui/Message';
import { unitLabel } from '@/format/quantities';
import type { FinalsKept as Kept, FinalsSheetView } from '@/schemas/finals';
import { moveBetweenCells, startTyping } from './cellKeys';
import { FinalsCaution } from './FinalsCaution';
import { FinalsKept } from './FinalsKept';
import { FinalsOfPosition } from './FinalsOfPosition';
import { FinalsSetting } from './FinalsSetting';
import { finalsCount, issuesOfRows, issuesOfSheet } from './finalsWords';
import { bodyOf, fieldUnit, isRead, isTouched, wrongIn, type Setting, type Typed, type TypedRow } from './typedFinals';
import { useKeepFinals, type PositionToKeep } from './useKeepFinals';
import './finals.css';

/** What waits for a final, typed in at the bench emission by emission and kept as runs. */
export function FinalsSheet({ sheet, header }: { sheet: FinalsSheetView; header: ReactNode }) {
  const router = useRouter();
  const rows = useRef<HTMLDivElement>(null);
  const [typed, setTyped] = useState<Typed>({});
  const [setting, setSetting] = useState<Setting>(() => settingOf(sheet));
  const [kept, setKept] = useState<Kept[]>([]);
  // What was kept is gone at once; the next answer of the server says whether it still waits.
  const [gone, setGone] = useState<{ from: FinalsSheetView; keys: string[] }[]>([]);
  const { keep, busy, refused } = useKeepFinals((reply, keys) => {
    setKept((before) => [...before, reply]);
    setGone((before) => [...before, { from: sheet, keys }]);
    setTyped((before) => Object.fromEntries(Object.entries(before).filter(([key]) => !keys.includes(key))));
    router.refresh();
  });
  useKey('ArrowDown', () => startTyping(rows.current), { says: 'the first reading', weak: true });
  useKey('Enter', () => startTyping(rows.current), { weak: true });

  const { proposed, port } = sheet;
  const hidden = new Set(gone.filter(({ from }) => from === sheet).flatMap(({ keys }) => keys));
  const positions = sheet.positions
    .map(({ position, finals }) => ({ position, finals: finals.filter(({ key }) => !hidden.has(key)) }))
    .filter(({ finals }) => finals.length > 0);
  const asked = positions.map((position): PositionToKeep | null => {
    const bodied = bodyOf(sheet, position, typed, setting);
    return bodied && { position: String(position.position), ...bodied };
  });
  const toKeep = asked.filter((one) => one !== null);
  const count = toKeep.reduce((sum, { keys }) => sum + keys.length, 0);
  const all = positions.flatMap(({ finals }) => finals);
  const wrong = all.filter((one) => isRead(typed[one.key]) && Object.keys(wrongIn(typed[one.key]!, one)).length > 0);
  const touched = all.filter((one) => typed[one.key] && isTouched(typed[one.key]!)).length;
  const refusedRows = refused ? issuesOfRows(refused.problem, refused.keys) : {};
  const unit = proposed && setting.reading === 'field' ? fieldUnit(proposed) : setting.reading;
  const ready = count > 0 && wrong.length === 0 && setting.operatingMode.trim() !== '';
  const type = (key: string, row: TypedRow) => setTyped((before) => ({ ...before, [key]: row }));

  return (
    <Sheet header={header}>
      <LeaveGuard
        when={touched > 0}
        title={`Leave with ${finalsCount(touched)} not kept?`}
        act={`Leave ${finalsCount(touched)}`}
      >
        What is typed here is nowhere else, and is gone when you leave.
      </LeaveGuard>
      <FinalsCaution port={port} />
      <FinalsKept kept={kept} />
      {proposed && all.length > 0 ? (
        <>
          <FinalsSetting sheet={sheet} setting={setting} onChange={setSetting} />
          <div ref={rows} onKeyDown={moveBetweenCells}>
            {positions.map((position, i) => (
              <FinalsOfPosition
                key={String(position.position)}
                of={position}
                typed={typed}
                asked={asked[i]!}
                unit={unitLabel(unit === 'field' ? 'dBuV/m' : unit)}
                radiated={port === 'enclosure'}
                refused={refused?.position === String(position.position) ? refusedRows : {}}
                onType={type}
              />
            ))}
          </div>
          <div className="finals-foot">
            {refused && <ProblemMessage problem={refused.problem} />}
            {refused && issuesOfSheet(refused.problem).length > 0 && (
              <Message tone="over" lead={issuesOfSheet(refused.problem).join(' ')} />
            )}
            <div className="finals-acts">
              {ready ? (
                <Button kind="primary" busy={busy} onClick={() => void keep(toKeep)}>
                  Keep {finalsCount(count)}
                </Button>
              ) : (
                <Button kind="unavailable">Keep finals</Button>
              )}
              <p className="t-detail">{footWords(wrong.length, count, all.length)}</p>
            </div>
          </div>
        </>
      ) : (
        <EmptyLine lead="Nothing waits for a final here." className="mt-4">
          A run that is over or needs a final asks for one for each emission; the queue shows what was settled.
        </EmptyLine>
      )}
      {sheet.leftOut > 0 && (
        <p className="t-detail mt-3">{sheet.leftOut} more wait; they follow when these are kept.</p>
      )}
      <p className="t-detail mt-4">
        Kept as runs with the file of what was typed, by whom and when. Pre-compliance record, not a certificate.
      </p>
    </Sheet>
  );
}

function settingOf({ proposed }: FinalsSheetView): Setting {
  return {
    pathId: proposed?.pathId ?? '',
    reading: proposed?.valuesHold === 'field' ? 'field' : 'dBuV',
    operatingMode: proposed?.operatingMode ?? '',
    heightSwept: proposed?.heightSwept ?? false,
  };
}

function footWords(wrong: number, count: number, all: number): string {
  if (wrong > 0)
    return `${wrong === 1 ? 'One row holds' : `${wrong} rows hold`} what is no figure; put it right first.`;
  if (count === 0) return 'Type a reading; ↑ ↓ change the row, Enter goes on, Esc empties a cell.';
  return count === all ? 'All of them; each is judged as it stands above.' : `${all - count} left empty stay waiting.`;
}
