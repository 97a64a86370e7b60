export interface FamilyMember {
  /** Index in the emissions that were given. */
  emission: number;
  harmonic: number;
  /** Read less harmonic times fundamental. */
  offsetHz: number;
}

/** Emissions that are whole multiples of one fundamental nobody declared. */
export interface ClockFamily {
  /** Least squares over the members, within what all of them allow. */
  fundamentalHz: number;
  /**
   * Every fundamental in this range puts each member within half its bandwidth, and none outside it does: the spacing
   * supports no more. A member that is there by chance narrows it.
   */
  lowestHz: number;
  highestHz: number;
  /** In ascending frequency. */
  members: FamilyMember[];
  /** Upper bound on how many such families unrelated emissions would show in the whole search. */
  byChance: number;
}

/** Fewer harmonics than this are no family. */
export const LEAST_MEMBERS = 4;
/** An emission with half its bandwidth. */
export interface Line {
  emission: number;
  hz: number;
  halfHz: number;
}
/** Fundamentals, both ends included. */
export interface Range {
  lowestHz: number;
  highestHz: number;
}

/** The family of one fundamental among lines: those within half their bandwidth of a harmonic of the range's middle. */
export function fitted(lines: readonly Line[], { lowestHz, highestHz }: Range): Omit<ClockFamily, 'byChance'> {
  const middleHz = (lowestHz + highestHz) / 2;
  const inside = lines.flatMap((line) => {
    const harmonic = Math.round(line.hz / middleHz);
    // A range may be no wider than rounding.
    const within = Math.abs(line.hz - harmonic * middleHz) <= line.halfHz * (1 + 1e-9);
    return harmonic > 0 && within ? [{ ...line, harmonic }] : [];
  });
  let [products, squares] = [0, 0];
  for (const { hz, harmonic } of inside) {
    products += hz * harmonic;
    squares += harmonic ** 2;
  }
  const fundamentalHz = Math.min(highestHz, Math.max(lowestHz, products / squares));
  const members = inside.map(({ emission, hz, harmonic }) => ({
    emission,
    harmonic,
    offsetHz: hz - harmonic * fundamentalHz,
  }));
  return { fundamentalHz, lowestHz, highestHz, members };
}

/** The fundamentals that explain every line as the harmonic it is nearest to. */
export function rangeOf(lines: readonly Line[], nearHz: number): Range {
  const harmonicOf = ({ hz }: Line) => Math.round(hz / nearHz);
  return {
    lowestHz: Math.max(...lines.map((line) => (line.hz - line.halfHz) / harmonicOf(line))),
    highestHz: Math.min(...lines.map((line) => (line.hz + line.halfHz) / harmonicOf(line))),
  };
}
/** The factor that at least four harmonics share, most of them, and the largest of such; 0 where there is none. */
export function commonest(members: readonly FamilyMember[]): number {
  const highest = members.reduce((most, { harmonic }) => Math.max(most, harmonic), 0);
  let [factor, most] = [0, LEAST_MEMBERS];
  for (let times = 2; times * LEAST_MEMBERS <= highest; times++) {
    const share = members.filter(({ harmonic }) => harmonic % times === 0).length;
    if (share >= most) [factor, most] = [times, share];
  }
  return factor;
}
