import { STEP } from './axis';
import { POINTS_PER_TURN } from './pace';
import { JUDGED, type PairPoints } from './pair';
import type { Found } from './search';

// Held as locals: a bundler may turn an imported name into a getter, which a loop over a million points would feel.
const { yes } = JUDGED;
const { turn } = STEP;

/**
 * The same places, each by the point that governs its frequency. Joined pieces and several passes read a frequency
 * more than once: of these readings the one with the smallest margin is what is said about it, whichever of them made
 * it a place. An axis without repeated frequencies is left as it is.
 */
export function* governed(pair: PairPoints, found: Found): Generator<void, Found> {
  if (!mayRepeat(pair)) return found;
  const { frequencyHz, judged, marginDb } = pair;
  const points = [...found.peaks, ...found.floors.map(({ worst }) => worst), ...found.others];
  const governs = new Map(points.map((point) => [frequencyHz[point]!, point]));
  for (let start = 0; start < frequencyHz.length; start += POINTS_PER_TURN) {
    const end = Math.min(start + POINTS_PER_TURN, frequencyHz.length);
    for (let i = start; i < end; i++) {
      const before = governs.get(frequencyHz[i]!);
      if (before === undefined || judged[i] !== yes) continue;
      if (marginDb[i]! < marginDb[before]!) governs.set(frequencyHz[i]!, i);
    }
    yield;
  }
  const by = (point: number) => governs.get(frequencyHz[point]!)!;
  return {
    peaks: found.peaks.map(by),
    floors: found.floors.map((floor) => ({ ...floor, worst: by(floor.worst) })),
    others: found.others.map(by),
  };
}

/** False where the axis keeps its direction and never stands still. */
function mayRepeat({ frequencyHz, steps }: PairPoints): boolean {
  for (let i = 1; i < frequencyHz.length; i++) {
    if (steps[i] === turn || frequencyHz[i] === frequencyHz[i - 1]) return true;
  }
  return false;
}
