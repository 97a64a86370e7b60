import { HistoryLines, type HistoryLine } from '@/app/(lab)/jobs/HistoryLines';
import { VerdictWord } from '@/components/ui/VerdictWord';
import { formatDayTime } from '@/format/dates';
import { formatFrequency } from '@/format/frequencies';
import { formatMargin } from '@/format/quantities';
import { capitalised } from '@/format/words';
import type { EvaluationItem } from '@/schemas/runActs';
import { OldCandidates } from './OldCandidates';

interface Props {
  sweepId: string;
  evaluations: readonly EvaluationItem[];
  /** Older ones than these are in the API's list. */
  more: boolean;
  /** null for a reader who does not see it. */
  entries: readonly HistoryLine[] | null;
  zone: string;
}

/** Every evaluation of the run with what it used anew, then what was done with the run. */
export function History({ sweepId, evaluations, more, entries, zone }: Props) {
  return (
    <>
      {evaluations.length > 1 && (
        <ol aria-label="Evaluations, newest first">
          {evaluations.map((evaluation) => (
            <li key={evaluation.id}>
              <Evaluation sweepId={sweepId} evaluation={evaluation} zone={zone} />
            </li>
          ))}
          {more && <li className="column-quiet">Older evaluations are kept too.</li>}
        </ol>
      )}
      {entries && (
        <div className={evaluations.length > 1 ? 'mt-[22px]' : ''}>
          <HistoryLines entries={entries} zone={zone} />
        </div>
      )}
    </>
  );
}

interface EvaluationProps {
  sweepId: string;
  evaluation: EvaluationItem;
  zone: string;
}

function Evaluation({ sweepId, evaluation, zone }: EvaluationProps) {
  const { at, by, engine, verdict, worst, changes, repeats, reason, current } = evaluation;
  return (
    <>
      <VerdictWord verdict={verdict} />
      {worst && (
        <>
          , <span className="t-figure">{formatMargin(worst.marginDb)}</span> at{' '}
          <span className="t-figure">{formatFrequency(worst.frequencyHz)}</span>
        </>
      )}
      {current && ', now'}
      {reason !== null && <span className="block">{reason}</span>}
      {changes.map((change) => (
        <span key={change} className="block">
          {capitalised(change)}
        </span>
      ))}
      {repeats && <span className="block">The same figures as before, bit for bit.</span>}
      <span className="column-quiet block">
        {by.name}, {formatDayTime(at, zone)}, {engine}
      </span>
      {!current && <OldCandidates sweepId={sweepId} evaluation={evaluation} />}
    </>
  );
}
