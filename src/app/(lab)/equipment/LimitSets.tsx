import Link from 'next/link';
import { EmptyLine } from '@/components/ui/EmptyLine';
import { Pager } from '@/components/ui/Pager';
import { SectionHeading } from '@/components/ui/SectionHeading';
import { Cell, HeadCell, Row, Table, TableHead } from '@/components/ui/Table';
import { VerdictWord } from '@/components/ui/VerdictWord';
import { formatBandwidth, formatFrequencyRange } from '@/format/frequencies';
import { formatDb, unitLabel } from '@/format/quantities';
import { DETECTOR_WORDS, PORT_WORDS } from '@/format/words';
import type { LimitSetView } from '@/schemas/bench';
import type { LimitLineView } from '@/schemas/sweep';

interface Props {
  sets: readonly LimitSetView[];
  firstHref: string | null;
  nextHref: string | null;
}

const WIDE = 'max-pad:hidden';

/** Every set with its lines: what they ask for, which edition they are from, and how sure that is. */
export function LimitSets({ sets, firstHref, nextHref }: Props) {
  const lines = sets.flatMap((set) => set.lines);
  const unsure = lines.filter(({ basis }) => basis !== 'verified').length;
  const remark =
    lines.length > 0 &&
    (unsure === 0
      ? 'every line is verified against its source'
      : `${unsure} of ${lines.length} lines are not verified`);
  return (
    <section aria-label="Limit sets" id="limits">
      <SectionHeading className="mt-6" remark={remark}>
        Limit sets
      </SectionHeading>
      <p className="t-text mt-1">
        <Link href="/limits" className="text-pen underline">
          Every line with its revisions
        </Link>
        , and uploading one, are on the limits sheet.
      </p>
      <Table caption="Limit sets and their lines" className="max-pad:[&_td]:align-top [&_td]:py-1.5!">
        <TableHead>
          <HeadCell>Detector</HeadCell>
          <HeadCell>Limit</HeadCell>
          <HeadCell className={WIDE}>Edition and source</HeadCell>
          <HeadCell className={WIDE}>Basis</HeadCell>
        </TableHead>
        {sets.map((set) => (
          <tbody key={set.id}>
            <tr>
              <th scope="rowgroup" colSpan={4} className="t-text border-b-0! pt-2! align-bottom!">
                <span className="font-semibold">{set.name}</span>
                <span className="ml-3 text-ink2">
                  {PORT_WORDS[set.port]}, revision {set.revision}
                </span>
              </th>
            </tr>
            {set.lines.map((line) => (
              <LineRow key={line.id} line={line} />
            ))}
          </tbody>
        ))}
      </Table>
      {sets.length === 0 && (
        <EmptyLine lead="No limit set is entered yet.">Nothing can be judged without one.</EmptyLine>
      )}
      <Pager firstHref={firstHref} nextHref={nextHref} />
    </section>
  );
}

function LineRow({ line }: { line: LimitLineView }) {
  const { document, source: where, revision } = line;
  const source = `${where.startsWith(document) ? where : `${document}; ${where}`}; revision ${revision}`;
  const basis = <VerdictWord verdict={line.basis === 'verified' ? 'under' : 'inconclusive'}>{line.basis}</VerdictWord>;
  return (
    <Row>
      <Cell className="align-top">
        {DETECTOR_WORDS[line.detector]}
        <span className="t-detail block whitespace-nowrap">
          RBW <span className="t-figure">{formatBandwidth(line.bandwidthHz)}</span>
        </span>
        <span className="block pad:hidden">{basis}</span>
      </Cell>
      <Cell className="align-top">
        {line.segments.map((segment) => (
          <span key={segment.startHz} className="block pad:whitespace-nowrap">
            <span className="t-figure">{formatFrequencyRange(segment.startHz, segment.stopHz)}</span>:{' '}
            <span className="t-figure">{valueOf(segment)}</span> {unitLabel(line.unit)}
            {segment.startLimit !== segment.stopLimit && <span className="text-ink2"> {SLOPES[segment.over]}</span>}
          </span>
        ))}
        <span className="t-detail block pad:hidden">{source}</span>
      </Cell>
      <Cell className={`${WIDE} align-top`} quiet>
        {source}
      </Cell>
      <Cell className={`${WIDE} align-top`}>{basis}</Cell>
    </Row>
  );
}

const SLOPES = { 'log-frequency': 'with log frequency', 'linear-frequency': 'with linear frequency' } as const;

function valueOf({ startLimit, stopLimit }: LimitLineView['segments'][number]): string {
  return startLimit === stopLimit ? formatDb(startLimit) : `${formatDb(startLimit)} to ${formatDb(stopLimit)}`;
}
