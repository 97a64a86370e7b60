import type { Metadata } from 'next';
import { requireActor } from '@/app/requireActor';
import { Sheet } from '@/components/shell/Sheet';
import { SheetHeader } from '@/components/shell/SheetHeader';
import { ButtonLink } from '@/components/ui/Button';
import { EmptyLine } from '@/components/ui/EmptyLine';
import { Pager } from '@/components/ui/Pager';
import { formatCount } from '@/format/quantities';
import { listJobs } from '@/services/jobs';
import { labZone } from '@/services/lab';
import { JobTable } from './JobTable';
import { jobsFinding } from './jobsFinding';
import { standsOf } from './jobStands';
import { asked, listed, type Search } from './listed';

export const metadata: Metadata = { title: 'Jobs' };

/** Each open job's standing is read from its runs, so a page holds no more than 25. */
const JOBS = 25;

export default async function JobsPage({ searchParams }: { searchParams: Search }) {
  const actor = await requireActor();
  const lab = actor.role !== 'designer';
  const after = await asked(searchParams, 'after');
  const { items, next } = await listed(listJobs(actor, { limit: JOBS, after }));
  const standings = await standsOf(actor, items);
  const zone = await labZone();
  const open = items.filter(({ state }) => state === 'open');
  const finding = jobsFinding(
    open.map(({ id, number }) => ({ number, stands: standings.get(id) ?? null })),
    items.length,
    after === undefined && next === null,
  );
  return (
    <Sheet
      header={
        <SheetHeader
          title="Jobs"
          finding={finding}
          actions={
            <>
              <ButtonLink href="/products">Products</ButtonLink>
              {lab && (
                <ButtonLink kind="primary" href="/jobs/new">
                  Open a job
                </ButtonLink>
              )}
            </>
          }
        />
      }
    >
      <div className="mt-4">
        <JobTable jobs={items} standings={standings} zone={zone} />
        {items.length === 0 && (
          <EmptyLine lead={lab ? 'Open the first job.' : 'The lab has opened no job for you yet.'}>
            {lab
              ? 'A job belongs to one product of one client; its samples and runs hang from it.'
              : 'A job opened for one of your products stands here.'}
          </EmptyLine>
        )}
        <Pager firstHref={after ? '/jobs' : null} nextHref={next && `/jobs?after=${next}`}>
          {items.length > 0 && `${formatCount(items.length)} ${items.length === 1 ? 'job' : 'jobs'}, newest first`}
        </Pager>
      </div>
    </Sheet>
  );
}
