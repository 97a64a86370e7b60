import type { BandPart } from './cisprBands';
import { BANDWIDTH_TOLERANCE, bandwidthRequiredOrNarrower, bandwidthRequiredOrWider, widestAt6DbHz } from './detectors';
import type { Interval } from './intervals';
import type { Detector } from './kinds';
import { stated, type BandwidthFinding, type VideoBandwidthFinding } from './receiverFinding';

/** A receiver's resolution filter. */
export interface Filter {
  /** Resolution bandwidth; null when not known. */
  rbwHz: number | null;
  /** How far down it is measured; not stated counts as 6 dB, which is how CISPR 16-1-1 states its bandwidths. */
  rbwShape: '6 dB' | '3 dB' | null;
  /** null where nobody has said how the filter is shaped */
  shape: 'gaussian' | null;
}

/**
 * The RBW against the band's, within 1 %. A Gaussian stated 3 dB down is 1.414 times as wide 6 dB down and judged by
 * that; of any other filter stated so it is only known that it is wider 6 dB down, so it fails where its RBW is already
 * too wide and is unknown otherwise. Source: CISPR 16-1-1:2019 Table 1. Throws RangeError on an RBW of zero or less.
 */
export function bandwidthFinding({ band, fromHz, toHz }: BandPart, filter: Filter): BandwidthFinding {
  const rbwHz = stated('RBW', filter.rbwHz, 'Hz');
  const askedHz = band?.bandwidthHz ?? null;
  const sure = filter.rbwShape !== '3 dB' || filter.shape === 'gaussian';
  const at6DbHz = sure ? widestAt6DbHz({ detector: 'unknown', rbwHz, rbwShape: filter.rbwShape }) : null;
  const found = (outcome: BandwidthFinding['outcome'], because: string | null): BandwidthFinding => ({
    what: 'bandwidth',
    fromHz,
    toHz,
    outcome,
    figures: { rbwHz, at6DbHz, askedHz },
    because,
    source: 'CISPR 16-1-1:2019 Table 1',
  });
  if (askedHz === null) return found('unknown', 'CISPR 16-1-1 has no band here.');
  if (rbwHz === null) return found('unknown', 'The RBW is not known.');
  if (!bandwidthRequiredOrNarrower(rbwHz, askedHz)) return found('fails', null);
  if (at6DbHz === null) return found('unknown', 'How wide the filter is 6 dB down is not known.');
  const asAsked = bandwidthRequiredOrNarrower(at6DbHz, askedHz) && bandwidthRequiredOrWider(at6DbHz, askedHz);
  return found(asAsked ? 'ok' : 'fails', null);
}

const VBW_PER_RBW = 3;

/**
 * VBW of at least three times the RBW, within 1 %, which a peak needs; null for other detectors, of which it is not
 * asked. Source: UN Regulation No. 10 Annex 7. Throws RangeError on a bandwidth of zero or less.
 */
export function videoBandwidthFinding(
  range: Interval,
  detector: Detector,
  rbwHz: number | null,
  vbwHz: number | null,
): VideoBandwidthFinding | null {
  if (detector !== 'peak') return null;
  const leastHz = stated('RBW', rbwHz, 'Hz') === null ? null : VBW_PER_RBW * rbwHz!;
  const known = stated('VBW', vbwHz, 'Hz') !== null && leastHz !== null;
  const enough = known && vbwHz! >= leastHz * (1 - BANDWIDTH_TOLERANCE);
  return {
    what: 'video-bandwidth',
    fromHz: range.fromHz,
    toHz: range.toHz,
    outcome: known ? (enough ? 'ok' : 'fails') : 'unknown',
    figures: { vbwHz, leastHz },
    because: known ? null : `The ${leastHz === null ? 'RBW' : 'VBW'} is not known.`,
    source: 'UN Regulation No. 10 Annex 7',
  };
}
