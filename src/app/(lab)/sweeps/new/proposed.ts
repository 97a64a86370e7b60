import type { Port } from '@/schemas/common';
import type { LimitSetView, PathView } from '@/schemas/bench';
import type { SampleView } from '@/schemas/job';
import type { SweepFileView } from '@/schemas/sweepFile';

/** How much of a range a set's lines cover, in decades. */
function overlap(set: LimitSetView, firstHz: number, lastHz: number): number {
  const low = Math.min(...set.lines.flatMap((line) => line.segments.map((segment) => segment.startHz)));
  const high = Math.max(...set.lines.flatMap((line) => line.segments.map((segment) => segment.stopHz)));
  return Math.log10(Math.min(high, lastHz) / Math.max(low, firstHz, 1));
}

/**
 * The set of a port that covers most of a range, at the distance of the path where either names one; of equals the one
 * the lab entered first (the list is newest first).
 */
export function proposedLimitSet(
  sets: readonly LimitSetView[],
  port: Port,
  [firstHz, lastHz]: readonly [number, number],
  path: PathView | undefined,
): string {
  const serves = ({ distanceM }: LimitSetView) =>
    distanceM === null || !path || path.distanceM === null || path.distanceM === distanceM;
  const fit = [...sets]
    .reverse()
    .filter((set) => set.port === port && serves(set))
    .map((set) => ({ set, covers: overlap(set, firstHz, lastHz) }))
    .sort((a, b) => b.covers - a.covers);
  return fit[0]?.set.id ?? '';
}

/** The path of a port whose tables reach furthest over a range; a path with lapsed equipment comes last. */
export function proposedPath(paths: readonly PathView[], port: Port, firstHz: number, lastHz: number): string {
  const fit = paths
    .filter((path) => path.port === port)
    .map((path) => ({
      path,
      lapsed: path.items.some((item) => item.due === 'lapsed') ? 1 : 0,
      covers: Math.log10(Math.min(path.highHz ?? lastHz, lastHz) / Math.max(path.lowHz ?? firstHz, firstHz, 1)),
    }))
    .sort((a, b) => a.lapsed - b.lapsed || b.covers - a.covers || a.path.code.localeCompare(b.path.code));
  return fit[0]?.path.id ?? '';
}

const TERM_WORDS: [RegExp, RegExp][] = [
  [/antenna|transducer/i, /antenna/i],
  [/limiter/i, /limiter/i],
  [/cable/i, /cable/i],
  [/amplifier|preamp/i, /preamplifier/i],
  [/network|voltage division|AMN|LISN/i, /voltage division|AMN|AAN/i],
  [/transfer impedance/i, /transfer impedance|probe/i],
  [/clamp factor/i, /clamp/i],
  [/attenuator|external attenuation/i, /attenuat/i],
];

/** Terms of a path that the file says are in its values; a proposal to be looked at. */
export function proposedCorrected(file: SweepFileView, path: PathView | undefined): string[] {
  const said = file.recognition.correctedFor.map(({ what }) => what).join('; ');
  return (path?.terms ?? [])
    .filter((term) => TERM_WORDS.some(([file, name]) => file.test(said) && name.test(term.name)))
    .map((term) => term.id);
}

/** The state a file's name speaks of (`m2`), in the sample of the named state or in the only sample there is. */
export function proposedState(file: SweepFileView, samples: readonly SampleView[], stateId: string | null): string {
  const named = samples.find((sample) => sample.states.some((state) => state.id === stateId));
  if (stateId && named) return stateId;
  const code = file.name.toLowerCase().replace(/[^a-z0-9]/g, '');
  const spoken = samples.filter((sample) => code.includes(sample.product.code.toLowerCase().replace(/[^a-z0-9]/g, '')));
  const sample = spoken.length === 1 ? spoken[0]! : null;
  const measured = sample?.states.filter((state) => !state.planned) ?? [];
  const label = file.proposals.state?.toUpperCase();
  return (measured.find((state) => state.label === label) ?? (label ? undefined : measured.at(-1)))?.id ?? '';
}
