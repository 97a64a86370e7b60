import type { FloorPiece } from './floorCheck';
import type { Columns } from './types';

/**
 * Columns on either side whose median is the floor. Chosen here: 25 columns of 1024 are about a fortieth of the range,
 * so that single emissions are outvoted and the rise of an antenna factor is still followed.
 */
const HALF_WINDOW = 12;
/** Fewer columns than this say nothing of a floor. */
const LEAST_COLUMNS = 9;

/**
 * The noise floor of a trace, in the unit of its levels, as pieces that adjoin where the trace does. It is the median
 * over 25 neighbouring columns of the middle between each column's lowest and highest level: what more than half of
 * them hold is the floor, whoever makes it, so the sample's own broadband noise counts as floor too.
 * @param stepAt the largest step between points near a frequency; columns further apart than it and two columns leave
 *   a hole. Null where nothing was swept
 */
export function floorPieces(
  { frequencyHz, levelMin, levelMax }: Pick<Columns, 'frequencyHz' | 'levelMin' | 'levelMax'>,
  { fromHz, toHz, columns }: { fromHz: number; toHz: number; columns: number },
  stepAt: (hz: number) => number | null,
): FloorPiece[] {
  const count = frequencyHz.length;
  if (count < LEAST_COLUMNS) return [];
  const middle = Float64Array.from({ length: count }, (_, i) => (levelMin[i]! + levelMax[i]!) / 2);
  const columnRatio = (toHz / fromHz) ** (1 / columns);
  const joined = (i: number) => {
    const stepHz = stepAt(frequencyHz[i]!);
    const columnHz = frequencyHz[i]! * (columnRatio - 1);
    return stepHz !== null && frequencyHz[i]! - frequencyHz[i - 1]! <= stepHz + 2 * columnHz;
  };
  const pieces: FloorPiece[] = [];
  for (let i = 0; i < count; i++) {
    const hz = frequencyHz[i]!;
    const startHz = i === 0 ? fromHz : joined(i) ? Math.sqrt(frequencyHz[i - 1]! * hz) : hz;
    const stopHz = i === count - 1 ? toHz : joined(i + 1) ? Math.sqrt(hz * frequencyHz[i + 1]!) : hz;
    if (stopHz > startHz) pieces.push({ startHz, stopHz, level: medianAround(middle, i) });
  }
  return pieces;
}

/** Near the ends the window stays inside. */
function medianAround(values: Float64Array, at: number): number {
  const size = Math.min(2 * HALF_WINDOW + 1, values.length);
  const start = Math.max(0, Math.min(at - HALF_WINDOW, values.length - size));
  const window = values.slice(start, start + size).sort();
  const half = size >> 1;
  return size % 2 === 1 ? window[half]! : (window[half - 1]! + window[half]!) / 2;
}
