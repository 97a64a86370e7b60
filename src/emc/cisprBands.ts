import { isRange } from './intervals';

/** A CISPR band with what its receiver is asked for. Rates are seconds of scan per hertz of span. */
export interface CisprBand {
  band: 'A' | 'B' | 'C' | 'D' | 'E';
  startHz: number;
  stopHz: number;
  /** 6 dB wide; band E's 1 MHz is an impulse bandwidth in CISPR 16-1-1, 6 % more than the 6 dB width of a Gaussian. */
  bandwidthHz: number;
  /** Least time at one frequency. */
  leastDwellS: number;
  /** Least scan time per hertz by detector; null where the table has none. */
  leastScanSPerHz: { peak: number; 'quasi-peak': number } | null;
}

const C_AND_D = { bandwidthHz: 120e3, leastDwellS: 0.06e-3, leastScanSPerHz: { peak: 1e-9, 'quasi-peak': 20e-6 } };

/**
 * Bands and bandwidths: CISPR 16-1-1:2019 Table 1 (verified). Least times: tables of CISPR 16-2-1 and 16-2-3 (from
 * memory); UN Regulation No. 10 asks 100 ms/MHz where these ask 1 ms/MHz.
 */
export const CISPR_BANDS: readonly CisprBand[] = [
  {
    band: 'A',
    startHz: 9e3,
    stopHz: 150e3,
    bandwidthHz: 200,
    leastDwellS: 10e-3,
    leastScanSPerHz: { peak: 100e-6, 'quasi-peak': 20e-3 },
  },
  {
    band: 'B',
    startHz: 150e3,
    stopHz: 30e6,
    bandwidthHz: 9e3,
    leastDwellS: 0.5e-3,
    leastScanSPerHz: { peak: 100e-9, 'quasi-peak': 200e-6 },
  },
  { band: 'C', startHz: 30e6, stopHz: 300e6, ...C_AND_D },
  { band: 'D', startHz: 300e6, stopHz: 1e9, ...C_AND_D },
  { band: 'E', startHz: 1e9, stopHz: 18e9, bandwidthHz: 1e6, leastDwellS: 0.01e-3, leastScanSPerHz: null },
];

/** The part of a swept segment that lies in one band; `band` is null below 9 kHz and above 18 GHz. */
export interface BandPart {
  band: CisprBand | null;
  fromHz: number;
  toHz: number;
}

/** The bands that hold a frequency, edges included: two at 150 kHz, 30, 300 and 1000 MHz, none outside 9 kHz to 18 GHz. */
export function bandsAt(frequencyHz: number): CisprBand[] {
  return CISPR_BANDS.filter(({ startHz, stopHz }) => startHz <= frequencyHz && frequencyHz <= stopHz);
}

/**
 * A swept segment cut at the bands it runs through, in ascending order. A segment that only touches a band at its edge
 * has no part there: of two segments that repeat 150 kHz each is judged by the band on its own side. Throws RangeError
 * unless the segment is a range above zero.
 */
export function bandParts(startHz: number, stopHz: number): BandPart[] {
  if (!(startHz > 0 && stopHz > startHz && Number.isFinite(stopHz))) {
    throw new RangeError(`${startHz} to ${stopHz} Hz is no range.`);
  }
  const lowestHz = CISPR_BANDS[0]!.startHz;
  const highestHz = CISPR_BANDS[CISPR_BANDS.length - 1]!.stopHz;
  const parts = [
    { band: null, fromHz: startHz, toHz: Math.min(stopHz, lowestHz) },
    ...CISPR_BANDS.map((band) => ({
      band,
      fromHz: Math.max(startHz, band.startHz),
      toHz: Math.min(stopHz, band.stopHz),
    })),
    { band: null, fromHz: Math.max(startHz, highestHz), toHz: stopHz },
  ];
  return parts.filter(({ fromHz, toHz }) => isRange(fromHz, toHz));
}
