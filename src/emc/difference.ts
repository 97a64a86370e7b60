import type { Place } from './emissions';
import type { Detector } from './kinds';
import { sameEmissions } from './sameEmissions';
import type { Columns } from './types';

/** What pairing needs of a trace. */
export interface PairableHead {
  index: number;
  name: string;
  detector: Detector;
  rbwHz: number | null;
}

/** A trace of run a and the trace of run b that is laid over it. */
export interface TracePair {
  a: number;
  b: number;
  /** False where no trace has the detector of the other: then a difference holds that of the detectors too. */
  sameDetector: boolean;
}

/**
 * Which traces of two runs belong together: those of one detector, of several the pair with the same RBW before one
 * with another, then the pair with the same name, then in their order. Where no detector is in both runs the
 * uppermost traces are laid over each other, so that a prescan can be seen beside its final. Each trace is used once;
 * the pairs of (b, a) are those of (a, b) turned round.
 */
export function pairTraces(a: readonly PairableHead[], b: readonly PairableHead[]): TracePair[] {
  const possible = a.flatMap((one) =>
    b.filter(({ detector }) => detector === one.detector).map((other) => [one, other] as const),
  );
  const unlike = ([one, other]: (typeof possible)[number]) => [
    one.rbwHz === other.rbwHz ? 0 : 1,
    one.name === other.name ? 0 : 1,
    one.index + other.index,
    Math.abs(one.index - other.index),
  ];
  possible.sort((some, others) => compare(unlike(some), unlike(others)));
  const pairs: TracePair[] = [];
  for (const [one, other] of possible) {
    if (pairs.some((pair) => pair.a === one.index || pair.b === other.index)) continue;
    pairs.push({ a: one.index, b: other.index, sameDetector: true });
  }
  if (pairs.length > 0) return pairs.sort((some, others) => some.a + some.b - others.a - others.b || some.a - others.a);
  const [one, other] = [uppermost(a), uppermost(b)];
  return one && other ? [{ a: one.index, b: other.index, sameDetector: false }] : [];
}

function compare(some: readonly number[], others: readonly number[]): number {
  const at = some.findIndex((value, i) => value !== others[i]);
  return at < 0 ? 0 : some[at]! - others[at]!;
}

/** CISPR 16-1-1: on one emission peak reads highest, then quasi-peak, RMS-average and average. */
const DOWNWARD: Detector[] = ['peak', 'quasi-peak', 'rms-average', 'average'];

function uppermost(heads: readonly PairableHead[]): PairableHead | undefined {
  for (const detector of DOWNWARD) {
    const found = heads.find((head) => head.detector === detector);
    if (found) return found;
  }
  return heads[0];
}

/** A window of columns equally wide in log f, as `columnAccumulator` makes them. */
export interface ColumnWindow {
  fromHz: number;
  toHz: number;
  columns: number;
}

/** A stretch of frequency and how much higher b is there than a, dB; negative is lower. */
export interface DifferenceColumn {
  fromHz: number;
  toHz: number;
  differenceDb: number;
}

/**
 * The level of b less that of a over a window, stretch by stretch: the highest level of b's points in the stretch less
 * the highest of a's. Nothing is interpolated: a stretch that holds points of one run only has no difference, and no
 * stretch reaches out of the range that both runs cover. A stretch is a column of the window; where columns are
 * narrower than `stepHz`, the coarser step of two runs on different axes, as many neighbours as make it that wide, so
 * that each holds a point of both. Runs on one axis take 0: what they hold in a column they hold at the same points.
 * `a` and `b` are columns of the same window. The difference of (b, a) is that of (a, b) with the other sign, and that
 * of a run with itself is 0 everywhere.
 */
export function differenceOf(
  a: Columns,
  b: Columns,
  window: ColumnWindow,
  overlap: { fromHz: number; toHz: number },
  stepHz: number,
): DifferenceColumn[] {
  const { fromHz, toHz, columns } = window;
  const ratio = Math.log(toHz / fromHz) / columns;
  const edgeHz = (column: number) => (column === columns ? toHz : fromHz * Math.exp(column * ratio));
  const [highestA, highestB] = [a, b].map((one) => highestByColumn(one, window)) as [Float64Array, Float64Array];
  const stretches: DifferenceColumn[] = [];
  for (let from = 0; from < columns;) {
    const startHz = edgeHz(from);
    let to = from + 1;
    while (to < columns && edgeHz(to) - startHz < stepHz) to++;
    const stretch = { fromHz: startHz, toHz: edgeHz(to) };
    const differenceDb = highest(highestB, from, to) - highest(highestA, from, to);
    const covered = stretch.fromHz >= overlap.fromHz && stretch.toHz <= overlap.toHz;
    if (covered && Number.isFinite(differenceDb)) stretches.push({ ...stretch, differenceDb });
    from = to;
  }
  return stretches;
}

/** The highest level in each column of the window; -Infinity, which no difference survives, where there is none. */
function highestByColumn({ frequencyHz, levelMax }: Columns, { fromHz, toHz, columns }: ColumnWindow): Float64Array {
  const perLog = columns / Math.log(toHz / fromHz);
  const found = new Float64Array(columns).fill(-Infinity);
  for (let i = 0; i < frequencyHz.length; i++) {
    const column = Math.floor((Math.log(frequencyHz[i]!) - Math.log(fromHz)) * perLog);
    const at = Math.min(columns - 1, Math.max(0, column));
    found[at] = Math.max(found[at]!, levelMax[i]!);
  }
  return found;
}

function highest(levels: Float64Array, from: number, to: number): number {
  let most = -Infinity;
  for (let i = from; i < to; i++) most = Math.max(most, levels[i]!);
  return most;
}

/**
 * Which emissions of two lists are one, each within the spacing of `isOneEmission`, as pairs of their indices; those
 * without a partner stand alone. In order of frequency. Turning the lists round turns each pair round: `sameEmissions`
 * may choose between matchings that are equally good, so it is always asked in the same order.
 */
export function matchEmissions(a: readonly Place[], b: readonly Place[]): { a: number | null; b: number | null }[] {
  const turned = a.length === b.length ? compare(a.flatMap(ordered), b.flatMap(ordered)) > 0 : a.length > b.length;
  const of = turned ? sameEmissions(b, a) : sameEmissions(a, b);
  const pairs = of.map((known, found) => (turned ? { a: found, b: known } : { a: known, b: found }));
  const rest = (turned ? b : a).map((_, i) => i).filter((i) => !of.includes(i));
  const alone = rest.map((i) => (turned ? { a: null, b: i } : { a: i, b: null }));
  const hz = (pair: { a: number | null; b: number | null }) => {
    const places = [pair.a === null ? [] : [a[pair.a]!], pair.b === null ? [] : [b[pair.b]!]].flat();
    return Math.min(...places.map(({ fromHz }) => fromHz));
  };
  return [...pairs, ...alone].sort((some, others) => hz(some) - hz(others));
}

const ordered = ({ fromHz, toHz, bandwidthHz, kind }: Place) => [fromHz, toHz, bandwidthHz, kind === 'peak' ? 0 : 1];
