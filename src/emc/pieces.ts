/** A closed stretch of frequency. */
export interface Stretch {
  startHz: number;
  stopHz: number;
}

/**
 * Stretches cut at every edge, so that what holds at a frequency is looked up once per piece: `at[i]` lists the
 * stretches (by index) that hold edge i, `between[i]` those that hold everything between edge i and edge i + 1.
 */
export interface Pieces {
  edgesHz: Float64Array;
  at: number[][];
  between: number[][];
}

/** Throws RangeError when a stretch is empty, reversed or not a frequency range. */
export function piecesOf(stretches: readonly Stretch[], name: string): Pieces {
  for (const { startHz, stopHz } of stretches) {
    if (!(startHz > 0 && stopHz > startHz && Number.isFinite(stopHz))) {
      throw new RangeError(`${name}: ${startHz} to ${stopHz} Hz is no range.`);
    }
  }
  const edgesHz = Float64Array.from(new Set(stretches.flatMap((s) => [s.startHz, s.stopHz]))).sort();
  const holding = (fromHz: number, toHz: number) =>
    stretches.flatMap((s, index) => (s.startHz <= fromHz && s.stopHz >= toHz ? [index] : []));
  const at = Array.from(edgesHz, (hz) => holding(hz, hz));
  const between = Array.from(edgesHz, (hz, i) => (i + 1 < edgesHz.length ? holding(hz, edgesHz[i + 1]!) : []));
  return { edgesHz, at, between };
}

/** The last edge at or below a frequency, found by stepping from `near`; -1 below the first edge. */
export function edgeBelow(edgesHz: Float64Array, frequencyHz: number, near: number): number {
  let edge = near;
  while (edge + 1 < edgesHz.length && frequencyHz >= edgesHz[edge + 1]!) edge++;
  while (edge >= 0 && frequencyHz < edgesHz[edge]!) edge--;
  return edge;
}

const NONE: number[] = [];

/** Which stretches hold a frequency, given the last edge at or below it. */
export function membersAt(pieces: Pieces, edge: number, frequencyHz: number): number[] {
  if (edge < 0) return NONE;
  return (frequencyHz === pieces.edgesHz[edge] ? pieces.at[edge] : pieces.between[edge]) ?? NONE;
}
