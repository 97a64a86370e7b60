import { isFrequency } from './axis';
import type { Verdict } from './kinds';

/** A run with the EUT switched off, corrected as the EUT run was. Frequencies ascend; an edge may stand twice. */
export interface AmbientRun {
  frequencyHz: Float64Array;
  levelDb: Float64Array;
}

/** A candidate of the EUT run, judged by the rule: its level is signal plus ambient. */
export interface AmbientCandidate {
  frequencyHz: number;
  bandwidthHz: number;
  levelDb: number;
  verdict: Verdict;
  /** A person's reason for leaving it out as ambient; null where nobody did. Taken as it is, never decided here. */
  exclusion: string | null;
}

export interface AmbientFinding {
  /** Null where the ambient is not known. */
  presentInAmbient: boolean | null;
  /** Level less the highest ambient level within the bandwidth; null where there is none. */
  differenceDb: number | null;
  /** Present in the ambient, and signal plus ambient is not under. */
  obscured: boolean;
  /** Over and inconclusive need a final where they are obscured; everything else is as it was judged. */
  verdict: Verdict;
  /** False where a person left it out. */
  counts: boolean;
  /** Why it is obscured or not known, as a sentence. */
  because: string | null;
}

/**
 * What an ambient run says about candidates of an EUT run. The highest ambient level within half the bandwidth of the
 * candidate is compared; one that the candidate does not exceed by more than `obscuredWithinDb` makes it present in
 * the ambient. Such a candidate is obscured: the reading does not tell EUT from surroundings, so over and inconclusive
 * become needs a final (another place, time or a narrower bandwidth could tell). Where signal plus ambient together are
 * under, that counts as under (CISPR 16-2-3 on ambient disturbance; from memory). Outside the ambient's
 * range, and where no ambient point lies within the bandwidth, nothing is known and the verdict stays.
 * Throws RangeError on a difference that is negative, levels and frequencies that are none, an ambient that falls in
 * frequency, and an exclusion without a reason.
 */
export function compareWithAmbient(
  candidates: readonly AmbientCandidate[],
  ambient: AmbientRun,
  obscuredWithinDb: number,
): AmbientFinding[] {
  if (!(obscuredWithinDb >= 0 && Number.isFinite(obscuredWithinDb))) {
    throw new RangeError(`A difference of ${obscuredWithinDb} dB cannot be.`);
  }
  checkAmbient(ambient);
  return candidates.map((candidate) => findingOf(candidate, ambient, obscuredWithinDb));
}

function findingOf(candidate: AmbientCandidate, ambient: AmbientRun, withinDb: number): AmbientFinding {
  const { frequencyHz, bandwidthHz, levelDb, verdict, exclusion } = candidate;
  if (!isFrequency(frequencyHz) || !isFrequency(bandwidthHz) || !Number.isFinite(levelDb)) {
    throw new RangeError(`A candidate of ${levelDb} dB at ${frequencyHz} Hz in ${bandwidthHz} Hz cannot be.`);
  }
  if (exclusion !== null && exclusion.trim() === '') {
    throw new RangeError(`The candidate at ${frequencyHz} Hz is left out without a reason.`);
  }
  const stands = { presentInAmbient: null, differenceDb: null, obscured: false, verdict, counts: exclusion === null };
  const axis = ambient.frequencyHz;
  if (axis.length === 0 || frequencyHz < axis[0]! || frequencyHz > axis.at(-1)!) {
    return { ...stands, because: 'The ambient run does not reach this frequency.' };
  }
  const ambientDb = highestWithin(ambient, frequencyHz - bandwidthHz / 2, frequencyHz + bandwidthHz / 2);
  if (ambientDb === null) return { ...stands, because: 'The ambient run has no point within the bandwidth here.' };
  const differenceDb = levelDb - ambientDb;
  const presentInAmbient = differenceDb <= withinDb;
  const obscured = presentInAmbient && verdict !== 'under';
  const settled = obscured && verdict !== 'not-covered' ? 'needs-final' : verdict;
  const because = obscured ? 'The ambient is as high here, so the reading does not tell it from the EUT.' : null;
  return { ...stands, presentInAmbient, differenceDb, obscured, verdict: settled, because };
}

function highestWithin({ frequencyHz, levelDb }: AmbientRun, fromHz: number, toHz: number): number | null {
  let low = 0;
  for (let high = frequencyHz.length; low < high;) {
    const middle = (low + high) >> 1;
    if (frequencyHz[middle]! < fromHz) low = middle + 1;
    else high = middle;
  }
  let highest: number | null = null;
  for (let i = low; i < frequencyHz.length && frequencyHz[i]! <= toHz; i++) {
    if (highest === null || levelDb[i]! > highest) highest = levelDb[i]!;
  }
  return highest;
}

function checkAmbient({ frequencyHz, levelDb }: AmbientRun): void {
  if (frequencyHz.length !== levelDb.length) {
    throw new RangeError(`The ambient holds ${frequencyHz.length} frequencies and ${levelDb.length} levels.`);
  }
  frequencyHz.forEach((hz, i) => {
    if (!isFrequency(hz)) throw new RangeError(`Ambient: ${hz} Hz is no frequency.`);
    if (i > 0 && hz < frequencyHz[i - 1]!) throw new RangeError(`Ambient: ${hz} Hz follows ${frequencyHz[i - 1]} Hz.`);
    if (!Number.isFinite(levelDb[i])) throw new RangeError(`Ambient: ${levelDb[i]} at ${hz} Hz is no level.`);
  });
}
