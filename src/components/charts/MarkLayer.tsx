'use client';

import type { CandidateView } from '@/schemas/sweep';
import type { LineUnit } from '@/emc/kinds';
import type { candidateMarks } from './candidateMarks';
import { FIGURE, HALO, VERDICT_MARKS } from './chartText';
import { describeCandidate } from './describeChart';
import type { PlacedLabel } from './placeLabels';
import type { PlotScale } from './scale';

type PlacedMark = ReturnType<typeof candidateMarks>[number];

interface Props {
  marks: PlacedMark[];
  labels: PlacedLabel[];
  floors: { key: string; path: string; verdict: CandidateView['verdict'] }[];
  scale: PlotScale;
  unit: LineUnit;
  selectedRank: number | null;
  /** The one mark in the tab order; the arrow keys reach the others. */
  tabRank: number | null;
  onFocusMark: (candidate: CandidateView) => void;
}

/** Every candidate on its thread, its verdict's square at the end, its number beside it. */
export function MarkLayer({ marks, labels, floors, scale, unit, selectedRank, tabRank, onFocusMark }: Props) {
  // The worst is painted last and lies on top.
  const painted = [...marks].sort((a, b) => b.id - a.id);
  return (
    <>
      <g aria-hidden="true" fill="none">
        {floors.map((floor) => (
          <path
            key={floor.key}
            d={floor.path}
            className={VERDICT_MARKS[floor.verdict].colour}
            stroke="currentColor"
            strokeWidth="3"
            strokeOpacity="0.6"
            strokeLinejoin="round"
          />
        ))}
        {painted.map((mark) => (
          <path
            key={mark.id}
            d={`M${mark.x} ${mark.limitY}V${mark.y}`}
            className={VERDICT_MARKS[mark.candidate.verdict].colour}
            stroke="currentColor"
            strokeWidth="1.4"
          />
        ))}
      </g>
      {painted.map((mark) => (
        <g
          key={mark.id}
          role="button"
          tabIndex={mark.id === tabRank ? 0 : -1}
          data-rank={mark.id}
          aria-label={describeCandidate(mark.candidate, unit)}
          aria-pressed={mark.id === selectedRank}
          onFocus={() => onFocusMark(mark.candidate)}
          className={`group cursor-pointer outline-none ${VERDICT_MARKS[mark.candidate.verdict].colour}`}
        >
          <rect x={mark.x - 9} y={mark.y - 9} width="18" height="18" fill="transparent" />
          <Square mark={mark} />
          <rect
            x={mark.x - 9}
            y={mark.y - 9}
            width="18"
            height="18"
            fill="none"
            strokeWidth={mark.ringed ? 1.6 : 0}
            className="stroke-pen group-focus-visible:[stroke-width:2.2px]"
          />
        </g>
      ))}
      <g aria-hidden="true" fontSize="12.5" fontWeight="600" strokeWidth="5" className="pointer-events-none">
        {labels.map((label) => (
          <text
            key={label.id}
            x={label.x}
            y={Math.min(label.y, scale.bottom - 2)}
            textAnchor="middle"
            fill="currentColor"
            className={`${FIGURE} ${HALO} ${VERDICT_MARKS[marks.find((mark) => mark.id === label.id)!.candidate.verdict].colour}`}
          >
            {label.id}
          </text>
        ))}
      </g>
    </>
  );
}

/** 7 px: solid when decided; open, with the sheet inside, when not. */
function Square({ mark }: { mark: PlacedMark }) {
  if (VERDICT_MARKS[mark.candidate.verdict].solid)
    return <rect x={mark.x - 4} y={mark.y - 4} width="8" height="8" fill="currentColor" />;
  return (
    <rect
      x={mark.x - 3}
      y={mark.y - 3}
      width="6"
      height="6"
      stroke="currentColor"
      strokeWidth="1.7"
      className="fill-sheet"
    />
  );
}
