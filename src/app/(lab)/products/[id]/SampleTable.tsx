import Link from 'next/link';
import { StateTag } from '@/components/ui/StateTag';
import { Cell, HeadCell, KeyCell, Row, Table, TableHead } from '@/components/ui/Table';
import { formatCount } from '@/format/quantities';
import type { SampleView } from '@/schemas/job';

export function SampleTable({ samples }: { samples: readonly SampleView[] }) {
  return (
    <Table caption="Samples, newest first">
      <TableHead>
        <HeadCell>Sample</HeadCell>
        <HeadCell>Serial</HeadCell>
        <HeadCell className="max-pad:hidden">Job</HeadCell>
        <HeadCell>States</HeadCell>
        <HeadCell figure>Runs</HeadCell>
      </TableHead>
      <tbody>
        {samples.map((sample) => (
          <Row key={sample.id}>
            <KeyCell>
              <Link prefetch={false} href={`/samples/${sample.id}`} className="t-id font-semibold text-pen">
                {sample.code}
              </Link>
            </KeyCell>
            <Cell>
              <span className="t-id">{sample.serial}</span>
            </Cell>
            <Cell className="max-pad:hidden" quiet>
              <Link prefetch={false} href={`/jobs/${sample.job.id}`} className="t-id text-pen">
                {sample.job.number}
              </Link>
            </Cell>
            <Cell>
              <span className="inline-flex flex-wrap gap-1.5">
                {sample.states.map(({ id, label, planned }) => (
                  <StateTag key={id} label={label} planned={planned} />
                ))}
              </span>
            </Cell>
            <Cell figure>{formatCount(sample.states.reduce((sum, { runs }) => sum + runs, 0))}</Cell>
          </Row>
        ))}
      </tbody>
    </Table>
  );
}
