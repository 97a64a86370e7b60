import { bandwidthFinding, videoBandwidthFinding, type Filter } from './bandwidthCheck';
import { bandParts } from './cisprBands';
import { detectorFinding } from './detectorCheck';
import type { Interval } from './intervals';
import type { Detector, LineDetector } from './kinds';
import { type AverageKind, type OverloadFinding, type ReceiverFinding } from './receiverFinding';
import { stepFinding } from './stepCheck';
import { dwellFinding, dwellOfSweepS, pulsePeriodFinding, scanTimeFinding } from './timeCheck';

/** One stretch of a sweep with one set of settings. null is what nobody has stated. */
export interface SegmentSettings extends Filter {
  startHz: number;
  stopHz: number;
  detector: Detector;
  averageKind: AverageKind | null;
  vbwHz: number | null;
  /** The largest step between two points. */
  stepHz: number | null;
  /** Time at each point of a stepped scan. */
  dwellS: number | null;
  /** Time of the whole segment at an even rate. */
  scanTimeS: number | null;
  /** Longest period of the pulses that are to be caught. */
  pulsePeriodS: number | null;
  /** Highest level at the receiver's input over the segment, before any factor. */
  highestInputDbuv: number | null;
  /** Greatest level the input is stated to take at its attenuation. */
  greatestInputDbuv: number | null;
}

/**
 * Every check of one swept segment against a line's detector; bandwidth, dwell and scan time once per CISPR band it runs
 * through. Segments are judged one by one, so the edge that two of them repeat is each one's own. Where no dwell is
 * stated it is the time the sweep stays within its RBW, if that is known. Throws RangeError on a figure that is none.
 */
export function receiverFindings(segment: SegmentSettings, asked: LineDetector): ReceiverFinding[] {
  const { startHz, stopHz, detector, rbwHz, scanTimeS } = segment;
  const range: Interval = { fromHz: startHz, toHz: stopHz };
  const spanHz = stopHz - startHz;
  const swept = scanTimeS === null || rbwHz === null ? null : dwellOfSweepS(scanTimeS, spanHz, rbwHz);
  const dwellS = segment.dwellS ?? swept;
  const perBand = bandParts(startHz, stopHz).flatMap((part) => {
    const shareS = scanTimeS === null ? null : (scanTimeS * (part.toHz - part.fromHz)) / spanHz;
    return [
      bandwidthFinding(part, segment),
      dwellFinding(part, detector, dwellS),
      scanTimeFinding(part, detector, shareS),
    ];
  });
  const video = videoBandwidthFinding(range, detector, rbwHz, segment.vbwHz);
  return [
    ...perBand,
    stepFinding(range, segment.stepHz, segment),
    pulsePeriodFinding(range, dwellS, segment.pulsePeriodS),
    ...(video ? [video] : []),
    detectorFinding(range, detector, segment.averageKind, asked),
    overloadFinding(range, segment.highestInputDbuv, segment.greatestInputDbuv),
  ];
}

/**
 * The highest level at the input against the greatest it is stated to take, both in dBµV before any factor: at or above
 * it the reading is not to be trusted. Below it nothing is proven about energy outside the segment. Source: common
 * practice. Throws RangeError on a level that is not finite.
 */
export function overloadFinding(
  { fromHz, toHz }: Interval,
  highestDbuv: number | null,
  greatestDbuv: number | null,
): OverloadFinding {
  for (const level of [highestDbuv, greatestDbuv]) {
    if (level !== null && !Number.isFinite(level)) throw new RangeError(`${level} dBuV is no level.`);
  }
  const known = highestDbuv !== null && greatestDbuv !== null;
  return {
    what: 'overload',
    fromHz,
    toHz,
    outcome: known ? (highestDbuv < greatestDbuv ? 'ok' : 'fails') : 'unknown',
    figures: { highestDbuv, greatestDbuv },
    because: known ? null : `The ${greatestDbuv === null ? 'greatest' : 'highest'} input level is not stated.`,
    source: "Common practice: the receiver's own greatest input level",
  };
}
