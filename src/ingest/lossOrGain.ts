import type { FactorQuantity } from '@/emc/kinds';
import type { WrittenFactorUnit } from './factorUnits';

export interface Sign {
  /** Null when the table does not say what its figures are. */
  quantity: FactorQuantity | null;
  /** The figures are the opposite of the quantity: `−1.9 dB` through a cable is a loss of 1.9 dB. */
  negate: boolean;
  /** What it may be, where the words leave open more than loss or gain. */
  among?: readonly FactorQuantity[];
}

const is = (quantity: FactorQuantity, negate = false): Sign => ({ quantity, negate });
const ask = (...among: FactorQuantity[]): Sign => ({ quantity: null, negate: false, among });

const BY_UNIT: Partial<Record<WrittenFactorUnit, Sign>> = {
  'dB(S/m)': is('magnetic-antenna-factor'),
  dBΩ: is('transfer-impedance'),
  dBS: is('transfer-impedance', true),
  'dB(pW/µV)': is('clamp-factor'),
};

/**
 * What a column of decibels is, by its unit, its heading and its signs. All figures at or below zero are a loss whatever
 * the heading calls them, since no loss is a gain; positive figures need a word. A magnetic factor in dB or dB/m is
 * asked about: certificates give the equivalent electric field so too, which is 51.5 dB more.
 */
export function signOf(words: string, unit: WrittenFactorUnit, values: ArrayLike<number>): Sign {
  const byUnit = BY_UNIT[unit];
  if (byUnit) return byUnit;
  let below = 0;
  let above = 0;
  for (let i = 0; i < values.length; i++) {
    if (values[i]! < 0) below++;
    else if (values[i]! > 0) above++;
  }
  const allBelow = below > 0 && above === 0;
  const loss = /loss|atten|dämpf|insertion|cable|limiter|pad\b/i.test(words);
  const gain = /gain|ampl|verst|\bs21\b/i.test(words);
  const magnetic = /magnetic|\bh[- ]?field\b/i.test(words);
  if (magnetic && !loss && !gain) return ask('magnetic-antenna-factor', 'antenna-factor');
  if (unit === 'dB/m') return is('antenna-factor');
  if (/\bloop\b/i.test(words) && !loss && !gain) return ask('magnetic-antenna-factor', 'antenna-factor');
  if (/antenna ?fact|\bant(?:enna)? ?f|\baf\b/i.test(words)) return is('antenna-factor');
  if (/transfer ?imp|\bz ?t\b/i.test(words)) return is('transfer-impedance');
  if (/\bprobe\b/i.test(words) && !loss && !gain) return ask('transfer-impedance', 'loss', 'gain');
  if (/\bclamp\b|absorbing/i.test(words)) return loss ? ask('clamp-factor', 'loss') : is('clamp-factor');
  const aan = /\baan\b|\bisn\b|asymmetric artificial/i.test(words);
  const amn = /\bamn\b|\blisn\b|artificial mains|mains network/i.test(words);
  if (aan !== amn) return is(aan ? 'aan-voltage-division' : 'amn-voltage-division', allBelow);
  if (/voltage division|\bvdf\b/i.test(words)) return ask('amn-voltage-division', 'aan-voltage-division');
  if (allBelow) return is('loss', true);
  if (loss !== gain) return is(loss ? 'loss' : 'gain');
  return { quantity: null, negate: false };
}

/** Whether figures all at or below zero are this quantity written the other way round. */
export function turnsOver(quantity: FactorQuantity): boolean {
  return quantity === 'loss' || quantity === 'amn-voltage-division' || quantity === 'aan-voltage-division';
}

const IN_OWN_UNIT: Partial<Record<WrittenFactorUnit, [FactorQuantity, string]>> = {
  'dB/m': ['antenna-factor', 'an antenna factor'],
  'dB(S/m)': ['magnetic-antenna-factor', 'a magnetic antenna factor'],
  dBΩ: ['transfer-impedance', 'a transfer impedance'],
  'dB(pW/µV)': ['clamp-factor', 'a clamp factor'],
};

/**
 * What a stated unit makes of a table when something else was chosen, as `an antenna factor`; null where it agrees. Plain
 * dB is whatever is said of it.
 */
export function contradiction(
  { said, unit }: { said: Sign; unit: WrittenFactorUnit },
  quantity: FactorQuantity,
): string | null {
  const own = IN_OWN_UNIT[unit];
  if (!own || own[0] === quantity || said.among?.includes(quantity)) return null;
  return own[1];
}

/** What is asked of a table that does not say what its figures are. */
export function signQuestion(name: string, { among }: Sign): string {
  switch (among?.[0]) {
    case 'magnetic-antenna-factor':
      return `“${name}” does not say whether its figures give the magnetic field, in dB(S/m), or the equivalent electric field, in dB/m, which is 51.5 dB more. Which is it?`;
    case 'amn-voltage-division':
      return `“${name}” does not say whether it belongs to an AMN or to an AAN. Which is it?`;
    case 'clamp-factor':
      return `“${name}” may be the clamp factor, or the insertion loss of the clamp, which is 17 dB more. Which is it?`;
    case 'transfer-impedance':
      return `“${name}” does not say whether its figures are a transfer impedance in dBΩ, which is subtracted. Which is it?`;
    default:
      return `“${name}” does not say whether its figures are lost or gained. Which is it?`;
  }
}
