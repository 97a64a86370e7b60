import { isOneEmission, type Place } from './emissions';

/** A chain of matches: how many, how far apart in all, and the last of them. */
interface Chain {
  count: number;
  apart: number;
  item: number;
  found: number;
  before: Chain | null;
}

/**
 * Which known item each emission is: its index in `items`, or null for one that is new. As many as can be are matched,
 * in order of frequency, each within the spacing, and of such matchings the one that moves them least. So emissions
 * that each move by less than the spacing stay the items they were, and the same emissions again are the same items.
 */
export function sameEmissions(items: readonly Place[], emissions: readonly Place[]): (number | null)[] {
  const matched: (number | null)[] = emissions.map(() => null);
  for (const kind of ['peak', 'floor'] as const) {
    const known = inOrder(items, kind);
    const found = inOrder(emissions, kind);
    for (let chain = longestChain(items, known, emissions, found); chain; chain = chain.before) {
      matched[found[chain.found]!] = known[chain.item]!;
    }
  }
  return matched;
}

function inOrder(places: readonly Place[], kind: Place['kind']): number[] {
  const key = (i: number) => places[i]!;
  return places
    .map((_, i) => i)
    .filter((i) => key(i).kind === kind)
    .sort((a, b) => key(a).fromHz - key(b).fromHz || key(a).toHz - key(b).toHz || a - b);
}

/** The best chain that rises in both lists, by a tree over `found` that holds the best chain up to each place. */
function longestChain(
  items: readonly Place[],
  known: readonly number[],
  emissions: readonly Place[],
  found: readonly number[],
): Chain | null {
  const best: (Chain | null)[] = new Array<Chain | null>(found.length + 1).fill(null);
  const upTo = (end: number): Chain | null => {
    let most: Chain | null = null;
    for (let i = end; i > 0; i -= i & -i) most = better(most, best[i]!);
    return most;
  };
  const nearOf = window(items, known, emissions, found);
  known.forEach((at, item) => {
    const near = nearOf(items[at]!).filter((i) => isOneEmission(items[at]!, emissions[found[i]!]!));
    // From the highest down, so that one item is never matched twice.
    for (const i of near.reverse()) {
      const before = upTo(i);
      const chain: Chain = {
        count: (before?.count ?? 0) + 1,
        apart: (before?.apart ?? 0) + movedHz(items[at]!, emissions[found[i]!]!),
        item,
        found: i,
        before,
      };
      for (let k = i + 1; k <= found.length; k += k & -k) best[k] = better(best[k]!, chain);
    }
  });
  return upTo(found.length);
}

/** Which of `found` can be near an item at all, so that thousands of emissions are not each compared with each. */
function window(
  items: readonly Place[],
  known: readonly number[],
  emissions: readonly Place[],
  found: readonly number[],
) {
  const all = [...known.map((i) => items[i]!), ...found.map((i) => emissions[i]!)];
  const widestHz = all.reduce((most, { bandwidthHz }) => Math.max(most, bandwidthHz), 0);
  const longestHz = found.reduce((most, i) => Math.max(most, emissions[i]!.toHz - emissions[i]!.fromHz), 0);
  return ({ fromHz, toHz }: Place): number[] => {
    let low = 0;
    for (let high = found.length; low < high;) {
      const middle = (low + high) >> 1;
      if (emissions[found[middle]!]!.fromHz < fromHz - widestHz - longestHz) low = middle + 1;
      else high = middle;
    }
    const near: number[] = [];
    for (let i = low; i < found.length && emissions[found[i]!]!.fromHz <= toHz + widestHz; i++) near.push(i);
    return near;
  };
}

function better(a: Chain | null, b: Chain | null): Chain | null {
  if (!a || !b) return a ?? b;
  return b.count > a.count || (b.count === a.count && b.apart < a.apart) ? b : a;
}

function movedHz(a: Place, b: Place): number {
  return Math.abs(a.fromHz + a.toHz - b.fromHz - b.toHz) / 2;
}
