import type { Metadata } from 'next';
import Link from 'next/link';
import { requireActor } from '@/app/requireActor';
import { asked, listed, type Search } from '@/app/(lab)/jobs/listed';
import { RunTable } from '@/app/(lab)/samples/RunTable';
import { runListFinding } from '@/app/(lab)/samples/runListFinding';
import { Sheet } from '@/components/shell/Sheet';
import { SheetHeader } from '@/components/shell/SheetHeader';
import { ButtonLink } from '@/components/ui/Button';
import { EmptyLine } from '@/components/ui/EmptyLine';
import { Pager } from '@/components/ui/Pager';
import { formatCount } from '@/format/quantities';
import { labZone } from '@/services/lab';
import { readSample } from '@/services/samples';
import { listSweeps } from '@/services/sweeps';
import { DropOnList } from './DropOnList';

export const metadata: Metadata = { title: 'Sweeps' };

/** Every run the reader may see, newest first; `?sample=` keeps to one sample. */
export default async function SweepsPage({ searchParams }: { searchParams: Search }) {
  const actor = await requireActor();
  const lab = actor.role !== 'designer';
  const [after, sampleId] = [await asked(searchParams, 'after'), await asked(searchParams, 'sample')];
  const sample = sampleId ? await listed(readSample(actor, sampleId)) : null;
  const page = await listed(listSweeps(actor, { limit: 50, after, sampleId }));
  const zone = await labZone();
  const here = sampleId ? `/sweeps?sample=${sampleId}` : '/sweeps';
  const onward = (cursor: string) => `${here}${sampleId ? '&' : '?'}after=${cursor}`;
  return (
    <Sheet
      header={
        <SheetHeader
          title={lab ? 'Sweeps' : 'Runs'}
          identity={
            sample && (
              <>
                <span>
                  only <Link href={`/samples/${sample.id}`}>{sample.code}</Link>, {sample.product.name}{' '}
                  {sample.product.code}
                </span>
                <Link href="/sweeps">Show all</Link>
              </>
            )
          }
          finding={runListFinding(page.items, after === undefined, page.next === null)}
          actions={
            lab && (
              <ButtonLink kind="primary" keyName="U" href="/sweeps/new">
                Upload sweep files
              </ButtonLink>
            )
          }
        />
      }
    >
      {lab && <DropOnList />}
      <div className="mt-4">
        <RunTable caption="Runs, newest first" runs={page.items} zone={zone} whose />
        {page.items.length === 0 && (
          <EmptyLine
            lead={lab ? 'Upload a sweep file and its run stands here.' : 'No run of your products is kept yet.'}
          >
            {lab
              ? 'Text or CSV from any receiver, several at once. The original is kept as sent.'
              : 'Each run appears here as soon as the lab has kept it.'}
          </EmptyLine>
        )}
        <Pager firstHref={after ? here : null} nextHref={page.next && onward(page.next)}>
          {page.items.length > 0 &&
            `${formatCount(page.items.length)} ${page.items.length === 1 ? 'run' : 'runs'}, newest first`}
        </Pager>
      </div>
    </Sheet>
  );
}
