import Link from 'next/link';
import type { MarginSection } from '@/components/shell/marginSection';
import { formatDay } from '@/format/dates';
import { formatCount } from '@/format/quantities';
import type { PathRecord } from '@/schemas/paths';

/** Runs that were corrected through the path, newest first. */
export function usedSection({ runs }: PathRecord, zone: string): MarginSection {
  const remark = runs.count === 1 ? '1 run' : `${formatCount(runs.count)} runs`;
  return {
    id: 'used',
    title: 'Used by',
    remark,
    count: runs.count,
    children:
      runs.count === 0 ? (
        <p className="column-quiet">No run was measured through it.</p>
      ) : (
        <>
          <ul>
            {runs.latest.map(({ id, number, measuredAt, revision }) => (
              <li key={id} className="column-line">
                <Link href={`/sweeps/${id}`} className="t-id text-pen">
                  {number}
                </Link>
                <span>
                  {formatDay(measuredAt, zone)}, revision {revision}
                </span>
              </li>
            ))}
          </ul>
          {runs.count > runs.latest.length && (
            <p className="column-quiet">and {formatCount(runs.count - runs.latest.length)} earlier</p>
          )}
        </>
      ),
  };
}
