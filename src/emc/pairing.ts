import { detectorOrder } from './detectors';
import { isRange } from './intervals';
import type { Detector, LineDetector, LineUnit } from './kinds';
import type { LimitLine } from './types';

/** What pairing needs to know of a trace; `levelUnit` is the unit after its applied terms. */
export interface PairableTrace {
  index: number;
  detector: Detector;
  levelUnit: LineUnit | null;
  lowestHz: number;
  highestHz: number;
}

/** Detectors that prove nothing, in the order in which one is taken when no other trace is there. */
const PROVE_NOTHING: Detector[] = ['unknown', 'rms-average', 'sample', 'log-average', 'negative-peak'];

/**
 * The traces a line is judged by. Only traces in the line's unit that share a range with it are asked. Of these:
 * the ones read with the line's own detector; without one, those with the nearest detector above it, which can show
 * under (quasi-peak before peak for an average line: both lie above average, quasi-peak closer); else the nearest
 * below, which can show over; else one kind that proves nothing, so that its candidates still ask for a final.
 * All traces of the chosen kind are judged and the worst governs: none of them says that the others are mistaken.
 */
export function tracesFor<T extends PairableTrace>(line: LimitLine, traces: readonly T[]): T[] {
  const askable = traces.filter((trace) => trace.levelUnit === line.unit && reaches(line, trace));
  const best = Math.min(...askable.map((trace) => preference(trace.detector, line.detector)));
  return askable.filter((trace) => preference(trace.detector, line.detector) === best);
}

/**
 * The lines a trace hangs from when it is drawn, most fitting first; at each frequency it hangs from the first that
 * has a limit there. Peak hangs from the peak line, then quasi-peak, then average; quasi-peak from its own, then peak,
 * then average; averages of any kind from the average line, then quasi-peak, then peak; anything else as peak does.
 * This is where a trace is drawn, not how it is judged.
 */
export function hangingLines(detector: Detector, levelUnit: LineUnit | null, lines: readonly LimitLine[]): LimitLine[] {
  return hangingOrder(detector).flatMap((kind) =>
    lines.filter((line) => line.detector === kind && line.unit === levelUnit),
  );
}

/** The line a trace is named after: the first it hangs from that has a limit within its range; null when none does. */
export function ownLine(trace: PairableTrace, lines: readonly LimitLine[]): LimitLine | null {
  return hangingLines(trace.detector, trace.levelUnit, lines).find((line) => reaches(line, trace)) ?? null;
}

/**
 * True when trace and line share a range. An edge in common alone is none: a sweep that ends at 1 GHz is not one of a
 * line that begins there. A reading at a single frequency reaches every line that has a limit at it.
 */
function reaches(line: LimitLine, { lowestHz, highestHz }: PairableTrace): boolean {
  return line.segments.some(({ startHz, stopHz }) => {
    const fromHz = Math.max(startHz, lowestHz);
    const toHz = Math.min(stopHz, highestHz);
    return lowestHz === highestHz ? fromHz <= toHz : isRange(fromHz, toHz);
  });
}

function preference(detector: Detector, asked: LineDetector): number {
  const order = detectorOrder(detector);
  if (order === null) return 20 + PROVE_NOTHING.indexOf(detector);
  const above = order - detectorOrder(asked)!;
  return above >= 0 ? above : 10 - above;
}

function hangingOrder(detector: Detector): LineDetector[] {
  if (detector === 'quasi-peak') return ['quasi-peak', 'peak', 'average'];
  if (detector === 'average' || detector === 'rms-average' || detector === 'log-average') {
    return ['average', 'quasi-peak', 'peak'];
  }
  return ['peak', 'quasi-peak', 'average'];
}
