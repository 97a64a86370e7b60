import Link from 'next/link';
import { Message } from '@/components/ui/Message';
import { formatDay } from '@/format/dates';
import { formatCount } from '@/format/quantities';
import type { OutdatedRuns as Outdated } from '@/schemas/tables';

/** Runs that were measured under the newer calibration and judged with an older table. */
export function OutdatedRuns({ outdated, className }: { outdated: Outdated; className?: string }) {
  const { count, sinceDay, revisions, runs } = outdated;
  const used = revisions.map(({ name, revision }) => `revision ${revision} of ${name}`).join(' and ');
  return (
    <Message
      tone="inconclusive"
      className={className}
      lead={`${count === 1 ? 'One run' : `${formatCount(count)} runs`} since ${formatDay(sinceDay)} used ${used}.`}
    >
      Re-evaluate {count === 1 ? 'it on its sheet' : 'them on their sheets'}:{' '}
      {runs.map(({ id, number }, i) => (
        <span key={id}>
          {i > 0 && ', '}
          <Link href={`/sweeps/${id}`} className="t-id">
            {number}
          </Link>
        </span>
      ))}
      {runs.length < count && `, and ${formatCount(count - runs.length)} more`}.
    </Message>
  );
}
