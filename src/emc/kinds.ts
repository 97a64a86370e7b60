/** The vocabulary of an emission measurement: what a reading can be, and what a judgement can say. */

export const DETECTORS = [
  'peak',
  'quasi-peak',
  'average',
  'rms-average',
  'log-average',
  'sample',
  'negative-peak',
  'unknown',
] as const;
/** `average` is the linear (CISPR) average; log and video averages are `log-average`. */
export type Detector = (typeof DETECTORS)[number];

/** Detectors a limit line can be written for. */
export const LINE_DETECTORS = ['quasi-peak', 'average', 'peak'] as const;
export type LineDetector = (typeof LINE_DETECTORS)[number];

export const LEVEL_UNITS = [
  'dBuV',
  'dBm',
  'dBuV/m',
  'dBuA',
  'dBuA/m',
  'dBpW',
  'V',
  'mV',
  'uV',
  'W',
  'mW',
  'dB',
] as const;
/** Units a file can state for its levels; `dB` alone is relative and can never be judged. */
export type LevelUnit = (typeof LEVEL_UNITS)[number];

export const LINE_UNITS = ['dBuV/m', 'dBuV', 'dBuA', 'dBuA/m', 'dBpW'] as const;
export type LineUnit = (typeof LINE_UNITS)[number];

export const VERDICTS = ['over', 'needs-final', 'inconclusive', 'not-covered', 'under'] as const;
export type Verdict = (typeof VERDICTS)[number];

export const PURPOSES = ['prescan', 'final', 'ambient'] as const;
export type Purpose = (typeof PURPOSES)[number];

export const PORTS = ['enclosure', 'ac-mains', 'wired-network'] as const;
export type Port = (typeof PORTS)[number];

export const MAINS_LINES = ['L', 'N', 'L1', 'L2', 'L3'] as const;
export type MainsLine = (typeof MAINS_LINES)[number];

export const POLARISATIONS = ['horizontal', 'vertical'] as const;
export type Polarisation = (typeof POLARISATIONS)[number];

/**
 * What a table of corrections can hold. A loss is a cable's, an attenuator's or a transient limiter's. The others that
 * are not a gain belong to what stands between the sample and the receiver's cable: an antenna, a loop, an artificial
 * network, a current probe or an absorbing clamp.
 */
export const FACTOR_QUANTITIES = [
  'antenna-factor',
  'loss',
  'gain',
  'amn-voltage-division',
  'aan-voltage-division',
  'transfer-impedance',
  'magnetic-antenna-factor',
  'clamp-factor',
] as const;
export type FactorQuantity = (typeof FACTOR_QUANTITIES)[number];

/** In what a factor is stated, as it is written. */
export const FACTOR_UNITS = ['dB/m', 'dB', 'dBΩ', 'dB(S/m)', 'dB(pW/µV)'] as const;
export type FactorUnit = (typeof FACTOR_UNITS)[number];

/** How a level, its limit and the uncertainty become a verdict; `@/emc/decisionRule` says how each does. */
export const DECISION_RULES = ['guarded-by-u', 'cispr-16-4-2', 'simple-acceptance'] as const;
export type DecisionRule = (typeof DECISION_RULES)[number];
export const RULE_NAMES: Record<DecisionRule, string> = {
  'guarded-by-u': 'guarded by U',
  'cispr-16-4-2': 'CISPR 16-4-2',
  'simple-acceptance': 'simple acceptance',
};
