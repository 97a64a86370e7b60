import Link from 'next/link';
import { StateTag } from '@/components/ui/StateTag';
import { Cell, HeadCell, KeyCell, Row, Table, TableHead } from '@/components/ui/Table';
import { VerdictWord } from '@/components/ui/VerdictWord';
import { dayOf, formatDayTime, formatShortDay } from '@/format/dates';
import { formatFrequencyMhz } from '@/format/frequencies';
import { ABSENT, formatCount, formatMargin } from '@/format/quantities';
import { STRAYED_MARK } from '@/format/setup';
import { MAINS_LINE_WORDS, POLARISATION_MARKS, PORT_WORDS, PURPOSE_WORDS } from '@/format/words';
import type { Run } from './worstRun';

/** Hidden on a phone, where the second line of the first cell says it. */
const WIDE = 'max-pad:hidden';

/** Runs as rows. `whose` adds product, state and job: on the list of all runs, not on the sheet of one sample. */
export function RunTable({
  caption,
  runs,
  zone,
  whose = false,
}: {
  caption: string;
  runs: readonly Run[];
  zone: string;
  whose?: boolean;
}) {
  // A sheet of one sample has its margin beside it.
  const last = whose ? WIDE : 'max-wide:hidden';
  return (
    <Table caption={caption} className="max-pad:[&_td]:align-top max-pad:[&_th]:align-top">
      <TableHead>
        <HeadCell>Run</HeadCell>
        {whose && <HeadCell className={WIDE}>Sample</HeadCell>}
        {whose && <HeadCell className={WIDE}>Job</HeadCell>}
        <HeadCell className={WIDE}>Port</HeadCell>
        <HeadCell className={WIDE}>Line or pol.</HeadCell>
        <HeadCell className={WIDE}>Purpose</HeadCell>
        <HeadCell figure unit="dB" className="max-pad:pr-0!">
          Worst
        </HeadCell>
        <HeadCell figure unit="MHz" className={WIDE}>
          at
        </HeadCell>
        <HeadCell className={WIDE}>Verdict</HeadCell>
        <HeadCell figure className={last}>
          Points
        </HeadCell>
        <HeadCell className={WIDE}>Kept</HeadCell>
        <HeadCell className={last}>By</HeadCell>
      </TableHead>
      <tbody>
        {runs.map((run) => (
          <Row key={run.id}>
            <KeyCell className="whitespace-nowrap max-pad:py-2">
              <Link
                prefetch={false}
                href={`/sweeps/${run.id}`}
                className="t-id font-semibold text-pen max-pad:inline-block max-pad:min-h-6"
              >
                {run.number}
              </Link>
              <RunMarks run={run} />
              {whose && (
                <span className="ml-2 font-semibold pad:hidden">
                  {run.product} <StateTag label={run.state} />
                </span>
              )}
              <span className="t-detail block font-normal whitespace-normal pad:hidden">{secondLine(run, zone)}</span>
              <Marks run={run} />
            </KeyCell>
            {whose && (
              <Cell className={`${WIDE} whitespace-nowrap`} strong>
                {run.product} <StateTag label={run.state} />
              </Cell>
            )}
            {whose && (
              <Cell className={WIDE} quiet>
                <span className="t-id">{run.jobNumber}</span>
              </Cell>
            )}
            <Cell className={`${WIDE} whitespace-nowrap`}>{PORT_WORDS[run.port]}</Cell>
            <Cell className={`${WIDE} whitespace-nowrap`}>{positionOf(run)}</Cell>
            <Cell className={WIDE} quiet>
              {PURPOSE_WORDS[run.purpose]}
            </Cell>
            <Cell figure strong className="max-pad:pt-2 max-pad:pr-0!">
              {run.worst ? formatMargin(run.worst.marginDb) : ABSENT}
              <span className="mt-1 flex justify-end font-sans font-normal tracking-normal [word-spacing:normal] pad:hidden">
                <RunVerdict run={run} />
              </span>
            </Cell>
            <Cell figure className={WIDE}>
              {run.worst ? formatFrequencyMhz(run.worst.frequencyHz) : ABSENT}
            </Cell>
            <Cell className={WIDE}>
              <RunVerdict run={run} />
            </Cell>
            <Cell figure quiet className={last}>
              {formatCount(run.points)}
            </Cell>
            <Cell quiet className={`${WIDE} whitespace-nowrap`}>
              {formatDayTime(run.keptAt, zone)}
            </Cell>
            <Cell quiet className={`${last} whitespace-nowrap`}>
              {run.by}
            </Cell>
          </Row>
        ))}
      </tbody>
    </Table>
  );
}

/** What sets a run apart from those that speak for their state. */
function Marks({ run: { trial, partial, voided, strayed } }: { run: Run }) {
  const marks = [trial !== null && `trial ${trial}`, partial && 'partial', voided && 'voided'].filter(Boolean);
  if (marks.length === 0 && strayed === null) return null;
  return (
    <span className="t-detail block font-normal whitespace-normal">
      {marks.join(', ')}
      {marks.length > 0 && strayed !== null && ', '}
      {strayed !== null && (
        <span className="text-ochre" title={strayed}>
          {STRAYED_MARK}
        </span>
      )}
    </span>
  );
}

/** A voided run keeps its figures and has no verdict any more. */
function RunVerdict({ run: { verdict, voided } }: { run: Run }) {
  return voided ? <VerdictWord verdict="not-covered">voided</VerdictWord> : <VerdictWord verdict={verdict} />;
}

/** What sets a run apart from those that speak for their state. */
function RunMarks({ run: { trial, partial, voided } }: { run: Run }) {
  const marks = [partial && 'partial', trial !== null && 'trial', voided && 'voided'].filter(Boolean);
  return marks.length === 0 ? null : <span className="t-detail ml-1.5 font-normal">{marks.join(', ')}</span>;
}

/** `line L`, `horizontal`. */
export function positionOf({ line, polarisation }: Pick<Run, 'line' | 'polarisation'>): string {
  return line ? MAINS_LINE_WORDS[line] : (polarisation ?? ABSENT);
}

/** Kept short: it shares a phone's width with the margin. */
function secondLine(run: Run, zone: string): string {
  const position = run.line ?? (run.polarisation && POLARISATION_MARKS[run.polarisation]);
  return [PORT_WORDS[run.port], position, PURPOSE_WORDS[run.purpose], formatShortDay(dayOf(run.keptAt, zone))]
    .filter(Boolean)
    .join(', ');
}
