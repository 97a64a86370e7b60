import { factorAt } from './factorTable';
import { levelUnitAfter, signOf } from './factorQuantity';
import type { PathTerm } from './types';

/** A stretch of frequency between two edges of a path, over which the same terms are applied. */
export interface PathStretch {
  /** 0 where the path is open below. */
  fromHz: number;
  /** Infinity where the path is open above. */
  toHz: number;
  /** The applied terms in the order of the path; null where there is no factor. */
  terms: PathTerm[] | null;
}

type Kind = 'transducer' | 'loss' | 'gain';

/**
 * A path split by frequency, ascending and without holes; one stretch over everything when no applied term has a range.
 *
 * Terms that have ranges stand in for each other, as one antenna to 300 MHz and another above. Where no transducer of
 * those that have ranges holds, or no loss of those, there is no factor: leaving a loss out would show a level too low.
 * A gain is not in the path outside its range, as a preamplifier that is switched in above 1 GHz: leaving one out can
 * only show a level too high. Chosen here. Throws RangeError on a range that is none.
 */
export function stretchesOf(terms: readonly PathTerm[]): PathStretch[] {
  const applied = terms.filter((term) => term.applied);
  for (const term of applied) checkRange(term);
  const inner = applied.flatMap((term) => [term.fromHz, term.toHz]).filter((hz) => hz !== null && hz !== undefined);
  const edges = [...new Set([0, ...inner, Infinity])].sort((a, b) => a - b);
  return edges.slice(1).map((toHz, i) => {
    const fromHz = edges[i]!;
    const holding = applied.filter((term) => (term.fromHz ?? 0) <= fromHz && (term.toHz ?? Infinity) >= toHz);
    const lacks = (['transducer', 'loss'] as const).some(
      (kind) => applied.some(standsIn(kind)) && !holding.some(standsIn(kind)),
    );
    return { fromHz, toHz, terms: lacks ? null : holding };
  });
}

/**
 * The stretch that governs at a frequency; its `terms` are null where there is no factor. An edge belongs to both of its
 * stretches: the one with the larger correction governs, because the level is the higher by it (chosen here, as the
 * lower limit governs on a band edge). Where one of the two has no factor the other governs; where both reach the edge
 * and a table of one has no value there, the edge has no factor, since nobody knows which correction is the larger.
 */
export function stretchAt(stretches: readonly PathStretch[], frequencyHz: number): PathStretch {
  const lower = stretches[stretchBelow(stretches, frequencyHz)]!;
  const upper = stretches[stretches.indexOf(lower) + 1];
  if (frequencyHz !== lower.toHz || !upper || upper.terms === null) return lower;
  if (lower.terms === null) return upper;
  const [below, above] = [sumAt(lower.terms, frequencyHz), sumAt(upper.terms, frequencyHz)];
  if (below === null) return lower;
  return above === null || above > below ? upper : lower;
}

/** Position of the stretch a frequency lies in; on an edge, of the one below it. */
export function stretchBelow(stretches: readonly PathStretch[], frequencyHz: number): number {
  let at = 0;
  while (at + 1 < stretches.length && stretches[at + 1]!.fromHz < frequencyHz) at++;
  return at;
}

/** What some terms add to a reading at a frequency, in dB; null when a table of theirs has no value there. */
export function sumAt(terms: readonly PathTerm[], frequencyHz: number): number | null {
  let sum = 0;
  for (const { table } of terms) {
    const factor = factorAt(table, frequencyHz);
    if (factor === null) return null;
    sum += signOf(table.quantity) * factor.valueDb;
  }
  return sum;
}

/** True where a term's item is in the path at a frequency, both ends of its range included. */
export function isInRange({ fromHz, toHz }: PathTerm, frequencyHz: number): boolean {
  return frequencyHz >= (fromHz ?? 0) && frequencyHz <= (toHz ?? Infinity);
}

function kindOf({ table: { quantity } }: PathTerm): Kind {
  if (levelUnitAfter(quantity) !== null) return 'transducer';
  return quantity === 'gain' ? 'gain' : 'loss';
}

/** Terms of a kind that have a range, so that where none of them holds something is missing. */
function standsIn(kind: Kind): (term: PathTerm) => boolean {
  return (term) => kindOf(term) === kind && ((term.fromHz ?? null) !== null || (term.toHz ?? null) !== null);
}

function checkRange({ name, fromHz, toHz }: PathTerm): void {
  for (const hz of [fromHz, toHz]) {
    if (hz !== null && hz !== undefined && !(hz > 0 && hz < Infinity)) {
      throw new RangeError(`${name}: ${hz} Hz is no end of a range.`);
    }
  }
  if ((fromHz ?? 0) >= (toHz ?? Infinity)) throw new RangeError(`${name} holds from ${fromHz} Hz to ${toHz} Hz.`);
}
