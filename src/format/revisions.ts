import { factorUnitOf } from '@/emc/factorQuantity';
import { FACTOR_QUANTITIES, type FactorQuantity } from '@/emc/kinds';
import { formatFrequencyRange } from './frequencies';
import { formatDb, formatDistance } from './quantities';

/** Words for what a new revision of a table or a limit line changes. */

interface Difference {
  largestDb: number;
  atHz: number;
}

/** A row's or an edge's frequency, without idle zeros: `144 MHz`. */
export function formatEdge(hz: number): string {
  return formatFrequencyRange(hz, hz);
}

/** `0.6 dB higher`; the word follows the rounded figure, so that nothing reads `0.0 dB higher`. */
export function formatDifference(db: number): string {
  const figure = formatDb(Math.abs(db));
  if (Number(figure) === 0) return 'no different';
  return `${figure} dB ${db > 0 ? 'higher' : 'lower'}`;
}

/** `at most 0.6 dB higher than revision 1, at 144 MHz`; null: the two share no frequency. */
export function differenceWords(difference: Difference | null, than: string): string {
  if (difference === null) return `shares no frequency with ${than}`;
  const { largestDb, atHz } = difference;
  if (largestDb === 0) return `the same as ${than} at every frequency that both have`;
  if (Number(formatDb(Math.abs(largestDb))) === 0) return `less than 0.1 dB from ${than} everywhere`;
  return `at most ${formatDifference(largestDb)} than ${than}, at ${formatEdge(atHz)}`;
}

export const QUANTITY_WORDS: Record<FactorQuantity, string> = {
  'antenna-factor': 'antenna factor',
  loss: 'loss',
  gain: 'gain',
  'amn-voltage-division': 'AMN voltage division factor',
  'aan-voltage-division': 'AAN voltage division factor',
  'transfer-impedance': 'transfer impedance',
  'magnetic-antenna-factor': 'magnetic antenna factor',
  'clamp-factor': 'absorbing clamp factor',
};

/** What a quantity does to a reading, for whoever has to say which one a table holds. */
export const QUANTITY_USES: Record<FactorQuantity, string> = {
  'antenna-factor': 'added, dBµV to dBµV/m',
  loss: 'added: cable, attenuator, transient limiter',
  gain: 'subtracted',
  'amn-voltage-division': 'added, the level stays dBµV',
  'aan-voltage-division': 'added, the level stays dBµV',
  'transfer-impedance': 'subtracted, dBµV to dBµA',
  'magnetic-antenna-factor': 'added, dBµV to dBµA/m',
  'clamp-factor': 'added, dBµV to dBpW',
};

/** `dB/m` for an antenna factor, `dBΩ` for a transfer impedance; `dB` while the quantity is not said. */
export function quantityUnit(quantity: FactorQuantity | null): string {
  return quantity === null ? 'dB' : factorUnitOf(quantity);
}

const quantityNamed = (words: string) => FACTOR_QUANTITIES.find((one) => QUANTITY_WORDS[one] === words) ?? null;

const articled = (words: string) => `${/^[Aa]/.test(words) ? 'an' : 'a'} ${words}`;

export interface Remark {
  kind: string;
  fromHz: number | null;
  toHz: number | null;
  db: number | null;
}

/** One remark on the rows of a new table, as a sentence. */
export function remarkWords({ kind, fromHz, toHz, db }: Remark, what: string): string {
  const range = fromHz !== null && toHz !== null ? formatFrequencyRange(fromHz, toHz) : '';
  switch (kind) {
    case 'jump':
      return `Between ${formatEdge(fromHz!)} and ${formatEdge(toHz!)} the ${what} steps by ${formatDb(Math.abs(db!))} dB.`;
    case 'gap-between-rows':
      return `No row lies between ${formatEdge(fromHz!)} and ${formatEdge(toHz!)}; what is added there is one straight line over log f.`;
    case 'no-factor-above':
      return `From now on nothing above ${formatEdge(fromHz!)} has a factor; the revision before reached ${formatEdge(toHz!)}.`;
    case 'no-factor-below':
      return `From now on nothing below ${formatEdge(toHz!)} has a factor; the revision before began at ${formatEdge(fromHz!)}.`;
    case 'turned':
      return 'The frequencies fall in the file; the rows were turned round.';
    case 'negated':
      return what === QUANTITY_WORDS['transfer-impedance']
        ? 'The file gives a transfer admittance; turned over, it is the transfer impedance.'
        : `No figure in the file is above zero: read as ${articled(what)} and turned over, since no loss is a gain.`;
    case 'unit-not-stated':
      return `The file states no unit; the figures are read as ${quantityUnit(quantityNamed(what))}.`;
    case 'not-said-to-be-factors':
      return 'Nothing in the file says that these are corrections. Look at the chart before you enter them.';
    case 'mixed-signs':
      return `Some figures are above zero and some below; ${articled(what)} of less than nothing is the opposite.`;
    case 'distance-differs':
      return 'The distance is another than before; runs at the other distance find no table.';
    default:
      return range;
  }
}

/** `horizontal, 3 m`; empty where neither is given. */
export function tableConditions(polarisation: string | null, distanceM: number | null): string {
  return [polarisation, distanceM === null ? null : formatDistance(distanceM)].filter(Boolean).join(', ');
}
