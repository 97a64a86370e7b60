import Link from 'next/link';
import { VerdictWord } from '@/components/ui/VerdictWord';
import { runWords } from '@/app/(lab)/sweeps/[id]/runWords';
import { formatDayTime } from '@/format/dates';
import { formatFrequency } from '@/format/frequencies';
import { formatMargin } from '@/format/quantities';
import { PURPOSE_WORDS } from '@/format/words';
import type { ComparedRun } from '@/schemas/comparison';

/** One of the two, in the margin: what it is, how it stands, and the way to its own sheet. */
export function RunBrief({ run, zone }: { run: ComparedRun; zone: string }) {
  const { id, number, state, trial, evaluation, voided, partial, operatingMode } = run;
  return (
    <>
      <p>
        <Link href={`/sweeps/${id}`} className="t-id">
          {number}
        </Link>
        , {runWords(run)}, {PURPOSE_WORDS[run.purpose]}
      </p>
      <p>
        {state.label}, {state.description}
      </p>
      {trial !== null && <p>Trial: {trial}. It speaks for nothing but itself.</p>}
      {partial && <p>Kept up to line {partial.line} of its file.</p>}
      {voided ? (
        <p>Voided: {voided.reason}</p>
      ) : (
        <p>
          <VerdictWord verdict={evaluation.verdict} />
          {evaluation.worst && (
            <>
              , <span className="t-figure">{formatMargin(evaluation.worst.marginDb)}</span> at{' '}
              <span className="t-figure">{formatFrequency(evaluation.worst.frequencyHz)}</span>
            </>
          )}
        </p>
      )}
      <p className="column-quiet">
        {operatingMode}; {formatDayTime(run.measuredAt ?? run.keptAt, zone)}
      </p>
    </>
  );
}
