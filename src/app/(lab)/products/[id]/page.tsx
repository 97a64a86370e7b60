import type { Metadata } from 'next';
import Link from 'next/link';
import { found } from '@/app/found';
import { requireActor } from '@/app/requireActor';
import { mayRole } from '@/auth/permissions';
import { JobTable } from '@/app/(lab)/jobs/JobTable';
import { historiesOf } from '@/app/(lab)/jobs/history';
import { historySection } from '@/app/(lab)/jobs/HistoryLines';
import { missingLine, missingSection } from '@/app/(lab)/samples/missingSection';
import { sampleFinding } from '@/app/(lab)/samples/sampleFinding';
import { sampleRecord } from '@/app/(lab)/samples/sampleRecord';
import type { Standing } from '@/app/(lab)/samples/standing';
import { StateGrid } from '@/app/(lab)/samples/StateGrid';
import { worstFirst } from '@/app/(lab)/samples/worstRun';
import { Sheet } from '@/components/shell/Sheet';
import { SheetHeader } from '@/components/shell/SheetHeader';
import { ButtonLink } from '@/components/ui/Button';
import { EmptyLine } from '@/components/ui/EmptyLine';
import { Id } from '@/components/ui/IdentityLine';
import { SectionHeading } from '@/components/ui/SectionHeading';
import { formatDay } from '@/format/dates';
import { formatCount } from '@/format/quantities';
import type { SampleView } from '@/schemas/job';
import { listProductClocks } from '@/services/clocks';
import { labZone } from '@/services/lab';
import { readProduct } from '@/services/products';
import { Clocks } from './Clocks';
import { CorrectProduct } from './CorrectProduct';
import { productRecord } from './productRecord';
import { SampleTable } from './SampleTable';
import { statesSection } from './statesSection';

interface Props {
  params: Promise<{ id: string }>;
}

export async function generateMetadata({ params }: Props): Promise<Metadata> {
  const { name, code } = await found(readProduct(await requireActor(), (await params).id));
  return { title: `${name} ${code}` };
}

/** Where a designer lands: the product's newest measured sample, how it came on, and all its jobs and samples. */
export default async function ProductPage({ params }: Props) {
  const actor = await requireActor();
  const product = await found(readProduct(actor, (await params).id));
  const zone = await labZone();
  const clocks = await listProductClocks(actor, product.id, { limit: 200 });
  const { jobs, samples, more } = await productRecord(actor, product.id);
  const shown = samples.find(({ states }) => states.some(({ runs }) => runs > 0)) ?? samples[0];
  const record = shown && (await sampleRecord(actor, shown, zone));
  const history = await historiesOf(actor, [['product', product.id]]);
  const standings = new Map<string, Standing>();
  const worst = record && [...record.latest].sort(worstFirst)[0];
  const job = jobs.find(({ id }) => id === shown?.job.id);
  if (worst && job?.state === 'open') standings.set(job.id, worst);
  const state = newestState(shown);
  const planned = shown?.states.find((one) => one.planned);
  const day = [...(record?.days.values() ?? [])].sort().at(-1);
  const sections = [
    ...missingSection(record?.latest ?? []),
    ...statesSection(shown, record?.days ?? new Map()),
    ...(history.length > 0 ? [historySection(history, zone)] : []),
  ];
  return (
    <Sheet
      header={
        <SheetHeader
          title={`${product.name} ${product.code}`}
          state={state && { label: state.label }}
          identity={
            <>
              <span>{product.organisation.name}</span>
              {shown && (
                <>
                  <span>
                    job{' '}
                    <Link href={`/jobs/${shown.job.id}`} className="t-id text-pen">
                      {shown.job.number}
                    </Link>
                  </span>
                  <span>
                    serial <Id>{shown.serial}</Id>
                  </span>
                </>
              )}
              {day && <span>measured {formatDay(day)}</span>}
              {planned && <span>{planned.label} is planned</span>}
            </>
          }
          finding={record?.finding ?? sampleFinding([])}
          actions={
            mayRole(actor.role, 'job.create') && (
              <ButtonLink href={`/jobs/new?product=${product.id}`}>Open a job for {product.code}</ButtonLink>
            )
          }
        />
      }
      margin={sections.length > 0 ? sections : undefined}
      marginLine={missingLine(record?.latest ?? [])}
      keys={
        record && record.grid.rows.length > 0
          ? [
              { keys: ['ArrowLeft', 'ArrowRight'], does: 'states' },
              { keys: ['ArrowUp', 'ArrowDown'], does: 'ports' },
            ]
          : undefined
      }
    >
      {record && record.grid.rows.length > 0 && (
        <div className="mt-5">
          <StateGrid grid={record.grid} days={record.days} />
          {record.grid.left > 0 && (
            <p className="t-detail mt-2">
              {formatCount(record.grid.left)} older states stand on the{' '}
              <Link href={`/samples/${shown!.id}`}>sample’s own sheet</Link>.
            </p>
          )}
        </div>
      )}
      <SectionHeading className="mt-6" remark={samples.length > 0 && `${formatCount(samples.length)}, newest first`}>
        Samples
      </SectionHeading>
      {samples.length > 0 ? (
        <SampleTable samples={samples} />
      ) : (
        <EmptyLine lead="No sample of this product has come in yet.">
          {actor.role !== 'designer' && 'Open a job for it and add the sample there.'}
        </EmptyLine>
      )}
      <SectionHeading className="mt-6" remark={jobs.length > 0 && `${formatCount(jobs.length)}, newest first`}>
        Jobs
      </SectionHeading>
      {jobs.length > 0 ? (
        <JobTable jobs={jobs} standings={standings} zone={zone} product={false} />
      ) : (
        <EmptyLine lead="No job was opened for it yet." />
      )}
      {more && <p className="t-detail mt-2">Jobs from further back are in the list of all jobs.</p>}
      <Clocks productId={product.id} clocks={clocks.items} zone={zone} />
      {mayRole(actor.role, 'product.change') ? (
        <>
          <SectionHeading className="mt-6">This product</SectionHeading>
          <p className="mt-1 max-w-[60ch] text-ink2">{product.description || 'No description yet.'}</p>
          <CorrectProduct product={product} />
        </>
      ) : (
        product.description && (
          <>
            <SectionHeading className="mt-6">This product</SectionHeading>
            <p className="mt-1 max-w-[60ch] text-ink2">{product.description}</p>
          </>
        )
      )}
    </Sheet>
  );
}

function newestState(sample: SampleView | undefined) {
  return sample?.states.filter(({ planned }) => !planned).at(-1);
}
