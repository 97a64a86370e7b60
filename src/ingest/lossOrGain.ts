import type { FactorQuantity } from '@/emc/kinds';

export interface Sign {
  /** Null when the table does not say whether its figures are lost or gained. */
  quantity: FactorQuantity | null;
  /** The figures are the opposite of the quantity: `−1.9 dB` through a cable is a loss of 1.9 dB. */
  negate: boolean;
}

/**
 * What a column of decibels is, by its heading and its signs. All figures at or below zero are a loss whatever the
 * heading calls them, since no loss is a gain; positive figures need a word.
 */
export function signOf(words: string, unit: 'dB' | 'dB/m', values: ArrayLike<number>): Sign {
  if (unit === 'dB/m' || /antenna ?fact|\bant(?:enna)? ?f|\baf\b/i.test(words))
    return { quantity: 'antenna-factor', negate: false };
  let below = 0;
  let above = 0;
  for (let i = 0; i < values.length; i++) {
    if (values[i]! < 0) below++;
    else if (values[i]! > 0) above++;
  }
  const loss = /loss|atten|dämpf|insertion|cable|limiter|pad\b|voltage division/i.test(words);
  const gain = /gain|ampl|verst|\bs21\b/i.test(words);
  if (below > 0 && above === 0) return { quantity: 'loss', negate: true };
  if (loss !== gain) return { quantity: loss ? 'loss' : 'gain', negate: false };
  return { quantity: null, negate: false };
}
