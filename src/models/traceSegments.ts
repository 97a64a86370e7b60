import { packAxis, packLevels, type PackedValues } from './tracePacking';

/** 32768 points: even unpacked an axis row is 256 KiB and a level row 128 KiB, both below the 512 KiB of a blob row. */
export const SEGMENT_POINTS = 32768;

/** One stretch of a sweep as it is stored: its axis once, and the levels of each trace. */
export interface Segment {
  firstIndex: number;
  points: number;
  lowHz: number;
  highHz: number;
  /** Start and step where every index reproduces its frequency exactly; then there is no axis. */
  even: { startHz: number; stepHz: number } | null;
  axis: PackedValues | null;
  traces: { index: number; lowLevel: number | null; highLevel: number | null; levels: PackedValues }[];
}

/** Start and step when every index reproduces its frequency exactly, else null. */
export function evenAxis(frequencyHz: Float64Array): { startHz: number; stepHz: number } | null {
  if (frequencyHz.length < 2) return null;
  const startHz = frequencyHz[0]!;
  const stepHz = frequencyHz[1]! - startHz;
  for (let i = 0; i < frequencyHz.length; i++) if (frequencyHz[i] !== startHz + i * stepHz) return null;
  return { startHz, stepHz };
}

/** Lowest and highest finite value; null when there is none. */
function extremes(values: Float64Array | Float32Array): [number, number] | [null, null] {
  let low = Infinity;
  let high = -Infinity;
  for (let i = 0; i < values.length; i++) {
    const value = values[i]!;
    if (!Number.isFinite(value)) continue;
    if (value < low) low = value;
    if (value > high) high = value;
  }
  return low <= high ? [low, high] : [null, null];
}

/** Cuts a sweep into the rows it is stored in, in file order. Yields after each. */
export function* segmentsOf(
  frequencyHz: Float64Array,
  traces: readonly { index: number; levels: Float32Array }[],
): Generator<void, Segment[]> {
  const segments: Segment[] = [];
  for (let at = 0; at < frequencyHz.length; at += SEGMENT_POINTS) {
    const axis = frequencyHz.subarray(at, at + SEGMENT_POINTS);
    const [lowHz, highHz] = extremes(axis);
    const even = evenAxis(axis);
    segments.push({
      firstIndex: at,
      points: axis.length,
      lowHz: lowHz ?? 0,
      highHz: highHz ?? 0,
      even,
      axis: even ? null : packAxis(axis),
      traces: traces.map(({ index, levels }) => {
        const part = levels.subarray(at, at + SEGMENT_POINTS);
        const [lowLevel, highLevel] = extremes(part);
        return { index, lowLevel, highLevel, levels: packLevels(part) };
      }),
    });
    yield;
  }
  return segments;
}
