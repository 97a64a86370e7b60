import Link from 'next/link';
import { VerdictWord } from '@/components/ui/VerdictWord';
import type { SweepView } from '@/schemas/sweep';
import { missingText } from '@/format/missing';
import { PORT_WORDS } from '@/format/words';
import { SetUpsOfPort } from './SetUpsOfPort';

/** The port's verdict over every run of this state, and what is missing for it. */
export function Coverage({ sweep }: { sweep: SweepView }) {
  const { portVerdict, state, port } = sweep;
  return (
    <>
      <p>
        {PORT_WORDS[port]} at {state.label}: <VerdictWord verdict={portVerdict.verdict} />
      </p>
      {portVerdict.missing.length > 0 ? (
        <ul className="mt-[22px]">
          {portVerdict.missing.map(missingText).map((missing) => (
            <li key={missing}>{missing}</li>
          ))}
        </ul>
      ) : (
        <p>Nothing is missing for a verdict on this port.</p>
      )}
      <SetUpsOfPort runs={portVerdict.runs} className="mt-[22px]" />
      {!portVerdict.runs.some((run) => run.id === sweep.id) && <p className="mt-[22px]">{silence(sweep)}</p>}
      <p className="mt-[22px]">
        {portVerdict.runs.length === 0 ? 'No run speaks for it.' : 'Runs:'}{' '}
        {portVerdict.runs.map((run, i) => (
          <span key={run.id}>
            {i > 0 ? ', ' : ''}
            {run.id === sweep.id ? (
              <b className="t-figure">{run.number}</b>
            ) : (
              <Link className="t-figure" href={`/sweeps/${run.id}`}>
                {run.number}
              </Link>
            )}
          </span>
        ))}
      </p>
    </>
  );
}

/** Why this run is not among those that speak for its state. */
function silence({ trial, voided }: SweepView): string {
  if (voided) return 'This run is voided and speaks for nothing.';
  return trial === null ? 'This run is not counted.' : 'This run is a trial and speaks for nothing but itself.';
}

function Summary({ sweep }: { sweep: SweepView }) {
  return <VerdictWord verdict={sweep.portVerdict.verdict} />;
}
Coverage.Summary = Summary;
