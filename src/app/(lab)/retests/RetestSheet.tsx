'use client';

import { useState, type ReactNode } from 'react';
import { ProblemMessage } from '@/components/forms/ProblemMessage';
import { useKey } from '@/components/shell/keys';
import { Sheet } from '@/components/shell/Sheet';
import { useSheet } from '@/components/shell/sheetState';
import { ButtonLink } from '@/components/ui/Button';
import { formatMargin } from '@/format/quantities';
import type { RetestItem } from '@/schemas/retest';
import { RetestActs } from './RetestActs';
import { RetestHistory, RetestRecord } from './RetestRecord';
import { RetestTable } from './RetestTable';
import { whereWords } from './retestWords';
import { useRetest } from './useRetest';
import './retests.css';

interface Props {
  header: ReactNode;
  filters: ReactNode;
  items: readonly RetestItem[];
  zone: string;
  /** Whether the reader may place, withdraw and reopen. */
  change: boolean;
  /** What stands under the table. */
  children: ReactNode;
}

/** The queue; beside it the chosen retest with what the lab can do with it, and its history. */
export function RetestSheet({ header, filters, items, zone, change, children }: Props) {
  const [chosenId, setChosenId] = useState(items[0]?.id ?? null);
  const chosen = items.find(({ id }) => id === chosenId) ?? items[0] ?? null;
  const { retest, problem } = useRetest(chosen?.id ?? null, chosen?.version ?? null);
  const changes = retest?.changes.length ?? 0;
  return (
    <Sheet
      header={header}
      margin={
        chosen
          ? [
              {
                id: 'retest',
                title: 'Retest',
                subject: `${chosen.number}, ${whereWords(chosen)}`,
                children: (
                  <>
                    <RetestRecord item={chosen} />
                    {change && isToMeasure(chosen) && (
                      <ButtonLink size="table" keyName="F" className="mt-2" href={finalsAddress(chosen)}>
                        Measure finals of {chosen.sample.code} {chosen.state.label}
                      </ButtonLink>
                    )}
                    {change && <RetestActs key={chosen.id} item={chosen} />}
                  </>
                ),
              },
              {
                id: 'history',
                title: 'History',
                remark: changes > 0 ? (changes === 1 ? '1 change' : `${changes} changes`) : undefined,
                count: changes,
                children: (
                  <div aria-live="polite" aria-busy={!retest && !problem}>
                    {retest ? (
                      <RetestHistory retest={retest} zone={zone} />
                    ) : problem ? (
                      <ProblemMessage problem={problem} />
                    ) : (
                      <p className="column-quiet">Looking it up.</p>
                    )}
                  </div>
                ),
              },
            ]
          : undefined
      }
      marginLine={
        chosen && (
          <>
            {chosen.number}: {whereWords(chosen)}
            {chosen.marginDb !== null && `, ${formatMargin(chosen.marginDb)}`}
          </>
        )
      }
      keys={
        chosen
          ? [
              { keys: ['ArrowUp', 'ArrowDown'], does: 'rows' },
              ...(change ? [{ keys: ['R'], does: 'place' }] : []),
              { keys: ['?'], does: 'all keys' },
            ]
          : undefined
      }
    >
      {filters}
      <div className="retest-rows">
        <Rows items={items} zone={zone} chosenId={chosen?.id ?? null} onChoose={setChosenId} />
      </div>
      {children}
    </Sheet>
  );
}

/** A repeated prescan is a sweep; what is measured or settled waits for nobody. */
function isToMeasure({ kind, status }: RetestItem): boolean {
  return kind !== 'repeat-prescan' && (status === 'waiting' || status === 'scheduled');
}

const finalsAddress = ({ state, port }: RetestItem) => `/finals?state=${state.id}&port=${port}`;

/** Inside the sheet, so that choosing a row can draw the column out. */
function Rows({
  items,
  zone,
  chosenId,
  onChoose,
}: {
  items: readonly RetestItem[];
  zone: string;
  chosenId: string | null;
  onChoose: (id: string) => void;
}) {
  const { open } = useSheet();
  const step = (by: number): boolean | void => {
    const next = items[items.findIndex(({ id }) => id === chosenId) + by];
    if (!next) return false;
    onChoose(next.id);
  };
  useKey('ArrowDown', () => step(1), { says: 'next retest', weak: true });
  useKey('ArrowUp', () => step(-1), { says: 'retest before', weak: true });
  return (
    <RetestTable
      items={items}
      zone={zone}
      chosenId={chosenId}
      onChoose={(id, fromKeyboard) => {
        onChoose(id);
        open('retest', { focus: fromKeyboard });
      }}
    />
  );
}
