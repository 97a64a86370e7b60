import Link from 'next/link';
import { Cell, HeadCell, KeyCell, Row, Table, TableHead } from '@/components/ui/Table';
import { VerdictWord } from '@/components/ui/VerdictWord';
import { formatDay } from '@/format/dates';
import { formatCount, formatMargin } from '@/format/quantities';
import type { JobView } from '@/schemas/job';
import type { PortStanding } from '@/services/portVerdict';

const WIDE = 'max-pad:hidden';
const BENCH = 'max-bench:hidden';

/** Jobs as rows; `standings` gives the governing port of the open ones. `product` is left out on a product's own sheet. */
export function JobTable({
  jobs,
  standings,
  zone,
  product = true,
}: {
  jobs: readonly JobView[];
  standings: ReadonlyMap<string, PortStanding>;
  zone: string;
  product?: boolean;
}) {
  return (
    <Table caption="Jobs, newest first" className="max-pad:[&_td]:align-top max-pad:[&_th]:align-top">
      <TableHead>
        <HeadCell>Number</HeadCell>
        <HeadCell>Title</HeadCell>
        {product && <HeadCell className={BENCH}>Client</HeadCell>}
        {product && <HeadCell className={WIDE}>Product</HeadCell>}
        <HeadCell className={WIDE}>State</HeadCell>
        <HeadCell className={WIDE}>Stands at</HeadCell>
        <HeadCell className={WIDE}>Opened</HeadCell>
        <HeadCell figure className={WIDE}>
          Samples
        </HeadCell>
      </TableHead>
      <tbody>
        {jobs.map((job) => (
          <Row key={job.id}>
            <KeyCell className="max-pad:py-2">
              <Link prefetch={false} href={`/jobs/${job.id}`} className="t-id font-semibold text-pen">
                {job.number}
              </Link>
            </KeyCell>
            <Cell className="max-pad:py-2">
              {job.title}
              <span className="t-detail block pad:hidden">
                {product && `${job.organisation.name}, ${job.product.code}, `}
                {job.state}
              </span>
              <span className="block pad:hidden">
                <Stands job={job} standing={standings.get(job.id)} />
              </span>
            </Cell>
            {product && (
              <Cell className={BENCH} quiet>
                {job.organisation.name}
              </Cell>
            )}
            {product && (
              <Cell className={`${WIDE} whitespace-nowrap`}>
                <Link prefetch={false} href={`/products/${job.product.id}`}>
                  {job.product.code}
                </Link>
              </Cell>
            )}
            <Cell className={WIDE} quiet={job.state !== 'open'}>
              {job.state}
            </Cell>
            <Cell className={`${WIDE} whitespace-nowrap`}>
              <Stands job={job} standing={standings.get(job.id)} />
            </Cell>
            <Cell className={`${WIDE} whitespace-nowrap`} quiet>
              {formatDay(job.createdAt, zone)}
            </Cell>
            <Cell figure className={WIDE}>
              {formatCount(job.samples)}
            </Cell>
          </Row>
        ))}
      </tbody>
    </Table>
  );
}

function Stands({ job, standing }: { job: JobView; standing: PortStanding | undefined }) {
  if (job.state !== 'open') return <span className="text-ink2">{job.stateReason ?? ''}</span>;
  if (!standing) return <VerdictWord verdict="not-covered">not measured yet</VerdictWord>;
  return (
    <>
      <VerdictWord verdict={standing.verdict} />
      {standing.worst && (
        <span className="ml-2 text-ink2">
          <span className="t-figure">{formatMargin(standing.worst.marginDb)}</span> in {standing.state}
        </span>
      )}
    </>
  );
}
