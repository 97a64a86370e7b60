import { merged, without, type Interval } from './intervals';
import { prepareLine } from './limitLine';
import type { FloorFinding } from './receiverFinding';
import type { LimitLine, LimitSegment } from './types';

/** The floor of a receiver with its path, as one level from `startHz` to `stopHz`, in the unit of the line. */
export interface FloorPiece {
  startHz: number;
  stopHz: number;
  level: number;
}

/** Source: CISPR 16-2-3, ANSI C63.4, CISPR 11 (from memory). */
export const FLOOR_BELOW_LIMIT_DB = 6;

/**
 * The noise floor against a limit line: where it lies less than 6 dB below the limit, to the hertz at which a sloping
 * limit comes nearer, and which parts of the line have no floor stated. Where pieces overlap the higher floor governs,
 * where segments do the lower limit. Exactly 6 dB is enough. Throws RangeError on a piece that is no range or holds no
 * level, and on a line that cannot be used.
 */
export function floorFinding(line: LimitLine, pieces: readonly FloorPiece[]): FloorFinding {
  prepareLine(line);
  for (const { startHz, stopHz, level } of pieces) {
    if (!(startHz > 0 && stopHz > startHz && Number.isFinite(stopHz))) {
      throw new RangeError(`Floor: ${startHz} to ${stopHz} Hz is no range.`);
    }
    if (!Number.isFinite(level)) throw new RangeError(`Floor: ${level} from ${startHz} Hz is no level.`);
  }
  const tooHigh: Interval[] = [];
  let least: { db: number; atHz: number } | null = null;
  for (const segment of line.segments) {
    for (const piece of pieces) {
      const fromHz = Math.max(segment.startHz, piece.startHz);
      const toHz = Math.min(segment.stopHz, piece.stopHz);
      if (fromHz >= toHz) continue;
      // A segment rises, falls or is flat: what is nearest, and the one place where it crosses, follow from its ends.
      const [from, to] = [fromHz, toHz].map((hz) => ({ db: limitIn(segment, hz) - piece.level, atHz: hz }));
      for (const end of [from!, to!]) if (least === null || end.db < least.db) least = end;
      const closeAt = [from!, to!].map(({ db }) => db < FLOOR_BELOW_LIMIT_DB);
      if (!closeAt.includes(true)) continue;
      const crossingHz = closeAt.includes(false) ? frequencyOf(segment, piece.level + FLOOR_BELOW_LIMIT_DB) : null;
      tooHigh.push({
        fromHz: closeAt[0] ? fromHz : crossingHz!,
        toHz: closeAt[1] ? toHz : crossingHz!,
      });
    }
  }
  const ranges = merged(tooHigh);
  const notKnown = without(line.segments.map(intervalOf), pieces.map(intervalOf));
  const all = merged(line.segments.map(intervalOf));
  return {
    what: 'noise-floor',
    fromHz: all[0]!.fromHz,
    toHz: all[all.length - 1]!.toHz,
    outcome: ranges.length > 0 ? 'fails' : notKnown.length > 0 ? 'unknown' : 'ok',
    figures: {
      askedDb: FLOOR_BELOW_LIMIT_DB,
      leastDistanceDb: least?.db ?? null,
      leastAtHz: least?.atHz ?? null,
      tooHigh: ranges,
      notKnown,
    },
    because: ranges.length === 0 && notKnown.length > 0 ? 'No floor is stated for a part of the line.' : null,
    source: 'CISPR 16-2-3; ANSI C63.4; CISPR 11',
  };
}

const intervalOf = ({ startHz, stopHz }: { startHz: number; stopHz: number }) => ({ fromHz: startHz, toHz: stopHz });

/** Where a frequency lies along a segment, 0 to 1, on the scale over which the limit runs straight. */
function limitIn({ startHz, stopHz, startLimit, stopLimit, over }: LimitSegment, hz: number): number {
  const along =
    over === 'log-frequency'
      ? Math.log(hz / startHz) / Math.log(stopHz / startHz)
      : (hz - startHz) / (stopHz - startHz);
  return startLimit + (stopLimit - startLimit) * along;
}

/** The frequency at which a sloping segment has this limit. */
function frequencyOf({ startHz, stopHz, startLimit, stopLimit, over }: LimitSegment, limit: number): number {
  const along = (limit - startLimit) / (stopLimit - startLimit);
  return over === 'log-frequency' ? startHz * (stopHz / startHz) ** along : startHz + (stopHz - startHz) * along;
}
