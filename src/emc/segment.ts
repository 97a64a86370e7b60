import { isFrequency } from './axis';
import { levelsInto, POINT, preparePath, type PreparedPath } from './correction';
import type { LineUnit } from './kinds';
import { limitsInto, prepareLine, type PreparedLine } from './limitLine';
import { hangingLines } from './pairing';
import type { LimitLine, PathTerm, Trace } from './types';

// Held as locals: a bundler may turn an imported name into a getter, which a loop over a million points would feel.
const { known, notRead } = POINT;

/** A trace without its points. */
export type TraceHead = Omit<Trace, 'frequencyHz' | 'reading'>;

/** A trace ready to be judged piece by piece: its path, and the lines it hangs from when drawn, most fitting first. */
export interface HungTrace {
  path: PreparedPath;
  levelUnit: LineUnit | null;
  lines: PreparedLine[];
}

/** Throws RangeError on a path or a line that cannot be used. */
export function hangTrace(head: TraceHead, terms: readonly PathTerm[], lines: readonly LimitLine[]): HungTrace {
  const path = preparePath(head.unit, terms);
  const hanging = hangingLines(head.detector, path.levelUnit, lines);
  return { path, levelUnit: path.levelUnit, lines: hanging.map(prepareLine) };
}

/** Points of one trace with their levels, and their margins to the line they hang from. Arrays are equally long. */
export interface JudgedSegment {
  frequencyHz: Float64Array;
  /** Natural logarithm of the frequency; 0 where there is no frequency. */
  logHz: Float64Array;
  /** Meaningful where `state` is POINT.known. */
  level: Float64Array;
  /** One of POINT. */
  state: Uint8Array;
  /** Meaningful where `hasMargin` is 1. */
  marginDb: Float64Array;
  hasMargin: Uint8Array;
}

/** Natural logarithms of frequencies, leaving out what is none; false when there was any. */
export function logarithmsInto(logHz: Float64Array, frequencyHz: Float64Array): boolean {
  let all = true;
  for (let i = 0; i < frequencyHz.length; i++) {
    const hz = frequencyHz[i]!;
    // as `isFrequency` has it
    if (hz > 0 && hz < Infinity) logHz[i] = Math.log(hz);
    else all = false;
  }
  return all;
}

/**
 * Levels and margins of any run of points of a trace. The whole evaluation, a window of it and a single Working all
 * come through here, so they agree to the last bit. A point at 0 Hz, below, or at no frequency is not read.
 * @param logarithms natural logarithms of the frequencies where they are known, since traces share an axis; every
 *   frequency is one then (`onAxis`)
 */
export function judgeSegment(
  hung: HungTrace,
  frequencyHz: Float64Array,
  reading: Float32Array,
  logarithms: Float64Array | null = null,
): JudgedSegment {
  const points = frequencyHz.length;
  const logHz = logarithms ?? new Float64Array(points);
  const astray = logarithms === null && !logarithmsInto(logHz, frequencyHz);
  const level = new Float64Array(points);
  const state = new Uint8Array(points);
  levelsInto(hung.path, frequencyHz, logHz, reading, level, state);
  if (astray) for (let i = 0; i < points; i++) if (!isFrequency(frequencyHz[i]!)) state[i] = notRead;
  const marginDb = new Float64Array(points);
  const hasMargin = new Uint8Array(points);
  const limit = new Float64Array(points);
  const has = new Uint8Array(points);
  let open = points;
  for (const line of hung.lines) {
    if (open === 0) break;
    limitsInto(line, frequencyHz, logHz, limit, has);
    for (let i = 0; i < points; i++) {
      if (has[i] === 0 || hasMargin[i] === 1 || state[i] !== known) continue;
      marginDb[i] = limit[i]! - level[i]!;
      hasMargin[i] = 1;
      open--;
    }
  }
  return { frequencyHz, logHz, level, state, marginDb, hasMargin };
}
