import type { FactorQuantity, FactorUnit, LineUnit } from './kinds';

interface QuantityFacts {
  unit: FactorUnit;
  /** + adds to the reading, − is taken from it. */
  sign: 1 | -1;
  /** The unit a reading in dBµV has once it is applied; null for what only adds or takes away on the way. */
  levelUnit: LineUnit | null;
}

/**
 * How each quantity takes a reading to a level. E = V + AF, H = V + AF(H) (47 CFR and CISPR 16-1-4 usage), V at the
 * sample = V + voltage division factor (CISPR 16-1-2), I = V − Zt (CISPR 16-1-2, current probe), P = V + CF (CISPR
 * 16-1-3, absorbing clamp); all in dB. Basis: common practice, the clauses from memory. A loop whose certificate gives
 * the equivalent electric field in dB/m has an antenna factor.
 */
const FACTS: Record<FactorQuantity, QuantityFacts> = {
  'antenna-factor': { unit: 'dB/m', sign: 1, levelUnit: 'dBuV/m' },
  loss: { unit: 'dB', sign: 1, levelUnit: null },
  gain: { unit: 'dB', sign: -1, levelUnit: null },
  'amn-voltage-division': { unit: 'dB', sign: 1, levelUnit: 'dBuV' },
  'aan-voltage-division': { unit: 'dB', sign: 1, levelUnit: 'dBuV' },
  'transfer-impedance': { unit: 'dBΩ', sign: -1, levelUnit: 'dBuA' },
  'magnetic-antenna-factor': { unit: 'dB(S/m)', sign: 1, levelUnit: 'dBuA/m' },
  'clamp-factor': { unit: 'dB(pW/µV)', sign: 1, levelUnit: 'dBpW' },
};

/** + for what is lost between the sample and the receiver, − for what is gained and for a transfer impedance. */
export function signOf(quantity: FactorQuantity): 1 | -1 {
  return FACTS[quantity].sign;
}

/** The unit a quantity's figures are stated in. */
export function factorUnitOf(quantity: FactorQuantity): FactorUnit {
  return FACTS[quantity].unit;
}

/**
 * The unit a reading in dBµV has after a factor of this quantity; null for a loss or a gain. What has one is the
 * transducer of its path, and there is one transducer at a frequency.
 */
export function levelUnitAfter(quantity: FactorQuantity): LineUnit | null {
  return FACTS[quantity].levelUnit;
}
