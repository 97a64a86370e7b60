import { formatBandwidth, formatFrequencyRange } from '@/format/frequencies';
import { formatDb, formatDistance, unitLabel } from '@/format/quantities';
import { DETECTOR_WORDS } from '@/format/words';
import type { LimitLineSummary } from '@/schemas/tables';

/** The basis of a line takes the position of a verdict: only what was checked against its source is settled. */
export const basisVerdict = (basis: string) => (basis === 'verified' ? ('under' as const) : ('inconclusive' as const));

type Segment = LimitLineSummary['segments'][number];
const SLOPES = { 'log-frequency': 'log frequency', 'linear-frequency': 'frequency' } as const;

/** `40.0 dBµV/m`, or `66.0 to 56.0 dBµV, straight in log frequency`. */
export function segmentValue({ startLimit, stopLimit, over }: Segment, unit: LimitLineSummary['unit']): string {
  if (startLimit === stopLimit) return `${formatDb(startLimit)} ${unitLabel(unit)}`;
  return `${formatDb(startLimit)} to ${formatDb(stopLimit)} ${unitLabel(unit)}, straight in ${SLOPES[over]}`;
}

/** `quasi-peak, RBW 120 kHz, dBµV/m at 3 m`. */
export function lineConditions(
  line: Pick<LimitLineSummary, 'detector' | 'bandwidthHz' | 'unit' | 'distanceM'>,
): string {
  const distance = line.distanceM === null ? '' : ` at ${formatDistance(line.distanceM)}`;
  return `${DETECTOR_WORDS[line.detector]}, RBW ${formatBandwidth(line.bandwidthHz)}, ${unitLabel(line.unit)}${distance}`;
}

export function lineRange({ segments }: Pick<LimitLineSummary, 'segments'>): string {
  return formatFrequencyRange(
    Math.min(...segments.map(({ startHz }) => startHz)),
    Math.max(...segments.map(({ stopHz }) => stopHz)),
  );
}
