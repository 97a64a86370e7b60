import type { CandidateView } from '@/schemas/sweep';
import type { ChartMode } from './marginSeries';
import type { Mark } from './placeLabels';
import type { PlotScale, Span } from './scale';
import { figureWidthPx } from './textWidth';

/** Value of a candidate on the y axis: dB over its own limit, or its level. */
export function candidateValue(candidate: CandidateView, mode: ChartMode): number {
  return mode === 'margin' ? 0 - candidate.marginDb : candidate.level;
}

/** The candidates inside the span, as marks in px; the thread's other end is `limitY`. */
export function candidateMarks(
  candidates: readonly CandidateView[],
  span: Span,
  scale: PlotScale,
  mode: ChartMode,
  selectedRank: number | null,
): (Mark & { candidate: CandidateView; limitY: number })[] {
  const inside = (y: number) => Math.min(scale.bottom, Math.max(scale.top, y));
  return candidates
    .filter(({ frequencyHz }) => frequencyHz >= span.fromHz && frequencyHz <= span.toHz)
    .map((candidate) => ({
      candidate,
      id: candidate.rank,
      x: scale.x(candidate.frequencyHz),
      y: inside(scale.y(candidateValue(candidate, mode))),
      limitY: inside(scale.y(mode === 'margin' ? 0 : candidate.limit)),
      side: candidate.marginDb < 0 ? ('above' as const) : ('below' as const),
      width: figureWidthPx(String(candidate.rank), 12.5),
      ringed: candidate.rank === selectedRank,
    }));
}

/** The candidate after or before a frequency, in order of frequency; null past the last one. */
export function neighbour(
  candidates: readonly CandidateView[],
  at: { hz: number; rank: number | null },
  direction: 1 | -1,
): CandidateView | null {
  const order = [...candidates].sort((a, b) => a.frequencyHz - b.frequencyHz || a.rank - b.rank);
  const here = order.findIndex((candidate) => candidate.rank === at.rank);
  if (here >= 0) return order[here + direction] ?? null;
  return direction === 1
    ? (order.find((candidate) => candidate.frequencyHz > at.hz) ?? null)
    : (order.filter((candidate) => candidate.frequencyHz < at.hz).at(-1) ?? null);
}
