import { CONFIDENCE, PROPORTION } from './eightyEighty';
import { EQUAL_WITHIN_DB } from './guardBand';
import { incompleteBeta } from './incompleteBeta';

/** `strict` reaches 80 % confidence; the `printed` pairs are rounded, and all but 14 units with 1 over fall short of it. */
export type CountKind = 'strict' | 'printed';

/** Units by how many of them may be over, from none on. Source: CISPR TR 16-4-3 and CISPR 14-1, from memory. */
const PRINTED_UNITS: readonly number[] = [7, 14, 20, 26, 32];

/**
 * P(X ≤ c) of the binomial distribution: at most c of n, each with probability p above 0 and below 1. As incomplete
 * beta function (NIST Digital Library of Mathematical Functions 8.17.5). Throws RangeError on counts that are none.
 */
export function binomialCdf(c: number, n: number, p: number): number {
  if (!Number.isInteger(c) || !Number.isInteger(n) || c < 0 || n < 0) {
    throw new RangeError(`${c} of ${n} are no counts.`);
  }
  return c >= n ? 1 : incompleteBeta(1 - p, n - c, c + 1);
}

/** Confidence that at least 80 % of a series comply when `over` of n units are over: 1 − P(X ≤ over) at 20 %. */
export function confidenceOf(over: number, n: number): number {
  return 1 - binomialCdf(over, n, 1 - PROPORTION);
}

/** Fewest units of which `over` may be over the limit; null where the printed table ends. */
export function unitsFor(over: number, counts: CountKind): number | null {
  if (!Number.isInteger(over) || over < 0) throw new RangeError(`${over} units over is no count.`);
  if (counts === 'printed') return PRINTED_UNITS[over] ?? null;
  let n = over + 1;
  while (confidenceOf(over, n) < CONFIDENCE) n++;
  return n;
}

export interface CountStatement {
  n: number;
  limit: number;
  over: number;
  /** How many of n may be over; null where n is too few for any. */
  allowedOver: number | null;
  /** Confidence in 80 % of the series that these counts give. */
  confidence: number;
  /** `over` is that the rule is not met. */
  verdict: 'under' | 'over' | 'not-covered';
  because: string;
}

/**
 * The rule by the binomial distribution: counts the units over the limit, on the limit is not over. Not covered where
 * there are fewer units than it takes with none over. Source: CISPR TR 16-4-3:2004. Throws RangeError on figures that
 * are none.
 */
export function byCount(levels: readonly number[], limit: number, counts: CountKind): CountStatement {
  for (const figure of [limit, ...levels]) if (!Number.isFinite(figure)) throw new RangeError(`${figure} is no level.`);
  const n = levels.length;
  const over = levels.filter((level) => level - limit > EQUAL_WITHIN_DB).length;
  let allowedOver: number | null = null;
  for (let c = 0, units = unitsFor(c, counts); units !== null && units <= n; units = unitsFor(++c, counts)) {
    allowedOver = c;
  }
  const stated = { n, limit, over, allowedOver, confidence: n === 0 ? 0 : confidenceOf(over, n) };
  if (allowedOver === null) {
    return { ...stated, verdict: 'not-covered', because: `With none over it takes ${unitsFor(0, counts)} units.` };
  }
  const because = `Of ${n} units ${allowedOver} may be over the limit, and ${over} are.`;
  return { ...stated, verdict: over <= allowedOver ? 'under' : 'over', because };
}
