/** How long one scan takes: a dwell at each frequency, a time for the whole of it, or a rate. */
export type ScanTime = { dwellS: number } | { scanS: number } | { secondsPerHz: number };

/** One range that is scanned, and how. */
export interface ScanRange {
  startHz: number;
  stopHz: number;
  bandwidthHz: number;
  /** Distance of the frequencies a dwell is spent at; half the bandwidth where a plan says so. */
  step: { stepHz: number } | 'half the bandwidth';
  time: ScanTime;
}

/** A step that is short of the stop by less than this part of itself has reached it. */
const HAIR = 1e-9;

/**
 * Frequencies from start to stop, both ends included; the last step may be shorter. Throws RangeError on no range and
 * on a step that is not above 0.
 */
export function frequencyCount(startHz: number, stopHz: number, stepHz: number): number {
  if (!(startHz > 0 && stopHz > startHz && Number.isFinite(stopHz))) {
    throw new RangeError(`${startHz} to ${stopHz} Hz is no range.`);
  }
  if (!(stepHz > 0 && Number.isFinite(stepHz))) throw new RangeError(`A step of ${stepHz} Hz is none.`);
  return Math.ceil((stopHz - startHz) / stepHz - HAIR) + 1;
}

/** Seconds of one scan of a range. Throws RangeError on a range, a step, a bandwidth or a time that is none. */
export function scanSeconds({ startHz, stopHz, bandwidthHz, step, time }: ScanRange): number {
  if (!(bandwidthHz > 0 && Number.isFinite(bandwidthHz))) {
    throw new RangeError(`A bandwidth of ${bandwidthHz} Hz is none.`);
  }
  const points = frequencyCount(startHz, stopHz, step === 'half the bandwidth' ? bandwidthHz / 2 : step.stepHz);
  if ('dwellS' in time) return points * someOf(time.dwellS, 'dwell');
  if ('scanS' in time) return someOf(time.scanS, 'scan');
  return (stopHz - startHz) * someOf(time.secondsPerHz, 'rate per hertz');
}

/** Seconds as given. Throws RangeError below zero, naming what they are of. */
export function secondsOf(seconds: number, of: string): number {
  if (seconds >= 0 && Number.isFinite(seconds)) return seconds;
  throw new RangeError(`${seconds} s is no time (${of}).`);
}

function someOf(seconds: number, of: string): number {
  if (secondsOf(seconds, of) > 0) return seconds;
  throw new RangeError(`0 s is no time (${of}).`);
}
