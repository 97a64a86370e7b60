import limits from '@fixtures/published/limits.json';
import type { Detector, FactorQuantity, LevelUnit } from '@/emc/kinds';
import { toLimitLine } from '@/emc/limitLine';
import type { EvaluationInput, FactorTable, LimitLine, LimitSegment, PathTerm, Trace } from '@/emc/types';

/** A published line by its id in fixtures/published/limits.json. */
export function publishedLine(id: string): LimitLine {
  const record = limits.lines.find((line) => line.id === id);
  if (!record) throw new Error(`fixtures/published/limits.json has no line ${id}`);
  return toLimitLine(record);
}

/** A line of flat and sloping segments, in dBuV and MHz. */
export function lineOf(
  segments: [startMhz: number, stopMhz: number, startLimit: number, stopLimit: number][],
  more: Partial<LimitLine> = {},
): LimitLine {
  const over: LimitSegment['over'] = 'log-frequency';
  return {
    id: 'line',
    name: 'test line',
    detector: 'quasi-peak',
    bandwidthHz: 9_000,
    unit: 'dBuV',
    distanceM: null,
    segments: segments.map(([startMhz, stopMhz, startLimit, stopLimit]) => ({
      startHz: startMhz * 1e6,
      stopHz: stopMhz * 1e6,
      startLimit,
      stopLimit,
      over,
    })),
    ...more,
  };
}

/** A factor table from rows of MHz and dB. */
export function tableOf(quantity: FactorQuantity, rows: [megahertz: number, db: number][], id = 'table'): FactorTable {
  return {
    id,
    name: id,
    quantity,
    frequencyHz: rows.map(([megahertz]) => megahertz * 1e6),
    valueDb: rows.map(([, db]) => db),
  };
}

export function termOf(table: FactorTable, more: Partial<PathTerm> = {}): PathTerm {
  return { id: `term ${table.id}`, name: table.id, table, applied: true, ...more };
}

/** A trace from readings; frequencies are given, or step evenly from `startHz`. */
export function traceOf(
  readings: number[],
  more: {
    frequencyHz?: number[];
    startHz?: number;
    stepHz?: number;
    detector?: Detector;
    rbwHz?: number | null;
    vbwHz?: number | null;
    rbwShape?: '6 dB' | '3 dB' | null;
    unit?: LevelUnit;
    index?: number;
  } = {},
): Trace {
  const { startHz = 1e6, stepHz = 4_500 } = more;
  return {
    index: more.index ?? 0,
    name: `trace ${more.index ?? 0}`,
    detector: more.detector ?? 'quasi-peak',
    rbwHz: more.rbwHz === undefined ? 9_000 : more.rbwHz,
    vbwHz: more.vbwHz,
    rbwShape: more.rbwShape,
    unit: more.unit ?? 'dBuV',
    frequencyHz: Float64Array.from(more.frequencyHz ?? readings.map((_, i) => startHz + i * stepHz)),
    reading: Float32Array.from(readings),
  };
}

export function inputOf(more: Partial<EvaluationInput> & Pick<EvaluationInput, 'traces'>): EvaluationInput {
  return {
    terms: [],
    lines: [lineOf([[0.1, 30, 60, 60]])],
    uncertainty: {
      prescan: [{ startHz: 1e3, stopHz: 20e9, expandedDb: 4 }],
      final: [{ startHz: 1e3, stopHz: 20e9, expandedDb: 2 }],
    },
    purpose: 'prescan',
    port: 'ac-mains',
    rule: 'guarded-by-u',
    ...more,
  };
}

/** Runs a generator through and returns what it returns. */
export function runThrough<T>(generator: Generator<void, T>): T {
  for (;;) {
    const step = generator.next();
    if (step.done) return step.value;
  }
}

/** Numbers between 0 and 1 that are the same every time (mulberry32). */
export function repeatable(seed: number): () => number {
  let state = seed;
  return () => {
    state = (state + 0x6d2b79f5) | 0;
    let mixed = Math.imul(state ^ (state >>> 15), 1 | state);
    mixed = (mixed + Math.imul(mixed ^ (mixed >>> 7), 61 | mixed)) ^ mixed;
    return ((mixed ^ (mixed >>> 14)) >>> 0) / 4294967296;
  };
}
