import type { Detector, LineUnit, Polarisation } from './kinds';

/** What runs have to share for their levels to be compared. */
export interface HoldConditions {
  state: string;
  mode: string;
  distanceM: number | null;
  bandwidthHz: number;
  detector: Detector;
  unit: LineUnit;
}

/** Corrected levels of one run with the place it was read at. Frequencies ascend; an edge may stand twice. */
export interface HeldTrace extends HoldConditions {
  name: string;
  polarisation: Polarisation | null;
  heightM: number | null;
  azimuthDeg: number | null;
  frequencyHz: Float64Array;
  levelDb: Float64Array;
  /** 1 where there is a level. */
  has: Uint8Array;
}

/** One entry per frequency, ascending; `trace` and `point` say where each maximum came from. */
export interface MaximumHold {
  frequencyHz: Float64Array;
  levelDb: Float64Array;
  trace: Int32Array;
  point: Int32Array;
  /** How many points were compared here. */
  compared: Int32Array;
}

const CONDITIONS = {
  state: 'state',
  mode: 'operating mode',
  distanceM: 'distance in m',
  bandwidthHz: 'bandwidth in Hz',
  detector: 'detector',
  unit: 'unit',
} as const satisfies Record<keyof HoldConditions, string>;

/**
 * Maximum of corrected levels over polarisations, heights and azimuths (common practice). Only traces of one state,
 * mode, distance, bandwidth, detector and unit are held together; else `hold` is null and `because` says what differs.
 * Points of different traces are compared when they lie less than half a step apart, by the finer step of the two at
 * that place; a point that meets no other stands for itself. Nothing is interpolated: each entry is a level that was
 * read, at the frequency it was read at. The order of the traces decides only between equal levels: the first stands.
 * Throws RangeError on no traces, arrays of different lengths, frequencies that are none or fall, and a level that is
 * not finite.
 */
export function maximumHold(
  traces: readonly HeldTrace[],
): { hold: MaximumHold; because: null } | { hold: null; because: string } {
  const [first, ...others] = traces;
  if (!first) throw new RangeError('A maximum needs at least one trace.');
  traces.forEach(checkTrace);
  for (const other of others) {
    for (const key of Object.keys(CONDITIONS) as (keyof HoldConditions)[]) {
      if (other[key] === first[key]) continue;
      const said = (trace: HeldTrace) => `${trace[key] ?? 'not stated'} in ${trace.name}`;
      return { hold: null, because: `The ${CONDITIONS[key]} differs: ${said(first)}, ${said(other)}.` };
    }
  }
  return { hold: held(traces), because: null };
}

interface Point {
  hz: number;
  levelDb: number;
  stepHz: number;
  trace: number;
  point: number;
}

function held(traces: readonly HeldTrace[]): MaximumHold {
  const points = traces.flatMap((trace, at) => pointsOf(trace, at));
  // The finer step first, so that what is at one frequency stays together whatever the order of the traces.
  points.sort((a, b) => a.hz - b.hz || a.stepHz - b.stepHz || a.trace - b.trace || a.point - b.point);
  const maxima: { best: Point; compared: number }[] = [];
  for (let from = 0; from < points.length;) {
    const startHz = points[from]!.hz;
    let best = points[from]!;
    let stepHz = best.stepHz;
    let to = from + 1;
    for (; to < points.length; to++) {
      const next = points[to]!;
      stepHz = Math.min(stepHz, next.stepHz);
      if (next.hz !== startHz && !(next.hz - startHz < stepHz / 2)) break;
      if (next.levelDb > best.levelDb || (next.levelDb === best.levelDb && next.trace < best.trace)) best = next;
    }
    maxima.push({ best, compared: to - from });
    from = to;
  }
  return {
    frequencyHz: Float64Array.from(maxima, ({ best }) => best.hz),
    levelDb: Float64Array.from(maxima, ({ best }) => best.levelDb),
    trace: Int32Array.from(maxima, ({ best }) => best.trace),
    point: Int32Array.from(maxima, ({ best }) => best.point),
    compared: Int32Array.from(maxima, ({ compared }) => compared),
  };
}

/** The points that have a level, with the smaller of the steps to their neighbours; a lone point has a step of 0. */
function pointsOf({ frequencyHz, levelDb, has }: HeldTrace, trace: number): Point[] {
  const points: Point[] = [];
  for (let i = 0; i < frequencyHz.length; i++) {
    if (!has[i]) continue;
    const hz = frequencyHz[i]!;
    let [below, above] = [i - 1, i + 1];
    while (frequencyHz[below] === hz) below--;
    while (frequencyHz[above] === hz) above++;
    const stepHz = Math.min(hz - (frequencyHz[below] ?? -Infinity), (frequencyHz[above] ?? Infinity) - hz);
    points.push({ hz, levelDb: levelDb[i]!, stepHz: stepHz === Infinity ? 0 : stepHz, trace, point: i });
  }
  return points;
}

function checkTrace({ name, frequencyHz, levelDb, has }: HeldTrace): void {
  if (levelDb.length !== frequencyHz.length || has.length !== frequencyHz.length) {
    throw new RangeError(`${name} holds ${frequencyHz.length} frequencies and ${levelDb.length} levels.`);
  }
  frequencyHz.forEach((hz, i) => {
    if (!(hz > 0 && hz < Infinity)) throw new RangeError(`${name}: ${hz} Hz is no frequency.`);
    if (i > 0 && hz < frequencyHz[i - 1]!) throw new RangeError(`${name}: ${hz} Hz follows ${frequencyHz[i - 1]} Hz.`);
    if (has[i] && !Number.isFinite(levelDb[i])) throw new RangeError(`${name}: ${levelDb[i]} at ${hz} Hz is no level.`);
  });
}
