import type { LimitLineView } from '@/schemas/sweep';
import { DETECTOR_MARKS } from '@/format/words';
import { formatTrimmed, unitLabel } from '@/format/quantities';
import { cutPolyline, limitPolylines, stepsIn, type PathPoint } from './limitPath';
import type { Span } from './scale';
import { figureWidthPx } from './textWidth';

export interface LimitLabel {
  key: string;
  /** Left edge of the text in px. */
  x: number;
  text: string;
  widthPx: number;
  /** The highest value of the line under the text, in the line's unit. */
  value: number;
}

export interface LabelPlace {
  span: Span;
  x: (hz: number) => number;
  hz: (x: number) => number;
  /** Texts end before this. */
  rightPx: number;
  sizePx: number;
  /** Stretches of x, in px, on which something already stands. */
  taken: readonly [number, number][];
}

const INDENT_PX = 8;
const CLEAR_PX = 4;

/**
 * The limit values that ride on the line: one text per stretch between two steps of any of `lines`, left-aligned in it,
 * moved right past a mark that stands there, and left out where it has no room. A mere change of slope needs no text
 * of its own. Several lines in one stretch are named by their detector: `QP 66 to 56, AV 56 to 46`.
 */
export function limitLabels(lines: readonly LimitLineView[], named: boolean, place: LabelPlace): LimitLabel[] {
  const { span, x, sizePx } = place;
  const cuts = [...new Set([span.fromHz, ...breaksOf(lines, span), span.toHz])].sort((a, b) => a - b);
  const unit = lines[0] ? unitLabel(lines[0].unit) : '';
  const labels: LimitLabel[] = [];
  for (let i = 0; i + 1 < cuts.length; i++) {
    const stretch = { fromHz: cuts[i]!, toHz: cuts[i + 1]! };
    const drawn = lines.flatMap((line) => {
      const points = limitPolylines(line, stretch)[0];
      return points ? [{ line, points }] : [];
    });
    if (drawn.length === 0) continue;
    const values = drawn
      .map(({ line, points }) => `${named ? `${DETECTOR_MARKS[line.detector]} ` : ''}${endsOf(points)}`)
      .join(', ');
    const lead = labels.length === 0 ? 'limit ' : '';
    const left = x(stretch.fromHz) + INDENT_PX;
    const right = Math.min(x(stretch.toHz), place.rightPx);
    const wordings = [`${lead}${values} ${unit}`, `${lead}${values}`, values].map((text) => ({
      text,
      widthPx: figureWidthPx(text, sizePx),
    }));
    // A shorter text that stands clear is better than a longer one under a mark.
    for (const taken of [place.taken, []]) {
      const found = wordings.find(({ widthPx }) => freeStart(left, right, widthPx, taken) !== null);
      if (!found) continue;
      const { text, widthPx } = found;
      const at = freeStart(left, right, widthPx, taken)!;
      const under = { fromHz: place.hz(at), toHz: Math.min(place.hz(at + widthPx), stretch.toHz) };
      const value = Math.max(
        ...drawn.flatMap(({ points }) => cutPolyline(points, under.fromHz, under.toHz).map((point) => point.value)),
      );
      labels.push({ key: `${drawn[0]!.line.id} ${i}`, x: at, text, widthPx, value });
      break;
    }
  }
  return labels;
}

/** Where a text begins: at the left, or behind the marks in its way; null when no place is free. */
function freeStart(left: number, right: number, width: number, taken: LabelPlace['taken']): number | null {
  const starts = [left, ...taken.map(([, end]) => end + CLEAR_PX)].filter((at) => at >= left && at + width <= right);
  return starts.sort((a, b) => a - b).find((at) => taken.every(([from, to]) => at + width <= from || at >= to)) ?? null;
}

function endsOf(points: PathPoint[]): string {
  const low = formatTrimmed(points[0]!.value, 1);
  const high = formatTrimmed(points.at(-1)!.value, 1);
  return low === high ? low : `${low} to ${high}`;
}

/** Frequencies at which any line steps, begins or ends. */
function breaksOf(lines: readonly LimitLineView[], span: Span): number[] {
  const steps = stepsIn(lines, span);
  const ends = lines.flatMap((line) =>
    limitPolylines(line, span).flatMap((points) => [points[0]!.hz, points.at(-1)!.hz]),
  );
  return [...steps, ...ends];
}
