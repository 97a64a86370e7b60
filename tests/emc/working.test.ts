import fc from 'fast-check';
import conversions from '@fixtures/published/conversions.json';
import { evaluateNow } from '@/emc/evaluate';
import type { LevelUnit } from '@/emc/kinds';
import type { PathTerm, Working } from '@/emc/types';
import { workingAt } from '@/emc/working';
import { inputOf, lineOf, publishedLine, repeatable, tableOf, termOf, traceOf } from './given';

/** The column addition as a reader does it: applied terms in their order. */
function sumOf({ terms }: Working): number {
  return terms
    .filter(({ applied }) => applied)
    .reduce((sum, { sign, figure }, i) => (i === 0 ? figure : sign === '−' ? sum - figure : sum + figure), 0);
}

const antenna = termOf(
  tableOf(
    'antenna-factor',
    conversions.antennaFactorInterpolation.table.map((row) => [row.freqMHz, row.antennaFactorDbPerM]),
    'antenna',
  ),
);
const cable = termOf(
  tableOf(
    'loss',
    [
      [30, 0.4],
      [300, 1.4],
      [1000, 2.8],
    ],
    'cable',
  ),
);
const gain = termOf(
  tableOf(
    'gain',
    [
      [30, 31.2],
      [1000, 29.6],
    ],
    'preamplifier',
  ),
);
const line = publishedLine('cispr32-b-re-3m');
const radiated = (readings: number[], unit: LevelUnit, terms: PathTerm[], more = {}) =>
  inputOf({
    traces: [traceOf(readings, { startHz: 75e6, stepHz: 60e3, unit, rbwHz: 120e3 })],
    terms,
    lines: [line],
    ...more,
  });

describe('the working of one figure', () => {
  test('reading, factor, loss and gain, with the two rows of each table (antenna factor at 75 MHz: 11.1226 dB/m)', () => {
    const working = workingAt(radiated([50, 20], 'dBuV', [antenna, cable, gain]), 0, 75.01e6);
    expect(working).toMatchObject({
      frequencyHz: 75e6,
      lineId: line.id,
      levelUnit: 'dBuV/m',
      limit: 40,
      uncertaintyDb: 4,
    });
    expect(working.terms.map(({ sign, name, unit, termId }) => [sign, name, unit, termId])).toEqual([
      ['', 'reading', 'dBuV', null],
      ['+', 'antenna', 'dB/m', 'term antenna'],
      ['+', 'cable', 'dB', 'term cable'],
      ['−', 'preamplifier', 'dB', 'term preamplifier'],
    ]);
    expect(working.terms[1]!.figure).toBeCloseTo(11.1226, 4);
    expect(working.terms[1]!.rows).toEqual({ lowerHz: 50e6, lowerDb: 12, upperHz: 100e6, upperDb: 10.5 });
    expect(sumOf(working)).toBe(working.level);
    expect(working.marginDb).toBe(40 - working.level!);
  });

  test('a reading in dBm shows its 106.9897 dB to dBuV as a term (constructed example at 45.5 MHz)', () => {
    const row = conversions.readingToField.rows.find(({ id }) => id === 'constructed-45.5')!;
    const flat = (quantity: 'antenna-factor' | 'loss', db: number) =>
      termOf(
        tableOf(
          quantity,
          [
            [30, db],
            [1000, db],
          ],
          quantity,
        ),
      );
    const terms = [flat('antenna-factor', row.antennaFactorDbPerM!), flat('loss', row.cableLossDb!)];
    const working = workingAt(radiated([row.readingDbm!], 'dBm', terms), 0, 75e6);
    expect(working.terms.slice(0, 2)).toMatchObject([
      { sign: '', figure: -68, unit: 'dBm' },
      { sign: '+', figure: expect.closeTo(106.9897, 4), unit: 'dB' },
    ]);
    expect(working.level).toBeCloseTo(row.fieldDbUvPerM, 4);
    expect(working.marginDb).toBeCloseTo(row.marginDb!, 4);
    expect(sumOf(working)).toBe(working.level);
  });

  test.each<[LevelUnit, number, number]>([
    ['uV', 100, 40],
    ['mV', 0.1, 40],
    ['V', 1e-4, 40],
    ['mW', 1e-6, 46.9897],
    ['W', 1e-9, 46.9897],
  ])('a reading in %s is shown as it is and added as its level', (unit, reading, level) => {
    const working = workingAt(radiated([reading], unit, []), 0, 75e6);
    expect(working.terms[0]).toMatchObject({ applied: false, unit, figure: Math.fround(reading) });
    expect(sumOf(working)).toBe(working.level);
    expect(working.level).toBeCloseTo(level, 4);
  });

  test('a term that is not applied is shown with its figure and its reason, and not added', () => {
    const already = { ...cable, applied: false, notAppliedBecause: 'the file says it is corrected for' };
    const working = workingAt(radiated([50], 'dBuV', [antenna, already]), 0, 75e6);
    expect(working.terms[2]).toMatchObject({ applied: false, notAppliedBecause: already.notAppliedBecause });
    expect(working.terms[2]!.figure).toBeGreaterThan(0.4);
    expect(working.level).toBe(workingAt(radiated([50], 'dBuV', [antenna]), 0, 75e6).level);
    expect(sumOf(working)).toBe(working.level);
  });

  test('where an applied table has no value there is no level, and the table is named', () => {
    const short = termOf(
      tableOf(
        'loss',
        [
          [100, 1],
          [200, 2],
        ],
        'cable CBL-07',
      ),
    );
    const working = workingAt(radiated([50], 'dBuV', [antenna, short]), 0, 75e6);
    expect(working).toMatchObject({ level: null, marginDb: null, verdict: 'not-covered' });
    expect(working.because).toBe('cable CBL-07 has no value at this frequency.');
    expect(working.terms.map(({ name }) => name)).toEqual(['reading', 'antenna']);
  });

  test('a repeated frequency shows the higher reading, which governs', () => {
    const trace = traceOf([10, 30, 20, 10], { frequencyHz: [1e6, 2e6, 2e6, 3e6] });
    const input = inputOf({ traces: [trace] });
    expect(workingAt(input, 0, 2e6).terms[0]!.figure).toBe(30);
    const swapped = inputOf({ traces: [{ ...trace, reading: Float32Array.of(10, 20, 30, 10) }] });
    expect(workingAt(swapped, 0, 2e6).terms[0]!.figure).toBe(30);
  });

  test('a point is addressed exactly by its index, and one that is not there is refused', () => {
    const trace = traceOf([10, 30, 20, 10], { frequencyHz: [1e6, 2e6, 2e6, 3e6] });
    const figures = [0, 1, 2, 3].map((point) => {
      const { frequencyHz, level } = workingAt(inputOf({ traces: [trace] }), 0, 2e6, undefined, point);
      return [frequencyHz, level];
    });
    expect(figures).toEqual([
      [1e6, 10],
      [2e6, 30],
      [2e6, 20],
      [3e6, 10],
    ]);
    for (const point of [-1, 4, 0.5]) {
      expect(() => workingAt(inputOf({ traces: [trace] }), 0, 2e6, undefined, point)).toThrow(RangeError);
    }
  });

  test('equally near on either side, the smaller margin is shown, not the higher reading', () => {
    const step = lineOf([
      [1, 2, 60, 60],
      [2, 4, 40, 40],
    ]);
    const trace = traceOf([45, 30], { frequencyHz: [1.5e6, 2.5e6] });
    expect(workingAt(inputOf({ traces: [trace], lines: [step] }), 0, 2e6)).toMatchObject({
      frequencyHz: 2.5e6,
      marginDb: 10,
    });
  });

  test('a point that holds no level never hides one at the same frequency', () => {
    const trace = traceOf([10, Infinity, 20, 10], { frequencyHz: [1e6, 2e6, 2e6, 3e6] });
    expect(workingAt(inputOf({ traces: [trace] }), 0, 2e6).level).toBe(20);
    expect(workingAt(inputOf({ traces: [trace] }), 0, 2e6, undefined, 1)).toMatchObject({
      level: null,
      limit: 60,
      verdict: 'not-covered',
    });
  });

  test('a point at 0 Hz is no level and is never the nearest', () => {
    const trace = traceOf([90, 10], { frequencyHz: [0, 1e6] });
    expect(workingAt(inputOf({ traces: [trace] }), 0, 1).frequencyHz).toBe(1e6);
    expect(workingAt(inputOf({ traces: [trace] }), 0, 1, undefined, 0)).toMatchObject({ level: null, limit: null });
    expect(() => workingAt(inputOf({ traces: [traceOf([9], { frequencyHz: [-1] })] }), 0, 1)).toThrow(RangeError);
  });

  test('candidate margin is working margin where pieces join and where two passes cross one range (property)', () => {
    const lines = [
      lineOf([
        [0.9, 1.3, 60, 60],
        [1.3, 9, 50, 50],
      ]),
    ];
    const axis = fc.constantFrom<'pieces' | 'passes' | 'back'>('pieces', 'passes', 'back');
    fc.assert(
      fc.property(fc.integer(), axis, fc.integer({ min: 10, max: 58 }), (seed, shape, floor) => {
        const random = repeatable(seed);
        const up = Array.from({ length: 130 }, (_, i) => 1e6 + i * 4_500);
        const second =
          shape === 'pieces' ? up.map((hz) => hz + 129 * 4_500) : shape === 'back' ? [...up].reverse() : up;
        const hz = [...up, ...second];
        const trace = traceOf(
          hz.map(() => floor + 8 * random() + (random() < 0.05 ? 15 : 0)),
          { frequencyHz: hz },
        );
        const input = inputOf({ traces: [trace], lines });
        const { candidates } = evaluateNow(input);
        expect(candidates.length).toBeGreaterThan(0);
        for (const { traceIndex, lineId, frequencyHz, reading, marginDb, verdict, fromHz, toHz } of candidates) {
          const working = workingAt(input, traceIndex, frequencyHz, lineId);
          expect(working).toMatchObject({ frequencyHz, verdict });
          expect([working.marginDb, working.terms[0]!.figure]).toEqual([marginDb, reading]);
          expect(fromHz <= frequencyHz && frequencyHz <= toHz).toBe(true);
        }
        const places = candidates.map(({ frequencyHz }) => frequencyHz);
        expect(new Set(places).size).toBe(places.length);
      }),
      { numRuns: 150 },
    );
  });

  test('the line asked for is the one compared; a line in another unit or without a limit there says so', () => {
    const other = lineOf([[1, 2, 60, 60]], { id: 'mains', unit: 'dBuV' });
    const short = { ...line, id: 'short', name: 'short line', segments: line.segments.slice(1) };
    const input = radiated([50], 'dBuV', [antenna], { lines: [line, other, short] });
    expect(workingAt(input, 0, 75e6, 'mains')).toMatchObject({ lineId: 'mains', limit: null, verdict: 'not-covered' });
    expect(workingAt(input, 0, 75e6, 'short').because).toBe('short line has no limit at this frequency.');
    expect(workingAt(radiated([50], 'dBuV', [], {}), 0, 75e6)).toMatchObject({
      lineId: null,
      limit: null,
      verdict: 'not-covered',
    });
    expect(workingAt(radiated([50], 'dB', []), 0, 75e6)).toMatchObject({
      level: null,
      levelUnit: null,
      verdict: 'not-covered',
    });
    expect(() => workingAt(input, 0, 75e6, 'none')).toThrow(/no limit line none/);
    expect(() => workingAt(input, 9, 75e6)).toThrow(/no trace 9/);
    expect(() => workingAt(inputOf({ traces: [traceOf([])] }), 0, 1e6)).toThrow(RangeError);
  });

  test('agrees with the evaluation to the last bit at every candidate (property)', () => {
    const units = fc.constantFrom<LevelUnit>('dBuV', 'dBm', 'uV', 'mW');
    fc.assert(
      fc.property(fc.integer(), units, fc.constantFrom('prescan', 'final', 'ambient'), (seed, unit, purpose) => {
        const random = repeatable(seed);
        const scale = { dBuV: 40, dBm: -66, uV: 100, mW: 1e-7 }[unit as 'dBuV' | 'dBm' | 'uV' | 'mW'];
        const linear = unit === 'uV' || unit === 'mW';
        const readings = Array.from({ length: 150 }, () => (linear ? scale * (0.1 + random()) : scale + 20 * random()));
        const terms = [antenna, { ...cable, applied: random() < 0.7 }, gain];
        const input = radiated(readings, unit, terms, { purpose });
        for (const candidate of evaluateNow(input).candidates) {
          const working = workingAt(input, candidate.traceIndex, candidate.frequencyHz, candidate.lineId);
          const { frequencyHz, level, limit, marginDb, uncertaintyDb, verdict, because } = candidate;
          expect(working).toMatchObject({ frequencyHz, level, limit, marginDb, uncertaintyDb, verdict, because });
          expect(sumOf(working)).toBe(level);
        }
      }),
      { numRuns: 60 },
    );
  });
});
