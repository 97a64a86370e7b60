import { findClockFamilies } from './clockFamilies';
import { attributeHarmonics, type DeclaredClock, type HarmonicMatch, type SeenEmission } from './clockHarmonics';
import type { ClockFamily } from './familyFit';
import { findSidebands, type SidebandMatch, type SwitchingConverter } from './sidebands';

export interface LikelySource {
  /** Declared clocks that could make it, nearest first; more than one is an overlap. */
  harmonics: HarmonicMatch[];
  /** Declared clocks whose harmonics lie too close together here to say anything. */
  untelling: HarmonicMatch[];
  /** Higher emissions it could be a sideband of, mirrored ones first. */
  sidebands: SidebandMatch[];
  /** Indices of the families found whose harmonic it could be; more than one is an overlap. */
  families: number[];
}

export interface LikelySources {
  /** One per emission, in the order given. */
  emissions: LikelySource[];
  families: ClockFamily[];
}

/**
 * Where emissions may come from: harmonics of declared clocks, sidebands of declared converters, and families of
 * harmonics among what neither explains. A sideband counts as explained when its mirror image was read too. Nothing is
 * decided: frequency alone shows what can be, and a probe at the board shows what is.
 * Throws RangeError as `attributeHarmonics`, `findSidebands` and `findClockFamilies` do.
 */
export function likelySources(
  emissions: readonly SeenEmission[],
  clocks: readonly DeclaredClock[],
  converters: readonly SwitchingConverter[] = [],
  highestOrder = 3,
): LikelySources {
  const harmonics = attributeHarmonics(emissions, clocks);
  const sidebands = findSidebands(emissions, converters, highestOrder);
  const open = emissions.flatMap((_, i) =>
    harmonics[i]!.matches.length === 0 && !sidebands[i]!.some(({ mirrored }) => mirrored) ? [i] : [],
  );
  const families = findClockFamilies(open.map((i) => emissions[i]!)).map((family) => ({
    ...family,
    members: family.members.map((member) => ({ ...member, emission: open[member.emission]! })),
  }));
  return {
    families,
    emissions: emissions.map((emission, i) => ({
      harmonics: harmonics[i]!.matches,
      untelling: harmonics[i]!.untelling,
      sidebands: sidebands[i]!,
      families: open.includes(i) ? families.flatMap((family, at) => (couldBe(emission, family) ? [at] : [])) : [],
    })),
  };
}

/** Whether some fundamental of the family's range has a harmonic within half the bandwidth. */
function couldBe({ frequencyHz, bandwidthHz }: SeenEmission, { lowestHz, highestHz }: ClockFamily): boolean {
  const first = Math.max(1, Math.ceil((frequencyHz - bandwidthHz / 2) / highestHz));
  return first * lowestHz <= frequencyHz + bandwidthHz / 2;
}
