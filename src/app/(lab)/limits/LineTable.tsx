import Link from 'next/link';
import { Cell, HeadCell, KeyCell, Row, Table, TableHead } from '@/components/ui/Table';
import { VerdictWord } from '@/components/ui/VerdictWord';
import { formatFrequencyRange } from '@/format/frequencies';
import type { LimitLineSummary } from '@/schemas/tables';
import { basisVerdict, lineConditions, segmentValue } from './limitWords';

const WIDE = 'max-pad:hidden';

/** Limit lines: what they ask for, where that is printed, and how sure it is. */
export function LineTable({ lines }: { lines: readonly LimitLineSummary[] }) {
  return (
    <Table
      caption="Limit lines, newest first"
      className="[&_td]:align-top [&_td]:py-1.5! [&_th]:align-top [&_th]:py-1.5!"
    >
      <TableHead>
        <HeadCell>Line</HeadCell>
        <HeadCell className={WIDE}>Limit</HeadCell>
        <HeadCell className={WIDE}>Source</HeadCell>
        <HeadCell figure className={WIDE}>
          Revision
        </HeadCell>
        <HeadCell>Basis</HeadCell>
      </TableHead>
      <tbody>
        {lines.map((line) => (
          <Row key={line.id}>
            <KeyCell>
              <Link href={`/limits/${line.id}`} className="inline-block min-h-6 text-pen max-pad:min-h-11">
                {line.name}
              </Link>
              <span className="t-detail block font-normal">{lineConditions(line)}</span>
            </KeyCell>
            <Cell className={WIDE}>
              {line.segments.slice(0, 4).map((segment) => (
                <span key={segment.startHz} className="block">
                  <span className="t-figure">{formatFrequencyRange(segment.startHz, segment.stopHz)}</span>:{' '}
                  {segmentValue(segment, line.unit)}
                </span>
              ))}
              {line.segments.length > 4 && <span className="t-detail block">{line.segments.length - 4} more</span>}
            </Cell>
            <Cell quiet className={WIDE}>
              {line.source}
            </Cell>
            <Cell figure className={WIDE}>
              {line.revision}
            </Cell>
            <Cell>
              <VerdictWord verdict={basisVerdict(line.basis)}>{line.basis}</VerdictWord>
            </Cell>
          </Row>
        ))}
      </tbody>
    </Table>
  );
}
