import { positive } from './freeSpace';

/** Something that was read: its true frequency lies within half the bandwidth of what was read. */
export interface SeenEmission {
  frequencyHz: number;
  bandwidthHz: number;
  levelDb: number;
  marginDb: number | null;
}

export interface DeclaredClock {
  name: string;
  fundamentalHz: number;
  /** How far the fundamental may be off to either side. */
  tolerancePpm: number;
  /** How far a spread-spectrum clock is swept below and above, on top of the tolerance. */
  spread?: { belowPpm: number; abovePpm: number };
}

export interface HarmonicMatch {
  clock: string;
  harmonic: number;
  /** Harmonic times the declared fundamental. */
  expectedHz: number;
  /** Read less expected. */
  offsetHz: number;
  /** How probable it is that an emission from elsewhere lies as well: the window over the spacing, at most 1. */
  byChance: number;
}

export interface HarmonicAttribution {
  /** Every clock that could make the emission, nearest first; more than one is an overlap. */
  matches: HarmonicMatch[];
  /** Clocks whose harmonics lie so close together here that any emission would fit them; they say nothing. */
  untelling: HarmonicMatch[];
}

/** A match that an emission from elsewhere would make this often says nothing. Chosen here: as often as not. */
const SAYS_NOTHING = 0.5;

/**
 * For each emission the declared clocks that have a harmonic within the clock's tolerance and spread plus half the
 * emission's bandwidth. Of one clock the nearest harmonic only. Throws RangeError on frequencies, bandwidths and
 * tolerances that cannot be.
 */
export function attributeHarmonics(
  emissions: readonly SeenEmission[],
  clocks: readonly DeclaredClock[],
): HarmonicAttribution[] {
  return emissions.map((emission) => {
    const all = clocks.flatMap((clock) => harmonicAt(emission, clock) ?? []);
    all.sort((a, b) => Math.abs(a.offsetHz) - Math.abs(b.offsetHz));
    return {
      matches: all.filter(({ byChance }) => byChance < SAYS_NOTHING),
      untelling: all.filter(({ byChance }) => byChance >= SAYS_NOTHING),
    };
  });
}

function harmonicAt({ frequencyHz, bandwidthHz }: SeenEmission, clock: DeclaredClock): HarmonicMatch | null {
  const halfHz = positive('Bandwidth', bandwidthHz, 'Hz') / 2;
  const { name, fundamentalHz } = clock;
  const below = partOf(clock, clock.spread?.belowPpm ?? 0);
  const above = partOf(clock, clock.spread?.abovePpm ?? 0);
  const lowestHz = positive('Fundamental', fundamentalHz, 'Hz') * (1 - below);
  const highestHz = fundamentalHz * (1 + above);
  const first = Math.max(1, Math.ceil((positive('Frequency', frequencyHz, 'Hz') - halfHz) / highestHz));
  const last = Math.floor((frequencyHz + halfHz) / lowestHz);
  if (last < first) return null;
  const harmonic = Math.min(last, Math.max(first, Math.round(frequencyHz / fundamentalHz)));
  const expectedHz = harmonic * fundamentalHz;
  const windowHz = bandwidthHz + harmonic * (highestHz - lowestHz);
  const byChance = Math.min(1, windowHz / fundamentalHz);
  return { clock: name, harmonic, expectedHz, offsetHz: frequencyHz - expectedHz, byChance };
}

/** Tolerance and spread to one side, as a part of the fundamental. */
function partOf({ name, tolerancePpm }: DeclaredClock, spreadPpm: number): number {
  const part = (tolerancePpm + spreadPpm) / 1e6;
  if (!(tolerancePpm >= 0 && spreadPpm >= 0 && part < 1)) {
    throw new RangeError(`${name}: a tolerance of ${tolerancePpm} ppm and a spread of ${spreadPpm} ppm cannot be.`);
  }
  return part;
}
