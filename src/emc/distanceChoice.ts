import { positive } from './freeSpace';
import type { LimitLine } from './types';

type Tabulated = LimitLine & { distanceM: number };

/**
 * Which of a requirement's lines a measured distance is judged against, and why: `at-measured-distance` when the
 * document tabulates one there; otherwise `nearest-distance`, and the level has to be converted from `fromM` to `toM`,
 * which is for a person to choose. `nothing-tabulated` when no line names a distance.
 */
export type DistanceChoice =
  | { because: 'at-measured-distance'; line: Tabulated }
  | { because: 'nearest-distance'; line: Tabulated; fromM: number; toM: number }
  | { because: 'nothing-tabulated' };

/**
 * Chooses among the lines of one requirement (one document, class and detector) at several distances. A limit tabulated
 * where the antenna stood is preferred, because no law of distance is needed and the tables do not follow one: from
 * 10 m to 3 m CISPR 32 steps by 10 dB, the law by 10.46 dB. Nearest is the smallest ratio of distances, which is the
 * smallest correction; of two equally near the closer one. Distances within 1 mm per metre are the same.
 * Throws RangeError on a distance of zero or less, on lines of several detectors or units, and on two at one distance.
 */
export function lineForDistance(lines: readonly LimitLine[], measuredM: number): DistanceChoice {
  positive('Distance', measuredM, 'm');
  const tabulated = lines.filter((line): line is Tabulated => line.distanceM !== null);
  checkOneRequirement(tabulated);
  const decades = (line: Tabulated) => Math.abs(Math.log10(line.distanceM / measuredM));
  const [nearest] = tabulated.sort((a, b) => decades(a) - decades(b) || a.distanceM - b.distanceM);
  if (!nearest) return { because: 'nothing-tabulated' };
  if (Math.abs(nearest.distanceM - measuredM) <= SAME_DISTANCE * measuredM) {
    return { because: 'at-measured-distance', line: nearest };
  }
  return { because: 'nearest-distance', line: nearest, fromM: measuredM, toM: nearest.distanceM };
}

/** Closer than an antenna's reference point can be set; 0.009 dB. Chosen here. */
const SAME_DISTANCE = 1e-3;

function checkOneRequirement(lines: readonly Tabulated[]): void {
  lines.forEach((line, i) => {
    positive('Distance', line.distanceM, 'm');
    const first = lines[0]!;
    if (line.detector !== first.detector || line.unit !== first.unit) {
      throw new RangeError(`${first.name} and ${line.name} are not one requirement at several distances.`);
    }
    const twin = lines.slice(0, i).find((other) => other.distanceM === line.distanceM);
    if (twin) throw new RangeError(`${twin.name} and ${line.name} both stand at ${line.distanceM} m.`);
  });
}
