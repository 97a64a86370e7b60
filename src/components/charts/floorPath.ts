import type { CandidateView, WindowView } from '@/schemas/sweep';
import { candidateValue } from './candidateMarks';
import { columnValues, type ChartMode } from './marginSeries';
import type { PlotScale, Span } from './scale';

/**
 * The bar of a floor candidate: along the upper edge of its trace from one end of its range to the other, with a short
 * upright at each end. Where no column lies in the range it is level at the candidate's own value.
 */
export function floorPath(
  candidate: CandidateView,
  window: WindowView | null,
  span: Span,
  scale: PlotScale,
  mode: ChartMode,
): string {
  const fromHz = Math.max(candidate.fromHz, span.fromHz);
  const toHz = Math.min(candidate.toHz, span.toHz);
  if (toHz <= fromHz) return '';
  const inside = (y: number) => Math.min(scale.bottom, Math.max(scale.top, y));
  const trace = window?.traces.find(({ index }) => index === candidate.traceIndex);
  const points: [number, number][] = [];
  for (let i = 0; i < (trace?.frequencyHz.length ?? 0); i++) {
    const hz = trace!.frequencyHz[i]!;
    if (hz < fromHz || hz > toHz) continue;
    const values = columnValues(trace!, i, mode);
    if (values) points.push([scale.x(hz), inside(scale.y(values.high))]);
  }
  if (points.length < 2) {
    const y = inside(scale.y(candidateValue(candidate, mode)));
    points.splice(0, points.length, [scale.x(fromHz), y], [scale.x(toHz), y]);
  }
  const [firstX, firstY] = points[0]!;
  const [lastX, lastY] = points.at(-1)!;
  const along = points.map(([x, y]) => `${x} ${y - 3}`).join('L');
  return `M${firstX} ${firstY + 3}V${firstY - 3}L${along}M${lastX} ${lastY - 3}v6`;
}

/**
 * Floors of several traces against one line often cover one another. Of each line's stretch only the worst is drawn:
 * the candidates cut to where no worse one of the same line stands.
 */
export function floorsOnce(candidates: readonly CandidateView[]): CandidateView[] {
  const drawn: CandidateView[] = [];
  const floors = candidates.filter(({ kind }) => kind === 'floor').sort((one, other) => one.rank - other.rank);
  for (const floor of floors) {
    let left: Span[] = [{ fromHz: floor.fromHz, toHz: floor.toHz }];
    for (const worse of drawn.filter(({ lineId }) => lineId === floor.lineId)) {
      left = left.flatMap(({ fromHz, toHz }) =>
        [
          { fromHz, toHz: Math.min(toHz, worse.fromHz) },
          { fromHz: Math.max(fromHz, worse.toHz), toHz },
        ].filter((part) => part.toHz > part.fromHz),
      );
    }
    drawn.push(...left.map((part) => ({ ...floor, ...part })));
  }
  return drawn;
}
