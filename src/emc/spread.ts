import { momentsOf, type Moments } from './moments';

/** Levels of one sample at shared frequencies; null where it has none. */
export interface SampleLevels {
  sampleId: string;
  levels: readonly (number | null)[];
}

/** What several samples show at one frequency; absent levels are left out and `n` counts the rest. */
export interface Spread extends Moments {
  frequencyHz: number;
  /** The highest level and whose it is, the first of equals; null where no sample has a level. */
  worst: { sampleId: string; level: number } | null;
}

/**
 * Mean, standard deviation and worst sample at each frequency, in the order of the frequencies. Throws RangeError on a
 * sample that has not one level (or null) for each frequency, on two samples of one name, and on a level that is none.
 */
export function spreadOf(frequencyHz: readonly number[], samples: readonly SampleLevels[]): Spread[] {
  const names = new Set<string>();
  for (const { sampleId, levels } of samples) {
    if (levels.length !== frequencyHz.length) {
      throw new RangeError(`${sampleId} has ${levels.length} levels for ${frequencyHz.length} frequencies.`);
    }
    if (names.has(sampleId)) throw new RangeError(`${sampleId} is there twice.`);
    names.add(sampleId);
  }
  return frequencyHz.map((hz, i) => {
    const present = samples.flatMap(({ sampleId, levels }) => {
      const level = levels[i]!;
      return level === null ? [] : [{ sampleId, level }];
    });
    let worst: Spread['worst'] = null;
    for (const one of present) if (worst === null || one.level > worst.level) worst = one;
    return { frequencyHz: hz, ...momentsOf(present.map(({ level }) => level)), worst };
  });
}
