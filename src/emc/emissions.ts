import type { Verdict } from './kinds';
import { severity } from './verdict';

/** Where something was read: one frequency, or the stretch of a floor, and the bandwidth it was read in. */
export interface Place {
  kind: 'peak' | 'floor';
  /** Both are the frequency for a peak. */
  fromHz: number;
  toHz: number;
  bandwidthHz: number;
}

/** Something read at a place. `carried` ones come from an earlier state and give way to what was read in this one. */
export interface Sighting extends Place {
  verdict: Verdict;
  marginDb: number;
  carried?: boolean;
}

export interface Emission<S extends Sighting> extends Place {
  /** Worst first; the first gave its place to the emission, unless that is a floor. */
  sightings: S[];
}

/** How much ground lies between two places; 0 where they touch or overlap. */
export function apartHz(a: Place, b: Place): number {
  return Math.max(0, b.fromHz - a.toHz, a.fromHz - b.toHz);
}

/**
 * Whether two places are one emission: a receiver does not tell apart what lies nearer than its bandwidth, and what it
 * reads lies within half of it to either side. So the spacing is half of each bandwidth added, and a floor is never a
 * peak. Common practice.
 */
export function isOneEmission(a: Place, b: Place): boolean {
  return a.kind === b.kind && apartHz(a, b) <= (a.bandwidthHz + b.bandwidthHz) / 2;
}

/**
 * Puts sightings together as emissions, whatever order they come in. Peaks: the worst sighting gives its place to an
 * emission, and every other within the spacing belongs to the nearest such place; so emissions lie further apart than
 * the spacing and grouping them again changes nothing. Floors that touch within the spacing are one stretch.
 * Answers in ascending frequency, peaks before floors.
 */
export function groupEmissions<S extends Sighting>(sightings: readonly S[]): Emission<S>[] {
  const sorted = [...sightings].sort(worseFirst);
  return [
    ...groupPeaks(sorted.filter(({ kind }) => kind === 'peak')),
    ...joinFloors(sorted.filter(({ kind }) => kind === 'floor')),
  ];
}

function worseFirst(a: Sighting, b: Sighting): number {
  return (
    Number(a.carried ?? false) - Number(b.carried ?? false) ||
    severity(a.verdict) - severity(b.verdict) ||
    a.marginDb - b.marginDb ||
    ascending(a, b)
  );
}

function ascending(a: Place, b: Place): number {
  return a.fromHz - b.fromHz || a.toHz - b.toHz || a.bandwidthHz - b.bandwidthHz;
}

function groupPeaks<S extends Sighting>(sorted: readonly S[]): Emission<S>[] {
  const heads = peaksByFrequency<Emission<S>>(sorted);
  const others: S[] = [];
  for (const sighting of sorted) {
    if (heads.near(sighting).length > 0) others.push(sighting);
    else heads.add({ ...placeOf(sighting), sightings: [sighting] });
  }
  for (const sighting of others) {
    const [nearest] = heads
      .near(sighting)
      .sort((a, b) => apartHz(a, sighting) - apartHz(b, sighting) || ascending(a, b));
    nearest!.sightings.push(sighting);
  }
  return heads.all().sort(ascending);
}

/** Peaks in drawers as wide as the widest bandwidth, so that those near one are in its own drawer or the next. */
export function peaksByFrequency<P extends Place>(widths: readonly Place[], peaks: readonly P[] = []) {
  const widest = widths.reduce((most, { bandwidthHz }) => Math.max(most, bandwidthHz), 1);
  const drawers = new Map<number, P[]>();
  const drawerOf = ({ fromHz }: Place) => Math.floor(fromHz / widest);
  const add = (peak: P): void => {
    const drawer = drawers.get(drawerOf(peak));
    if (drawer) drawer.push(peak);
    else drawers.set(drawerOf(peak), [peak]);
  };
  peaks.forEach(add);
  return {
    add,
    /** Those that are one emission with `place`; none of them is narrower apart than `widths` said. */
    near(place: Place): P[] {
      const key = drawerOf(place);
      const around = [key - 1, key, key + 1].flatMap((one) => drawers.get(one) ?? []);
      return around.filter((one) => isOneEmission(one, place));
    },
    all: (): P[] => [...drawers.values()].flat(),
  };
}

function joinFloors<S extends Sighting>(sorted: readonly S[]): Emission<S>[] {
  const joined: (Emission<S> & { reachHz: number })[] = [];
  const edgeOf = ({ fromHz, bandwidthHz }: Place) => fromHz - bandwidthHz / 2;
  for (const sighting of [...sorted].sort((a, b) => edgeOf(a) - edgeOf(b) || ascending(a, b))) {
    const last = joined.at(-1);
    const reachHz = sighting.toHz + sighting.bandwidthHz / 2;
    if (!last || edgeOf(sighting) > last.reachHz) {
      joined.push({ ...placeOf(sighting), sightings: [sighting], reachHz });
      continue;
    }
    last.fromHz = Math.min(last.fromHz, sighting.fromHz);
    last.toHz = Math.max(last.toHz, sighting.toHz);
    last.bandwidthHz = Math.max(last.bandwidthHz, sighting.bandwidthHz);
    last.reachHz = Math.max(last.reachHz, reachHz);
    last.sightings.push(sighting);
  }
  return joined.map(({ reachHz: _, ...floor }) => ({ ...floor, sightings: floor.sightings.sort(worseFirst) }));
}

function placeOf({ kind, fromHz, toHz, bandwidthHz }: Place): Place {
  return { kind, fromHz, toHz, bandwidthHz };
}
