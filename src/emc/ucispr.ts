import type { Port } from './kinds';
import type { UncertaintyStep } from './types';

export const UCISPR_EDITIONS = ['CISPR 16-4-2:2003', 'CISPR 16-4-2:2011'] as const;
export type UcisprEdition = (typeof UCISPR_EDITIONS)[number];

export const UCISPR_MEASUREMENTS = [
  'AMN, mains port, 9-150 kHz',
  'AMN, mains port, 150 kHz-30 MHz',
  'voltage probe, 9 kHz-30 MHz',
  'AAN, telecom port, 150 kHz-30 MHz',
  'capacitive voltage probe, 150 kHz-30 MHz',
  'current probe, 150 kHz-30 MHz',
  'absorbing clamp, 30-300 MHz',
  'radiated, OATS or SAC, 30-1000 MHz',
  'radiated, FAR, 30-1000 MHz',
  'radiated, FAR, 1-6 GHz',
  'radiated, FAR, 6-18 GHz',
] as const;
export type UcisprMeasurement = (typeof UCISPR_MEASUREMENTS)[number];

/**
 * Ucispr in dB (k = 2) by measurement: the 2003 edition, null where it states none, then the 2011 edition. Source:
 * CISPR 16-4-2:2003 and CISPR 16-4-2:2011 Table 1, from memory: the edition in force decides.
 */
const UCISPR_DB: Record<UcisprMeasurement, [of2003: number | null, of2011: number]> = {
  'AMN, mains port, 9-150 kHz': [4.0, 3.8],
  'AMN, mains port, 150 kHz-30 MHz': [3.6, 3.4],
  'voltage probe, 9 kHz-30 MHz': [null, 2.9],
  'AAN, telecom port, 150 kHz-30 MHz': [null, 5.0],
  'capacitive voltage probe, 150 kHz-30 MHz': [null, 3.9],
  'current probe, 150 kHz-30 MHz': [null, 2.9],
  'absorbing clamp, 30-300 MHz': [4.5, 4.5],
  'radiated, OATS or SAC, 30-1000 MHz': [5.2, 6.3],
  'radiated, FAR, 30-1000 MHz': [null, 5.3],
  'radiated, FAR, 1-6 GHz': [null, 5.2],
  'radiated, FAR, 6-18 GHz': [null, 5.5],
};

/** The measurement that Ucispr is stated for, by port and range; an open-area site or semi-anechoic chamber below 1 GHz. */
const BY_PORT: Record<Port, readonly [startHz: number, stopHz: number, UcisprMeasurement][]> = {
  enclosure: [
    [30e6, 1e9, 'radiated, OATS or SAC, 30-1000 MHz'],
    [1e9, 6e9, 'radiated, FAR, 1-6 GHz'],
    [6e9, 18e9, 'radiated, FAR, 6-18 GHz'],
  ],
  'ac-mains': [
    [9e3, 150e3, 'AMN, mains port, 9-150 kHz'],
    [150e3, 30e6, 'AMN, mains port, 150 kHz-30 MHz'],
  ],
  'wired-network': [[150e3, 30e6, 'AAN, telecom port, 150 kHz-30 MHz']],
};

/** Ucispr over frequency for a port, in the 2011 edition; the rule of CISPR 16-4-2 compares with it. */
export function ucisprSteps(port: Port): UncertaintyStep[] {
  return BY_PORT[port].map(([startHz, stopHz, measurement]) => {
    return { startHz, stopHz, expandedDb: UCISPR_DB[measurement][1] };
  });
}

/** Ucispr of a measurement in an edition; null where that edition states none. */
export function ucisprDbOf(measurement: UcisprMeasurement, edition: UcisprEdition): number | null {
  const [of2003, of2011] = UCISPR_DB[measurement];
  return edition === 'CISPR 16-4-2:2003' ? of2003 : of2011;
}

/** A laboratory's expanded uncertainty beside Ucispr. */
export interface UcisprComparison {
  measurement: UcisprMeasurement;
  edition: UcisprEdition;
  expandedDb: number;
  ucisprDb: number | null;
  /** What CISPR 16-4-2 adds to every level: Ulab − Ucispr where that is above zero, otherwise 0; null without Ucispr. */
  excessDb: number | null;
  statement: 'at most Ucispr' | 'above Ucispr' | 'no Ucispr in this edition';
}

/** Compares as CISPR 16-4-2:2011 clause 4.1 does. Throws RangeError on an uncertainty that is no figure. */
export function againstUcispr(
  expandedDb: number,
  measurement: UcisprMeasurement,
  edition: UcisprEdition,
): UcisprComparison {
  const ucisprDb = ucisprDbOf(measurement, edition);
  const given = { measurement, edition, expandedDb, ucisprDb };
  const excessDb = ucisprExcessDb(expandedDb, ucisprDb ?? 0);
  if (ucisprDb === null) return { ...given, excessDb: null, statement: 'no Ucispr in this edition' };
  return { ...given, excessDb, statement: excessDb > 0 ? 'above Ucispr' : 'at most Ucispr' };
}

/** A step of uncertainty beside Ucispr where the two share a range. */
export interface BesideUcispr extends UcisprComparison {
  fromHz: number;
  toHz: number;
  ucisprDb: number;
  excessDb: number;
}

/**
 * A step of a port's uncertainty beside Ucispr of the 2011 edition, by measurement, ascending; empty where none is
 * stated. Compares as `againstUcispr` does.
 */
export function besideUcispr({ startHz, stopHz, expandedDb }: UncertaintyStep, port: Port): BesideUcispr[] {
  return BY_PORT[port].flatMap(([lowHz, highHz, measurement]) => {
    const [fromHz, toHz] = [Math.max(startHz, lowHz), Math.min(stopHz, highHz)];
    if (toHz <= fromHz) return [];
    const compared = againstUcispr(expandedDb, measurement, 'CISPR 16-4-2:2011');
    const { ucisprDb, excessDb } = compared;
    return ucisprDb === null || excessDb === null ? [] : [{ ...compared, ucisprDb, excessDb, fromHz, toHz }];
  });
}

/** max(0, Ulab − Ucispr). Source: CISPR 16-4-2:2011 clause 4.1. Throws RangeError on a figure below zero or none. */
export function ucisprExcessDb(expandedDb: number, ucisprDb: number): number {
  for (const figure of [expandedDb, ucisprDb]) {
    if (!(figure >= 0 && Number.isFinite(figure)))
      throw new RangeError(`Expanded uncertainty ${figure} dB is no figure.`);
  }
  return Math.max(0, expandedDb - ucisprDb);
}
