'use client';

import Link from 'next/link';
import { useCallback, useState } from 'react';
import { historySection, type HistoryLine } from '@/app/(lab)/jobs/HistoryLines';
import { Sheet } from '@/components/shell/Sheet';
import { SheetHeader } from '@/components/shell/SheetHeader';
import { useSheet } from '@/components/shell/sheetState';
import type { MarginSection } from '@/components/shell/marginSection';
import { Button } from '@/components/ui/Button';
import { formatFrequencyRange } from '@/format/frequencies';
import { formatTrimmed } from '@/format/quantities';
import { PORT_METHODS, PORT_WORDS } from '@/format/words';
import type { PathRecord } from '@/schemas/paths';
import { BudgetForm } from './BudgetForm';
import { Chain } from './Chain';
import { Correction } from './Correction';
import type { OpenFigure } from './openFigure';
import { PathRevisions } from './PathRevisions';
import { PathWorking } from './PathWorking';
import { pathFinding } from './pathWords';
import { usedSection } from './pathSections';
import { Uncertainty } from './Uncertainty';

interface Props {
  path: PathRecord;
  /** One more frequency that the correction is stated at. */
  askedHz: number | null;
  history: readonly HistoryLine[];
  zone: string;
  today: string;
  manager: boolean;
}

/** The sheet of one signal path. */
export function PathSheet({ path, askedHz, history, zone, today, manager }: Props) {
  const [open, setOpen] = useState<OpenFigure | null>(() => firstFigure(path, askedHz));
  const [revising, setRevising] = useState(false);
  const newest = path.revisions[0]!.revision;
  const current = path.revision === newest;
  const working: MarginSection = {
    id: 'working',
    title: 'Working',
    subject: open ? subjectOf(path, open) : undefined,
    children: <PathWorking path={path} open={open} />,
  };
  return (
    <Sheet
      header={
        <SheetHeader
          title={`Signal path ${path.code}`}
          identity={
            <>
              <Link href="/equipment#paths" className="text-pen">
                Equipment
              </Link>
              <span>{path.name}</span>
              <span>
                {PORT_WORDS[path.port]}, {PORT_METHODS[path.port]}
              </span>
              <span>test position {path.position}</span>
              <span>revision {path.revision}</span>
            </>
          }
          finding={pathFinding(path)}
          actions={
            manager &&
            current &&
            !revising && (
              <Button kind="primary" keyName="E" onClick={() => setRevising(true)}>
                Revise the uncertainty
              </Button>
            )
          }
        />
      }
      margin={[working, usedSection(path, zone), ...(history.length > 0 ? [historySection(history, zone)] : [])]}
      marginLine={open ? subjectOf(path, open) : `${path.code}, revision ${path.revision}`}
      keys={[
        { keys: ['W'], does: 'working' },
        ...(manager && current ? [{ keys: ['E'], does: 'revise the uncertainty' }] : []),
      ]}
    >
      {!current && (
        <p className="t-text mt-3">
          An earlier revision; the newest is{' '}
          <Link href={`/paths/${path.id}`} className="text-pen underline">
            revision {newest}
          </Link>
          .
        </p>
      )}
      {revising && <BudgetForm path={path} onClose={() => setRevising(false)} />}
      <Sections path={path} askedHz={askedHz} open={open} setOpen={setOpen} zone={zone} today={today} />
    </Sheet>
  );
}

interface SectionsProps extends Pick<Props, 'path' | 'askedHz' | 'zone' | 'today'> {
  open: OpenFigure | null;
  setOpen: (figure: OpenFigure) => void;
}

/** Inside the sheet, so that a figure can draw the column out. */
function Sections({ path, askedHz, open, setOpen, zone, today }: SectionsProps) {
  const sheet = useSheet();
  const show = useCallback(
    (figure: OpenFigure, fromKeyboard: boolean) => {
      setOpen(figure);
      sheet.open('working', { focus: fromKeyboard });
    },
    [setOpen, sheet],
  );
  return (
    <>
      <Chain path={path} today={today} />
      <Correction path={path} askedHz={askedHz} open={open} onOpen={show} />
      <Uncertainty path={path} open={open} onOpen={show} />
      <PathRevisions path={path} zone={zone} />
    </>
  );
}

/** The frequency that was asked for, where it has a total; otherwise U for a final, where it has a budget. */
function firstFigure(path: PathRecord, askedHz: number | null): OpenFigure | null {
  const known = path.corrections[0]?.at.some((one) => one.frequencyHz === askedHz && one.totalDb !== null);
  if (askedHz !== null && known) return { kind: 'total', correction: 0, frequencyHz: askedHz };
  const of = path.uncertainty.findIndex(({ purpose, budget }) => purpose === 'final' && budget !== null);
  return of < 0 ? null : { kind: 'expanded', of };
}

function subjectOf(path: PathRecord, open: OpenFigure): string {
  if (open.kind === 'total') return `correction at ${formatTrimmed(open.frequencyHz / 1e6, 6)} MHz`;
  const { purpose, startHz, stopHz, budget } = path.uncertainty[open.of]!;
  if (open.kind === 'contribution') return budget?.rows[open.row]?.name ?? '';
  return `U for a ${purpose}, ${formatFrequencyRange(startHz, stopHz)}`;
}
