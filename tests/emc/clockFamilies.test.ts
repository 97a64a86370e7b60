import { findClockFamilies, MOST_BY_CHANCE } from '@/emc/clockFamilies';
import type { SeenEmission } from '@/emc/clockHarmonics';
import { LEAST_MEMBERS, type ClockFamily } from '@/emc/familyFit';
import { likelySources } from '@/emc/likelySources';
import { repeatable } from './given';
import { madeSpectrum, type SpectrumRecipe } from './spectra';

const at = (frequencyHz: number, bandwidthHz = 120e3): SeenEmission => ({
  frequencyHz,
  bandwidthHz,
  levelDb: 30,
  marginDb: 10,
});
const recipe: Omit<SpectrumRecipe, 'seed'> = {
  clocks: 1,
  lowestFundamentalHz: 8e6,
  highestFundamentalHz: 60e6,
  missing: 0.3,
  jitterHz: 30e3,
  ambient: 12,
  hump: 8,
};
/** Whether a family is of a fundamental, as well as its highest member can tell. */
function isOf({ fundamentalHz, members }: ClockFamily, hz: number, jitterHz: number): boolean {
  return Math.abs(fundamentalHz - hz) <= (60e3 + jitterHz) / members.at(-1)!.harmonic;
}

describe('unknown families of harmonics', () => {
  test('exact harmonics of one fundamental are one family of it, whatever it is', () => {
    for (const fundamentalHz of [5e6, 12.288e6, 24e6, 33.333e6, 100e6]) {
      const emissions = Array.from({ length: 9 }, (_, i) => at((i + 2) * fundamentalHz));
      const [family, ...more] = findClockFamilies(emissions);
      expect(more).toEqual([]);
      expect(family!.fundamentalHz).toBeCloseTo(fundamentalHz, 3);
      expect(family!.members.map(({ emission, harmonic }) => [emission, harmonic])).toEqual(
        emissions.map((_, i) => [i, i + 2]),
      );
      // The 10th harmonic, known to 60 kHz, tells the fundamental to 6 kHz.
      expect(family!.lowestHz).toBeCloseTo(fundamentalHz - 6e3, 3);
      expect(family!.highestHz).toBeCloseTo(fundamentalHz + 6e3, 3);
      expect(family!.byChance).toBeLessThan(MOST_BY_CHANCE);
    }
  });

  test('four lone members are a family, three are none', () => {
    const of = (harmonics: number[]) => findClockFamilies(harmonics.map((n) => at(n * 25e6)));
    expect(of([3, 5, 7, 8])).toMatchObject([{ members: { length: LEAST_MEMBERS } }]);
    expect(of([3, 5, 7])).toEqual([]);
    // Two readings of one harmonic are one member.
    expect(findClockFamilies([at(75e6), at(75.02e6), at(125e6), at(175e6)])).toEqual([]);
  });

  test('half the bandwidth counts as within it: members may leave one single fundamental', () => {
    const of = (apartHz: number) =>
      findClockFamilies([at(75e6 + apartHz), at(125e6 - apartHz), at(175e6), at(200e6)]).map(
        ({ lowestHz, highestHz, members }) => [lowestHz, highestHz, members.length],
      );
    expect(of(60e3)).toEqual([[25e6, 25e6, 4]]);
    expect(of(60_001)).toEqual([]);
  });

  test('odd harmonics are of the fundamental, even ones alone of its double', () => {
    const of = (harmonics: number[]) => findClockFamilies(harmonics.map((n) => at(n * 20e6)));
    expect(of([3, 5, 7, 9, 11, 13, 15])[0]!.fundamentalHz).toBeCloseTo(20e6, 3);
    expect(of([2, 4, 6, 8, 10, 12, 14])[0]!.fundamentalHz).toBeCloseTo(40e6, 3);
  });

  test('one stray odd multiple of half the fundamental does not halve it; a row of them does', () => {
    const even = Array.from({ length: 12 }, (_, i) => at((i + 2) * 30e6));
    expect(findClockFamilies([...even, at(15e6 * 9)])[0]!.fundamentalHz).toBeCloseTo(30e6, 3);
    const odd = Array.from({ length: 12 }, (_, i) => at((2 * i + 5) * 15e6));
    expect(findClockFamilies([...even, ...odd])[0]!.fundamentalHz).toBeCloseTo(15e6, 3);
  });

  test('two clocks with a common divisor are two families, not the divisor', () => {
    const clocks = [11, 13].flatMap((m) => Array.from({ length: 14 }, (_, i) => at((i + 1) * m * 2.92e6)));
    const found = findClockFamilies(clocks).map(({ fundamentalHz }) => fundamentalHz / 2.92e6);
    expect(found.map((times) => Math.round(times)).sort((a, b) => a - b)).toEqual([11, 13]);
  });

  test.each([
    ['exact', { missing: 0, jitterHz: 0 }],
    ['three in ten missing, read up to 30 kHz off', {}],
  ])('one clock among 20 others, harmonics %s, is found in 12 of 12 made spectra, and alone', (_, more) => {
    for (let seed = 1; seed <= 12; seed++) {
      const made = madeSpectrum({ ...recipe, ...more, seed });
      const found = findClockFamilies(made.emissions);
      expect(found).toHaveLength(1);
      expect(isOf(found[0]!, made.clocks[0]!.fundamentalHz, recipe.jitterHz)).toBe(true);
      const mine = new Set(found[0]!.members.map(({ emission }) => emission));
      made.emissions.forEach(({ from }, i) => {
        if (from === 'clock 0') expect(mine.has(i)).toBe(true);
      });
      // Of 20 others a few lie in a window of 120 kHz by chance.
      expect(mine.size - made.emissions.filter(({ from }) => from === 'clock 0').length).toBeLessThanOrEqual(4);
    }
  });

  test('emissions that have nothing to do with each other show a family in no more than one of a hundred spectra', () => {
    let families = 0;
    for (let seed = 1; seed <= 200; seed++) {
      const size = 6 + (seed % 20);
      families += findClockFamilies(
        madeSpectrum({ ...recipe, seed, clocks: 0, ambient: size, hump: 4 }).emissions,
      ).length;
    }
    expect(families).toBeLessThanOrEqual(200 * MOST_BY_CHANCE);
  });

  test('every member lies within half its bandwidth of its harmonic for any fundamental of the range, and belongs once', () => {
    for (let seed = 1; seed <= 3; seed++) {
      const { emissions } = madeSpectrum({ ...recipe, seed, clocks: 2 });
      const families = findClockFamilies(emissions);
      const all = families.flatMap(({ members }) => members.map(({ emission }) => emission));
      expect(new Set(all).size).toBe(all.length);
      for (const { members, lowestHz, highestHz, fundamentalHz } of families) {
        expect(fundamentalHz).toBeGreaterThanOrEqual(lowestHz);
        expect(fundamentalHz).toBeLessThanOrEqual(highestHz);
        for (const { emission, harmonic, offsetHz } of members) {
          const { frequencyHz } = emissions[emission]!;
          expect(offsetHz).toBeCloseTo(frequencyHz - harmonic * fundamentalHz, 3);
          for (const hz of [lowestHz, highestHz]) expect(Math.abs(frequencyHz - harmonic * hz)).toBeLessThan(60e3 + 1);
        }
      }
      for (const one of families) {
        for (const other of families) {
          const ratio = one.fundamentalHz / other.fundamentalHz;
          if (one !== other) expect(Math.abs(ratio - Math.round(ratio))).toBeGreaterThan(1e-6);
        }
      }
    }
  });

  test('the order of the emissions decides nothing but their indices', () => {
    const { emissions } = madeSpectrum({ ...recipe, seed: 3 });
    const random = repeatable(7);
    const order = emissions.map((_, i) => i).sort(() => random() - 0.5);
    const [straight] = findClockFamilies(emissions);
    const [shuffled] = findClockFamilies(order.map((i) => emissions[i]!));
    expect(shuffled!.members.map(({ emission }) => order[emission])).toEqual(
      straight!.members.map(({ emission }) => emission),
    );
  });

  test('no emissions, and what is no emission', () => {
    expect(findClockFamilies([])).toEqual([]);
    expect(() => findClockFamilies([at(0)])).toThrow('Frequency 0 Hz');
    expect(() => findClockFamilies([at(1e6, -1)])).toThrow('Bandwidth -1 Hz');
  });
});

describe('likely sources together', () => {
  const unknown = [2, 3, 4, 5, 6, 7].map((n) => at(n * 37e6));
  const clock = { name: 'crystal', fundamentalHz: 25e6, tolerancePpm: 50 };

  test('families are found among what no declared clock explains, by the indices given', () => {
    const emissions = [at(50e6), at(75e6), ...unknown, at(100e6), at(125e6), at(150e6)];
    const { families, emissions: said } = likelySources(emissions, [clock]);
    expect(families).toHaveLength(1);
    expect(families[0]!.members.map(({ emission }) => emission)).toEqual([2, 3, 4, 5, 6, 7]);
    expect(said.map(({ families: of }) => of.length)).toEqual([0, 0, 1, 1, 1, 1, 1, 1, 0, 0, 0]);
    expect(said.map(({ harmonics }) => harmonics.length)).toEqual([1, 1, 0, 0, 0, 0, 0, 0, 1, 1, 1]);
    expect(likelySources(emissions, []).families).toHaveLength(2);
    // 925 MHz is both 37 times 25 MHz and 25 times 37 MHz: the declared clock explains it.
    const both = likelySources([...emissions, at(925e6)], [clock]);
    expect(both.emissions[11]).toMatchObject({ harmonics: [{ harmonic: 37 }], families: [] });
  });

  test('mirrored sidebands are explained and join no family, single ones are not', () => {
    const narrow = (hz: number, levelDb: number) => ({ ...at(hz, 9e3), levelDb });
    const converter = { name: 'buck', frequencyHz: 400e3, tolerancePpm: 100 };
    const { emissions } = likelySources(
      [narrow(25e6, 60), narrow(25.4e6, 40), narrow(24.6e6, 40)],
      [clock],
      [converter],
    );
    expect(emissions.map(({ sidebands }) => sidebands.map(({ order }) => order))).toEqual([[], [1], [-1]]);
    const carriers = unknown.map((one) => ({ ...one, bandwidthHz: 9e3, levelDb: 30 }));
    const besides = [narrow(37e6 * 4 + 400e3, 20)];
    const single = likelySources([...carriers, ...besides], [], [converter]);
    expect(single.emissions[6]!.sidebands).toMatchObject([{ carrier: 2, order: 1, mirrored: false }]);
    expect(single.families[0]!.members).toHaveLength(6);
    // 148 MHz lies beside something higher at 147.6 MHz and stays the family's.
    const beside = likelySources([...carriers, narrow(37e6 * 4 - 400e3, 50)], [], [converter]);
    expect(beside.emissions[2]).toMatchObject({ sidebands: [{ carrier: 6, mirrored: false }], families: [0] });
  });
});
