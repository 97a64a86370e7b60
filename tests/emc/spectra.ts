import type { DeclaredClock, SeenEmission } from '@/emc/clockHarmonics';
import { repeatable } from './given';

/** Where an emission of a made spectrum comes from: a fundamental's name, `ambient` or `hump`. */
export interface MadeEmission extends SeenEmission {
  from: string;
  harmonic: number | null;
}

export interface MadeSpectrum {
  clocks: { name: string; fundamentalHz: number }[];
  emissions: MadeEmission[];
}

export interface SpectrumRecipe {
  seed: number;
  /** How many clocks of random fundamentals between these. */
  clocks: number;
  lowestFundamentalHz: number;
  highestFundamentalHz: number;
  /** Share of harmonics that are too low to be seen. */
  missing: number;
  /** What is read lies up to this far from what is there; a quarter of the bandwidth is half a usual step. */
  jitterHz: number;
  ambient: number;
  hump: number;
}

const START = 30e6;
const STOP = 1e9;
const BANDWIDTH = 120e3;

/** A spectrum from 30 MHz to 1 GHz of clocks, ambient lines anywhere and one hump of peaks that stand close. */
export function madeSpectrum(recipe: SpectrumRecipe): MadeSpectrum {
  const random = repeatable(recipe.seed);
  const between = (low: number, high: number) => low * (high / low) ** random();
  const emissions: MadeEmission[] = [];
  const add = (frequencyHz: number, from: string, harmonic: number | null) => {
    const levelDb = 20 + 25 * random();
    emissions.push({ frequencyHz, bandwidthHz: BANDWIDTH, levelDb, marginDb: 47 - levelDb, from, harmonic });
  };
  const clocks = Array.from({ length: recipe.clocks }, (_, i) => ({
    name: `clock ${i}`,
    fundamentalHz: between(recipe.lowestFundamentalHz, recipe.highestFundamentalHz),
  }));
  for (const { name, fundamentalHz } of clocks) {
    for (let n = Math.ceil(START / fundamentalHz); n * fundamentalHz < STOP; n++) {
      const seen = random() >= recipe.missing;
      const jitterHz = (2 * random() - 1) * recipe.jitterHz;
      if (seen) add(n * fundamentalHz + jitterHz, name, n);
    }
  }
  for (let i = 0; i < recipe.ambient; i++) add(between(START, STOP), 'ambient', null);
  const humpHz = between(START * 1.5, STOP / 2);
  for (let i = 0; i < recipe.hump; i++) add(humpHz * (0.85 + 0.3 * random()), 'hump', null);
  return { clocks, emissions };
}

export function declared({ clocks }: MadeSpectrum, tolerancePpm: number): DeclaredClock[] {
  return clocks.map((clock) => ({ ...clock, tolerancePpm }));
}
