'use client';

import { Cell, Row, Table } from '@/components/ui/Table';
import { VerdictGlyph } from '@/components/ui/VerdictGlyph';
import { formatFrequencyKhz, formatFrequencyMhz } from '@/format/frequencies';
import type { CandidateView } from '@/schemas/sweep';
import { candidateRemark, type CandidateFigures, type CandidateFrame } from './candidateColumns';
import { MarginFigure } from './MarginFigure';

interface Props extends CandidateFigures {
  candidates: readonly CandidateView[];
  frame: CandidateFrame;
  selectedRank: number | null;
  onSelect: (candidate: CandidateView) => void;
  clockHz: number | null;
}

/** On a phone: glyph, frequency, remark and margin; a row picks, its figure opens the working. */
export function CandidateList({ candidates, frame, selectedRank, onSelect, open, onFigure, clockHz }: Props) {
  const kHz = frame.frequencyUnit === 'kHz';
  return (
    <Table caption="Candidates, worst first" className="table-fixed">
      <colgroup>
        <col className="w-7" />
        <col className="w-[6.25rem]" />
        <col />
        <col className="w-[6.25rem]" />
      </colgroup>
      <thead className="sr-only">
        <tr>
          <th scope="col">Verdict</th>
          <th scope="col">Frequency, {frame.frequencyUnit}</th>
          <th scope="col">Remark</th>
          <th scope="col">Margin, dB</th>
        </tr>
      </thead>
      <tbody>
        {candidates.map((candidate) => (
          <Row
            key={candidate.rank}
            chosen={candidate.rank === selectedRank}
            onClick={() => onSelect(candidate)}
            className="cursor-pointer"
          >
            <Cell className="pl-1">
              <VerdictGlyph verdict={candidate.verdict} label />
            </Cell>
            <Cell figure>
              {kHz ? formatFrequencyKhz(candidate.frequencyHz) : formatFrequencyMhz(candidate.frequencyHz)}
            </Cell>
            <Cell quiet className="truncate">
              {candidateRemark(candidate, clockHz, frame.stepHz)}
            </Cell>
            <Cell className="text-right" onClick={(event) => event.stopPropagation()}>
              <MarginFigure candidate={candidate} open={open} onFigure={onFigure} />
            </Cell>
          </Row>
        ))}
      </tbody>
    </Table>
  );
}
