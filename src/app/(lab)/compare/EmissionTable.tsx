'use client';

import { Cell, HeadCell, KeyCell, Row, Table, TableHead } from '@/components/ui/Table';
import { VerdictWord } from '@/components/ui/VerdictWord';
import { EmptyLine } from '@/components/ui/EmptyLine';
import { formatMove } from '@/format/comparison';
import { formatFrequencyMhz } from '@/format/frequencies';
import { ABSENT, formatMargin } from '@/format/quantities';
import { DETECTOR_MARKS } from '@/format/words';
import type { ComparedEmission } from '@/schemas/comparison';

const WIDE = 'max-pad:hidden';
type Sighting = ComparedEmission['a'];

interface Props {
  id: string;
  emissions: readonly ComparedEmission[];
  names: { a: string; b: string };
  selectedRank: number | null;
  onSelect: (emission: ComparedEmission) => void;
}

/** The chart's text form: each emission with its margin in both runs and how far it moved. */
export function EmissionTable({ id, emissions, names, selectedRank, onSelect }: Props) {
  const limits = new Set(emissions.map(({ limit }) => limit)).size > 1;
  return (
    <div id={id} className="mt-4">
      <Table
        caption={`Emissions of ${names.b} beside ${names.a}, worst first`}
        className="max-pad:[&_td]:align-top max-pad:[&_th]:align-top"
      >
        <TableHead>
          <HeadCell>
            <span className="sr-only">Number</span>
          </HeadCell>
          <HeadCell figure unit="MHz">
            Frequency
          </HeadCell>
          {limits && <HeadCell className={WIDE}>Limit</HeadCell>}
          <HeadCell figure unit="dB">
            {names.a}
          </HeadCell>
          <HeadCell figure unit="dB">
            {names.b}
          </HeadCell>
          <HeadCell figure unit="dB">
            Moved by
          </HeadCell>
          <HeadCell className={WIDE}>Verdict {names.a}</HeadCell>
          <HeadCell className={WIDE}>Verdict {names.b}</HeadCell>
        </TableHead>
        <tbody>
          {emissions.map((emission) => (
            <Row key={emission.rank} chosen={emission.rank === selectedRank} onClick={() => onSelect(emission)}>
              <Cell quiet className="t-figure">
                {emission.rank}
              </Cell>
              <KeyCell className="tbl-figure">
                <button
                  type="button"
                  className="t-figure font-semibold text-pen max-pad:min-h-11"
                  aria-pressed={emission.rank === selectedRank}
                  onClick={() => onSelect(emission)}
                >
                  {formatFrequencyMhz(emission.frequencyHz)}
                </button>
                {limits && <span className="t-detail block pad:hidden">{DETECTOR_MARKS[emission.limit]} limit</span>}
              </KeyCell>
              {limits && <Cell className={WIDE}>{DETECTOR_MARKS[emission.limit]}</Cell>}
              <MarginCell sighting={emission.a} />
              <MarginCell sighting={emission.b} />
              <Cell figure strong>
                {emission.movedDb === null ? ABSENT : formatMove(emission.movedDb)}
              </Cell>
              <Cell className={WIDE}>
                <Verdict sighting={emission.a} />
              </Cell>
              <Cell className={WIDE}>
                <Verdict sighting={emission.b} />
              </Cell>
            </Row>
          ))}
        </tbody>
      </Table>
      {emissions.length === 0 && (
        <EmptyLine lead="No emission of either run can be laid beside one of the other.">
          Neither lists a candidate on a trace that both have.
        </EmptyLine>
      )}
    </div>
  );
}

function MarginCell({ sighting }: { sighting: Sighting }) {
  return (
    <Cell figure>
      {typeof sighting?.marginDb === 'number' ? formatMargin(sighting.marginDb) : ABSENT}
      <span className="mt-1 flex justify-end font-sans tracking-normal [word-spacing:normal] pad:hidden">
        <Verdict sighting={sighting} />
      </span>
    </Cell>
  );
}

/** What is no candidate of a run has a level and no verdict. */
function Verdict({ sighting }: { sighting: Sighting }) {
  if (!sighting) return <span className="text-ink2">not read</span>;
  return sighting.verdict ? <VerdictWord verdict={sighting.verdict} /> : <span className="text-ink2">not listed</span>;
}
