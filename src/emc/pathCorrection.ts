import { correctionAt } from './correction';
import { signOf } from './factorQuantity';
import { addFactor, factorAt, prepareFactorTable, type FactorAt } from './factorTable';
import type { PathTerm } from './types';

/** What one term adds at a frequency. */
export interface PathShare {
  termId: string;
  /** As it enters the sum, a gain below zero; null where its table has no value, or it is not in the path. */
  shareDb: number | null;
  /** The value of the table and the rows it lies between. */
  factor: FactorAt | null;
  /** False outside the range that the term has in a path split by frequency. */
  inPath: boolean;
}

/** What a signal path adds to a reading at one frequency; `totalDb` is null where it has no correction. */
export interface PathCorrection {
  frequencyHz: number;
  totalDb: number | null;
  shares: PathShare[];
}

/**
 * The correction of a path at a frequency, as `correctionAt` gives it, and what each term adds to it. On an edge of a
 * path split by frequency the shares are those of the side that governs. Throws as `correctionAt` does.
 */
export function pathCorrectionAt(terms: readonly PathTerm[], frequencyHz: number): PathCorrection {
  const totalDb = correctionAt(terms, frequencyHz);
  const sides = [terms.filter(reachesUpTo(frequencyHz)), terms.filter(reachesDownTo(frequencyHz))];
  const holding = sides.find((side) => totalDb !== null && sumOf(side, frequencyHz) === totalDb) ?? sides[0]!;
  const shares = terms.map((term): PathShare => {
    const inPath = holding.includes(term);
    const factor = inPath ? factorAt(term.table, frequencyHz) : null;
    return { termId: term.id, inPath, factor, shareDb: factor && signOf(term.table.quantity) * factor.valueDb };
  });
  return { frequencyHz, totalDb, shares };
}

/** A stretch of the correction; `missing` names the terms that leave it without one and is empty where it is known. */
export interface CorrectionStretch {
  fromHz: number;
  toHz: number;
  missing: string[];
}

/**
 * From the lowest to the highest frequency that any term has, where the correction is known and where it is not, by the
 * terms without a value; ascending, neighbours differ. Empty without terms. Throws as `correctionAt` does.
 */
export function correctionStretches(terms: readonly PathTerm[]): CorrectionStretch[] {
  const stretches: CorrectionStretch[] = [];
  for (const [fromHz, toHz] of between(terms)) {
    const hz = Math.sqrt(fromHz * toHz);
    const missing = correctionAt(terms, hz) === null ? missingAt(terms, hz) : [];
    const last = stretches.at(-1);
    if (last && last.missing.join(' ') === missing.join(' ')) last.toHz = toHz;
    else stretches.push({ fromHz, toHz, missing });
  }
  return stretches;
}

/** Terms in the path at a frequency whose tables have no value; where there are none, those that stand in for another. */
function missingAt(terms: readonly PathTerm[], hz: number): string[] {
  const without = terms.filter((term) => isIn(term, hz) && factorAt(term.table, hz) === null);
  const away = terms.filter((term) => !isIn(term, hz));
  return (without.length > 0 ? without : away).map(({ id }) => id);
}

/**
 * The correction as lines, straight over log f between their points: the rows of every table that holds, from piece to
 * piece of a path. Between two rows lies no other, so they are exact. Nothing is drawn where there is no correction.
 */
export function correctionLines(terms: readonly PathTerm[]): { frequencyHz: number; totalDb: number }[][] {
  const pieces: { ids: string; fromHz: number; toHz: number; holding: PathTerm[] }[] = [];
  for (const [fromHz, toHz] of between(terms)) {
    const hz = Math.sqrt(fromHz * toHz);
    if (correctionAt(terms, hz) === null) continue;
    const holding = terms.filter((term) => isIn(term, hz));
    const ids = holding.map(({ id }) => id).join(' ');
    const last = pieces.at(-1);
    if (last && last.toHz === fromHz && last.ids === ids) last.toHz = toHz;
    else pieces.push({ ids, fromHz, toHz, holding });
  }
  return pieces.map(({ fromHz, toHz, holding }) => {
    const rows = holding.flatMap(({ table }) => table.frequencyHz.filter((hz) => hz > fromHz && hz < toHz));
    const frequencyHz = Float64Array.from(new Set([fromHz, ...rows, toHz])).sort();
    const logHz = frequencyHz.map((hz) => Math.log(hz));
    const totalDb = new Float64Array(frequencyHz.length);
    const outside = new Uint8Array(frequencyHz.length);
    for (const { table } of holding) {
      addFactor(prepareFactorTable(table), signOf(table.quantity), frequencyHz, logHz, totalDb, outside, 1);
    }
    return Array.from(frequencyHz, (hz, i) => ({ frequencyHz: hz, totalDb: totalDb[i]! }));
  });
}

/** Between every two ends of tables and of ranges; a table counts only where its item is in the path. */
function between(terms: readonly PathTerm[]): [fromHz: number, toHz: number][] {
  const ends = terms.flatMap(({ table, fromHz, toHz }) => {
    const low = Math.max(table.frequencyHz[0]!, fromHz ?? 0);
    const high = Math.min(table.frequencyHz.at(-1)!, toHz ?? Infinity);
    return low < high ? [low, high] : [];
  });
  const edges = [...new Set(ends)].sort((a, b) => a - b);
  return edges.slice(1).map((toHz, i) => [edges[i]!, toHz]);
}

const isIn = ({ fromHz, toHz }: PathTerm, hz: number) => hz >= (fromHz ?? 0) && hz <= (toHz ?? Infinity);
const reachesUpTo = (hz: number) => (term: PathTerm) => isIn(term, hz) && (term.fromHz ?? 0) < hz;
const reachesDownTo = (hz: number) => (term: PathTerm) => isIn(term, hz) && (term.toHz ?? Infinity) > hz;

function sumOf(terms: readonly PathTerm[], frequencyHz: number): number | null {
  let sum = 0;
  for (const { table } of terms) {
    const factor = factorAt(table, frequencyHz);
    if (factor === null) return null;
    sum += signOf(table.quantity) * factor.valueDb;
  }
  return sum;
}

/** Multiples of a decade that labs read a correction at. */
const MANTISSAS = [1, 2, 3, 5, 7];

/** Round frequencies inside a range, both ends included, ascending; no more than `most` beside the ends. */
export function roundFrequencies(lowHz: number, highHz: number, most = 14): number[] {
  const inside = (mantissas: readonly number[]) => {
    const found: number[] = [];
    for (let d = Math.floor(Math.log10(lowHz)); 10 ** d <= highHz; d++) {
      for (const mantissa of mantissas) {
        const hz = Number((mantissa * 10 ** d).toPrecision(6));
        if (hz > lowHz && hz < highHz) found.push(hz);
      }
    }
    return found;
  };
  const choices = [MANTISSAS, [1, 2, 5], [1, 3], [1]].map(inside);
  const chosen = choices.find((found) => found.length <= most) ?? [];
  return [...new Set([lowHz, ...chosen, highHz])];
}
