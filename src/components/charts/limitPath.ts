import type { LimitSegment } from '@/emc/types';
import type { Span } from './scale';

/** A point of a drawn line: frequency, and a value in the unit of the axis. */
export interface PathPoint {
  hz: number;
  value: number;
}

interface Segmented {
  segments: readonly LimitSegment[];
}

/** A limit that runs with linear frequency is a curve on the log axis; so many chords stand for it. */
const CHORDS = 24;

/** The limit of one segment at a frequency inside it, by the segment's own rule. */
export function segmentAt(segment: LimitSegment, hz: number): number {
  if (segment.startLimit === segment.stopLimit || segment.stopHz === segment.startHz) return segment.startLimit;
  const share =
    segment.over === 'linear-frequency'
      ? (hz - segment.startHz) / (segment.stopHz - segment.startHz)
      : Math.log(hz / segment.startHz) / Math.log(segment.stopHz / segment.startHz);
  return segment.startLimit + share * (segment.stopLimit - segment.startLimit);
}

function segmentPoints(segment: LimitSegment, fromHz: number, toHz: number): PathPoint[] {
  const chords = segment.over === 'linear-frequency' && segment.startLimit !== segment.stopLimit ? CHORDS : 1;
  return Array.from({ length: chords + 1 }, (_, i) => {
    const hz = i === chords ? toHz : fromHz * (toHz / fromHz) ** (i / chords);
    return { hz, value: segmentAt(segment, hz) };
  });
}

/**
 * The line as it is drawn inside the span: one polyline per unbroken stretch, with both values where the limit steps.
 * Segments that do not touch leave a hole.
 */
export function limitPolylines(line: Segmented, span: Span): PathPoint[][] {
  const lines: PathPoint[][] = [];
  for (const segment of [...line.segments].sort((a, b) => a.startHz - b.startHz)) {
    const fromHz = Math.max(segment.startHz, span.fromHz);
    const toHz = Math.min(segment.stopHz, span.toHz);
    if (toHz <= fromHz) continue;
    const points = segmentPoints(segment, fromHz, toHz);
    const before = lines.at(-1);
    if (before && before.at(-1)?.hz === fromHz) before.push(...points);
    else lines.push(points);
  }
  return lines;
}

/**
 * The highest of several lines, stretch by stretch: above it a level is over whichever limit it hangs from. Lines are
 * compared in the middle of each stretch between two segment ends.
 */
export function upperEnvelope(lines: readonly Segmented[], span: Span): PathPoint[][] {
  const segments = lines.flatMap((line) => line.segments);
  const ends = segments.flatMap((segment) => [segment.startHz, segment.stopHz]);
  const cuts = [...new Set([span.fromHz, span.toHz, ...ends])]
    .filter((hz) => hz >= span.fromHz && hz <= span.toHz)
    .sort((a, b) => a - b);
  const upper: LimitSegment[] = [];
  for (let i = 0; i + 1 < cuts.length; i++) {
    const fromHz = cuts[i]!;
    const toHz = cuts[i + 1]!;
    const middle = Math.sqrt(fromHz * toHz);
    const highest = segments
      .filter((segment) => segment.startHz <= fromHz && segment.stopHz >= toHz)
      .sort((a, b) => segmentAt(b, middle) - segmentAt(a, middle))[0];
    if (!highest) continue;
    upper.push({
      startHz: fromHz,
      stopHz: toHz,
      startLimit: segmentAt(highest, fromHz),
      stopLimit: segmentAt(highest, toHz),
      over: highest.over,
    });
  }
  return limitPolylines({ segments: upper }, span);
}

/** In the margin chart every limit lies at 0, wherever there is one. */
export function flattened(polylines: PathPoint[][]): PathPoint[][] {
  return polylines.map((points) => [
    { hz: points[0]!.hz, value: 0 },
    { hz: points.at(-1)!.hz, value: 0 },
  ]);
}

/** Frequencies inside the span at which any of the lines steps. */
export function stepsIn(lines: readonly Segmented[], span: Span): number[] {
  const steps = new Set<number>();
  for (const line of lines)
    for (const points of limitPolylines(line, span))
      for (let i = 1; i < points.length; i++)
        if (points[i]!.hz === points[i - 1]!.hz && points[i]!.value !== points[i - 1]!.value) steps.add(points[i]!.hz);
  return [...steps].sort((a, b) => a - b);
}

/** The part of a polyline between two frequencies, cut on the log axis. */
export function cutPolyline(points: readonly PathPoint[], fromHz: number, toHz: number): PathPoint[] {
  const out: PathPoint[] = [];
  const between = (a: PathPoint, b: PathPoint, hz: number): PathPoint => ({
    hz,
    value: a.value + (Math.log(hz / a.hz) / Math.log(b.hz / a.hz)) * (b.value - a.value),
  });
  for (let i = 0; i < points.length; i++) {
    const point = points[i]!;
    const before = points[i - 1];
    if (before && before.hz < fromHz && point.hz > fromHz) out.push(between(before, point, fromHz));
    if (before && before.hz < toHz && point.hz > toHz) out.push(between(before, point, toHz));
    if (point.hz >= fromHz && point.hz <= toHz) out.push(point);
  }
  return out;
}

export interface Band {
  expandedDb: number;
  upper: PathPoint[];
  lower: PathPoint[];
}

/** The guard band ±U along the drawn lines, one piece per uncertainty step; nowhere where U is unknown. */
export function guardBands(
  polylines: PathPoint[][],
  uncertainty: readonly { startHz: number; stopHz: number; expandedDb: number }[],
): Band[] {
  return polylines.flatMap((points) =>
    uncertainty.flatMap((step) => {
      const middle = cutPolyline(points, step.startHz, step.stopHz);
      if (middle.length < 2) return [];
      const moved = (by: number) => middle.map(({ hz, value }) => ({ hz, value: value + by }));
      return [{ expandedDb: step.expandedDb, upper: moved(step.expandedDb), lower: moved(-step.expandedDb) }];
    }),
  );
}
