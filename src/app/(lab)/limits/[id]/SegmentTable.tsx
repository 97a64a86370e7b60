import { Cell, HeadCell, Row, Table, TableHead } from '@/components/ui/Table';
import { formatTrimmed, unitLabel } from '@/format/quantities';
import type { LimitLineSummary } from '@/schemas/tables';

type Props = Pick<LimitLineSummary, 'segments' | 'unit' | 'name'>;
const BETWEEN = { 'log-frequency': 'log frequency', 'linear-frequency': 'frequency' } as const;

/** The segments of a line in figures; at a frequency that two of them share the lower limit governs. */
export function SegmentTable({ segments, unit, name }: Props) {
  return (
    <>
      <Table caption={`Segments of ${name}`} className="mt-4 max-w-[640px]">
        <TableHead>
          <HeadCell figure unit="MHz">
            From
          </HeadCell>
          <HeadCell figure unit="MHz">
            To
          </HeadCell>
          <HeadCell figure unit={unitLabel(unit)}>
            Limit
          </HeadCell>
          <HeadCell>Straight in</HeadCell>
        </TableHead>
        <tbody>
          {segments.map((segment) => {
            const { startHz, stopHz, startLimit, stopLimit, over } = segment;
            const flat = startLimit === stopLimit;
            return (
              <Row key={`${startHz} ${stopHz}`}>
                <Cell figure>{formatTrimmed(startHz / 1e6, 6)}</Cell>
                <Cell figure>{formatTrimmed(stopHz / 1e6, 6)}</Cell>
                <Cell figure>
                  {formatTrimmed(startLimit, 4)}
                  {!flat && ` to ${formatTrimmed(stopLimit, 4)}`}
                </Cell>
                <Cell quiet>{flat ? 'flat' : BETWEEN[over]}</Cell>
              </Row>
            );
          })}
        </tbody>
      </Table>
      <p className="t-detail mt-1">Where two segments share a frequency the lower limit governs on it.</p>
    </>
  );
}
