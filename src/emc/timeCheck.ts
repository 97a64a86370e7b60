import type { BandPart } from './cisprBands';
import type { Interval } from './intervals';
import type { Detector } from './kinds';
import {
  stated,
  type DwellFinding,
  type Outcome,
  type PulsePeriodFinding,
  type ScanTimeFinding,
} from './receiverFinding';

/** Weights pulses down to 5 Hz. Source: spectrum analyser user manual; UN Regulation No. 10 Annex 7 asks the same. */
const QUASI_PEAK_DWELL_S = 1;

/**
 * Time at one frequency against the least: 1 s for quasi-peak, otherwise the band's of CISPR 16-2-1 and 16-2-3 (from
 * memory). Throws RangeError on a time of zero or less.
 */
export function dwellFinding(part: BandPart, detector: Detector, dwellS: number | null): DwellFinding {
  const quasiPeak = detector === 'quasi-peak';
  const leastS = quasiPeak ? QUASI_PEAK_DWELL_S : (part.band?.leastDwellS ?? null);
  return {
    what: 'dwell',
    ...atLeast(part, stated('Dwell', dwellS, 's'), leastS, {
      notStated: 'The dwell time is not stated.',
      notAsked: 'The table of least measurement times has no band here.',
    }),
    figures: { dwellS, leastS },
    source: quasiPeak
      ? 'UN Regulation No. 10 Annex 7; spectrum analyser user manual'
      : 'CISPR 16-2-1 and 16-2-3, least measurement times',
  };
}

/**
 * Time a scan spends on one band against the least for its detector, rate times span. The tables have rates for peak
 * and quasi-peak up to 1 GHz. Source: CISPR 16-2-1 and 16-2-3, table of least scan times (from memory). Throws
 * RangeError on a time of zero or less.
 */
export function scanTimeFinding(part: BandPart, detector: Detector, scanTimeS: number | null): ScanTimeFinding {
  const rates = part.band?.leastScanSPerHz ?? null;
  const rate = rates && (detector === 'peak' || detector === 'quasi-peak') ? rates[detector] : null;
  const leastS = rate === null ? null : rate * (part.toHz - part.fromHz);
  return {
    what: 'scan-time',
    ...atLeast(part, stated('Scan time', scanTimeS, 's'), leastS, {
      notStated: 'The scan time is not stated.',
      notAsked: 'The table of least scan times has no rate for this band and detector.',
    }),
    figures: { scanTimeS, leastS },
    source: 'CISPR 16-2-1 and 16-2-3, least scan times',
  };
}

/**
 * Time at one frequency against the period of the pulses that are to be caught: shorter, and a pulse may fall between.
 * Source: common practice. Throws RangeError on a time of zero or less.
 */
export function pulsePeriodFinding(
  range: Interval,
  dwellS: number | null,
  pulsePeriodS: number | null,
): PulsePeriodFinding {
  const leastS = stated('Pulse period', pulsePeriodS, 's');
  return {
    what: 'pulse-period',
    ...atLeast(range, stated('Dwell', dwellS, 's'), leastS, {
      notStated: 'The dwell time is not stated.',
      notAsked: 'The period of the pulses is not stated.',
    }),
    figures: { dwellS, pulsePeriodS },
    source: 'Common practice: a dwell of at least one pulse period',
  };
}

/** How long a sweep at an even rate stays within its RBW of one frequency. Source: definition. */
export function dwellOfSweepS(scanTimeS: number, spanHz: number, rbwHz: number): number {
  return (scanTimeS * rbwHz) / spanHz;
}

/** Times are printed to few digits and computed from rates: a billionth short is not short. */
const ROUNDING = 1e-9;

function atLeast(
  { fromHz, toHz }: Interval,
  timeS: number | null,
  leastS: number | null,
  why: { notStated: string; notAsked: string },
): Interval & { outcome: Outcome; because: string | null } {
  if (leastS === null) return { fromHz, toHz, outcome: 'unknown', because: why.notAsked };
  if (timeS === null) return { fromHz, toHz, outcome: 'unknown', because: why.notStated };
  return { fromHz, toHz, outcome: timeS >= leastS * (1 - ROUNDING) ? 'ok' : 'fails', because: null };
}
