import type { Detector, LineDetector } from './kinds';

/** How a trace was read. */
export interface ReadWith {
  detector: Detector;
  /** Resolution bandwidth; null when not known. */
  rbwHz: number | null;
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

/** True when a level under the line, read this way, shows that the line's own detector would read under it too. */
export function provesUnder(trace: ReadWith, line: AskedFor): boolean {
  return detectorAtOrAbove(trace.detector, line.detector) && bandwidthRequiredOrWider(trace.rbwHz, line.bandwidthHz);
}

/** True when a level over the line, read this way, shows that the line's own detector would read over it too. */
export function provesOver(trace: ReadWith, line: AskedFor): boolean {
  return detectorAtOrBelow(trace.detector, line.detector) && bandwidthRequiredOrNarrower(trace.rbwHz, line.bandwidthHz);
}

/** True when the trace was read with the line's own detector in the bandwidth the line asks for. */
export function readAsAsked(trace: ReadWith, line: AskedFor): boolean {
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
