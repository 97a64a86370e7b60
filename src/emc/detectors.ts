import type { Detector, LineDetector } from './kinds';

/** How a trace was read. */
export interface ReadWith {
  detector: Detector;
  /** Resolution bandwidth; null when not known. */
  rbwHz: number | null;
  /** Video bandwidth where it is stated. */
  vbwHz?: number | null;
  /** How far down the RBW is measured; not stated counts as 6 dB. */
  rbwShape?: '6 dB' | '3 dB' | null;
}

/** What a line asks for. */
export interface AskedFor {
  detector: LineDetector;
  bandwidthHz: number;
}

/** Bandwidths within 1 % of one another count as equal: printed settings are rounded, filters are made to far less. */
export const BANDWIDTH_TOLERANCE = 0.01;

/**
 * Place in the order average <= quasi-peak <= peak, which holds for one signal in one bandwidth (CISPR 16-1-1,
 * detector definitions). Average is the linear average alone. Log or video averages, RMS-average, sample, negative
 * peak and unknown detectors have no place: they prove nothing, and the answer is null.
 */
export function detectorOrder(detector: Detector): number | null {
  if (detector === 'average') return 0;
  if (detector === 'quasi-peak') return 1;
  if (detector === 'peak') return 2;
  return null;
}

/** Width of a Gaussian filter 6 dB down beside its width 3 dB down: √(6 dB / 3 dB) = 1.414. Source: |H|² = exp(−a·f²). */
export const GAUSSIAN_6DB_PER_3DB = Math.SQRT2;

/**
 * True when a VBW is stated that is narrower than the RBW: a peak or quasi-peak reading behind it is a video average,
 * which can lie below any of the detectors. An average stays an average.
 */
export function isVideoAverage({ detector, rbwHz, vbwHz }: ReadWith): boolean {
  if (detector !== 'peak' && detector !== 'quasi-peak') return false;
  return rbwHz !== null && typeof vbwHz === 'number' && vbwHz < rbwHz * (1 - BANDWIDTH_TOLERANCE);
}

/**
 * The widest the filter can be 6 dB down, which is how a line's bandwidth is stated: 1.41 times the RBW for a filter
 * stated at 3 dB, taken as Gaussian. Null when the RBW is not known.
 */
export function widestAt6DbHz({ rbwHz, rbwShape }: ReadWith): number | null {
  return rbwHz !== null && rbwShape === '3 dB' ? rbwHz * GAUSSIAN_6DB_PER_3DB : rbwHz;
}

/** True when a level under the line, read this way, shows that the line's own detector would read under it too. */
export function provesUnder(trace: ReadWith, line: AskedFor): boolean {
  if (isVideoAverage(trace)) return false;
  // A filter stated at 3 dB is at least as wide 6 dB down, whatever its shape: the RBW itself is what is certain.
  return detectorAtOrAbove(trace.detector, line.detector) && bandwidthRequiredOrWider(trace.rbwHz, line.bandwidthHz);
}

/** True when a level over the line, read this way, shows that the line's own detector would read over it too. */
export function provesOver(trace: ReadWith, line: AskedFor): boolean {
  if (isVideoAverage(trace)) return false;
  const widestHz = widestAt6DbHz(trace);
  return detectorAtOrBelow(trace.detector, line.detector) && bandwidthRequiredOrNarrower(widestHz, line.bandwidthHz);
}

/**
 * True when the trace was read with the line's own detector in the bandwidth the line asks for, which is stated at
 * 6 dB: a filter stated at 3 dB is never that one.
 */
export function readAsAsked(trace: ReadWith, line: AskedFor): boolean {
  if (trace.rbwShape === '3 dB') return false;
  return trace.detector === line.detector && provesUnder(trace, line) && provesOver(trace, line);
}

export function detectorAtOrAbove(detector: Detector, asked: LineDetector): boolean {
  const order = detectorOrder(detector);
  return order !== null && order >= detectorOrder(asked)!;
}

export function detectorAtOrBelow(detector: Detector, asked: LineDetector): boolean {
  const order = detectorOrder(detector);
  return order !== null && order <= detectorOrder(asked)!;
}

export function bandwidthRequiredOrWider(rbwHz: number | null, requiredHz: number): boolean {
  return rbwHz !== null && rbwHz >= requiredHz * (1 - BANDWIDTH_TOLERANCE);
}

export function bandwidthRequiredOrNarrower(rbwHz: number | null, requiredHz: number): boolean {
  return rbwHz !== null && rbwHz > 0 && rbwHz <= requiredHz * (1 + BANDWIDTH_TOLERANCE);
}
