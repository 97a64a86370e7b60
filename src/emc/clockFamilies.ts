import { atLeastByChance } from './chance';
import type { SeenEmission } from './clockHarmonics';
import { commonest, fitted, LEAST_MEMBERS, rangeOf, type ClockFamily, type Line, type Range } from './familyFit';
import { positive } from './freeSpace';

/** A family that unrelated emissions would show more often than in one spectrum of a hundred is none. Chosen here. */
export const MOST_BY_CHANCE = 0.01;
/** A lower fundamental needs members of its own that chance makes more seldom than this, or a multiple stands. */
const MOST_BY_CHANCE_FOR_REST = 1e-3;
/** A lower fundamental is not split into more multiples than this. Chosen here. */
const MOST_MULTIPLES = 3;
/** Harmonics closer together than this many bandwidths fit too much. Chosen here. */
const LEAST_SPACING_BANDWIDTHS = 8;

/**
 * Finds families of harmonics among emissions, most certain first. A fundamental is tried at every value at which the
 * set of emissions it explains within half their bandwidths changes, so none is missed between steps of a grid. What
 * it explains is weighed against chance: how often as many of the other emissions would lie within half a bandwidth
 * of a multiple if they lay anywhere, times the number of values tried in its octave and of octaves (Bonferroni). A
 * lower fundamental explains more by chance and so gives way; one that a found family is a multiple of, or that is a
 * multiple of one, is no other family. Fundamentals under eight bandwidths are not looked for.
 * Takes time in proportion to emissions times the highest frequency over eight bandwidths.
 * Throws RangeError unless every frequency and bandwidth is finite and above zero.
 */
export function findClockFamilies(emissions: readonly SeenEmission[]): ClockFamily[] {
  const lines = emissions.map(({ frequencyHz, bandwidthHz }, emission): Line => ({
    emission,
    hz: positive('Frequency', frequencyHz, 'Hz'),
    halfHz: positive('Bandwidth', bandwidthHz, 'Hz') / 2,
  }));
  const found: ClockFamily[] = [];
  let left = lines.sort((a, b) => a.hz - b.hz);
  for (;;) {
    const family = mostCertain(left, found);
    if (!family) return found;
    found.push(family);
    const taken = new Set(family.members.map(({ emission }) => emission));
    left = left.filter(({ emission }) => !taken.has(emission));
  }
}

function mostCertain(lines: readonly Line[], found: readonly ClockFamily[]): ClockFamily | null {
  if (lines.length < LEAST_MEMBERS) return null;
  const lowestHz = LEAST_SPACING_BANDWIDTHS * lines.reduce((widest, { halfHz }) => Math.max(widest, 2 * halfHz), 0);
  const highestHz = lines.reduce((most, { hz, halfHz }) => Math.max(most, hz + halfHz), 0) / LEAST_MEMBERS;
  const edges = edgesOf(lines, lowestHz, highestHz);
  const octaves = Math.max(1, Math.ceil(Math.log2(highestHz / lowestHz)));
  const octaveOf = (hz: number) => Math.min(octaves - 1, Math.floor(Math.log2(Math.max(hz, lowestHz) / lowestHz)));
  const tried = new Float64Array(octaves);
  for (const { start, at } of edges) if (start) tried[octaveOf(at)] = tried[octaveOf(at)]! + 1;
  const lowestLineHz = lines[0]!.hz;
  const widthsHz = lines.reduce((sum, { halfHz }) => sum + 2 * halfHz, 0);
  const byChanceOf = (harmonics: number, fundamentalHz: number) => {
    // Where all lines count, what is no more than usual needs no exact tail, which is a hundredth or more there.
    const usual = fundamentalHz <= lowestLineHz ? widthsHz / fundamentalHz : 0;
    if (harmonics - 1 <= usual + 2 * Math.sqrt(usual)) return Infinity;
    // One emission lies right because the fundamental was taken from it.
    return octaves * tried[octaveOf(fundamentalHz)]! * atLeastByChance(harmonics - 1, chancesAt(lines, fundamentalHz));
  };

  let best: { range: Range; byChance: number } | null = null;
  const active = new Map<number, number>();
  edges.forEach(({ at, start, harmonic }, i) => {
    if (start) {
      active.set(harmonic, (active.get(harmonic) ?? 0) + 1);
      return;
    }
    const before = edges[i - 1]!;
    const range = { lowestHz: before.at, highestHz: at };
    if (before.start && active.size >= LEAST_MEMBERS && !found.some((family) => isRelated(family, range))) {
      const byChance = byChanceOf(active.size, range.lowestHz);
      if (byChance <= MOST_BY_CHANCE && byChance < (best?.byChance ?? Infinity)) best = { range, byChance };
    }
    const many = active.get(harmonic)! - 1;
    if (many > 0) active.set(harmonic, many);
    else active.delete(harmonic);
  });
  if (best === null) return null;
  const { range, byChance } = best as { range: Range; byChance: number };
  return highestThatExplains({ ...fitted(lines, range), byChance }, lines, byChanceOf);
}

/** Where a rising fundamental begins and ceases to explain a line as a harmonic; begins come first where both are. */
function edgesOf(lines: readonly Line[], lowestHz: number, highestHz: number) {
  const edges: { at: number; start: boolean; harmonic: number }[] = [];
  for (const { hz, halfHz } of lines) {
    const last = Math.floor((hz + halfHz) / lowestHz);
    for (let harmonic = Math.max(1, Math.ceil((hz - halfHz) / highestHz)); harmonic <= last; harmonic++) {
      edges.push({ at: Math.max((hz - halfHz) / harmonic, lowestHz), start: true, harmonic });
      edges.push({ at: (hz + halfHz) / harmonic, start: false, harmonic });
    }
  }
  return edges.sort((a, b) => a.at - b.at || Number(b.start) - Number(a.start));
}

/** How probably each line but the one least likely to lies within half its bandwidth of a multiple, if it lies anywhere. */
function chancesAt(lines: readonly Line[], fundamentalHz: number): number[] {
  const chances = lines.flatMap(({ hz, halfHz }) =>
    hz + halfHz >= fundamentalHz ? [Math.min(1, (2 * halfHz) / fundamentalHz)] : [],
  );
  return chances.sort((a, b) => b - a).slice(0, -1);
}

/** Whether one fundamental is a multiple of the other, within their ranges. */
function isRelated(family: Range, range: Range): boolean {
  const [lower, higher] = family.lowestHz < range.lowestHz ? [family, range] : [range, family];
  const ratio = Math.round(higher.lowestHz / lower.lowestHz);
  return [ratio - 1, ratio, ratio + 1].some(
    (m) => m > 0 && m * lower.lowestHz <= higher.highestHz && m * lower.highestHz >= higher.lowestHz,
  );
}

/**
 * A common divisor of two clocks explains both, and half a fundamental explains all of it. So where up to three
 * multiples, each certain by itself, leave no more members than chance brings, the one with the most members stands.
 */
function highestThatExplains(
  family: ClockFamily,
  lines: readonly Line[],
  byChanceOf: (harmonics: number, fundamentalHz: number) => number,
): ClockFamily {
  let rest = family.members;
  let times = 0;
  for (let multiples = 0; multiples < MOST_MULTIPLES; multiples++) {
    const next = commonest(rest);
    const harmonics = new Set(rest.flatMap(({ harmonic }) => (harmonic % next === 0 ? [harmonic] : []))).size;
    if (next < 2 || byChanceOf(harmonics, family.fundamentalHz * next) > MOST_BY_CHANCE) break;
    if (multiples === 0) times = next;
    rest = rest.filter(({ harmonic }) => harmonic % next !== 0);
  }
  if (times === 0) return family;
  const covered = family.members.length - rest.length;
  const chance = Math.min(1, (2 * Math.max(...lines.map(({ halfHz }) => halfHz))) / family.lowestHz);
  const byChanceLeft = atLeastByChance(rest.length, new Array<number>(lines.length - covered).fill(chance));
  if (byChanceLeft <= MOST_BY_CHANCE_FOR_REST) return family;
  const kept = new Set(family.members.flatMap(({ emission, harmonic }) => (harmonic % times === 0 ? [emission] : [])));
  const of = lines.filter(({ emission }) => kept.has(emission));
  const higher = fitted(of, rangeOf(of, family.fundamentalHz * times));
  const harmonics = new Set(higher.members.map(({ harmonic }) => harmonic)).size;
  return highestThatExplains({ ...higher, byChance: byChanceOf(harmonics, higher.lowestHz) }, lines, byChanceOf);
}
