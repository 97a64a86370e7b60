import Link from 'next/link';
import { Message } from '@/components/ui/Message';
import { capitalised } from '@/format/words';
import type { FinalsKept as Kept } from '@/schemas/finals';
import { finalsCount } from './finalsWords';

/** What was kept since the sheet was opened: the runs, and what became of the retests. */
export function FinalsKept({ kept }: { kept: readonly Kept[] }) {
  if (kept.length === 0) return null;
  const runs = kept.flatMap((one) => one.runs);
  const points = runs.reduce((sum, run) => sum + run.points, 0);
  const retests = new Map(kept.flatMap((one) => one.retests.map((retest) => [retest.number, retest] as const)));
  return (
    <Message tone="under" live="polite" lead={`${capitalised(finalsCount(points))} kept.`} className="mt-4">
      {runs.length === 1 ? 'Run ' : 'Runs '}
      {runs.map(({ id, number }, i) => (
        <span key={id}>
          {i > 0 && ', '}
          <Link prefetch={false} href={`/sweeps/${id}`} className="t-id text-pen underline">
            {number}
          </Link>
        </span>
      ))}
      .
      {[...retests.values()].map(({ id, number, status, statusReason }) => (
        <span key={id} className="block">
          <span className="t-id">{number}</span> {status}: {statusReason}
        </span>
      ))}
    </Message>
  );
}
