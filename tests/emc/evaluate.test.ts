import fc from 'fast-check';
import { ENGINE, evaluate, evaluateNow } from '@/emc/evaluate';
import { factorAt } from '@/emc/factorTable';
import { limitAt } from '@/emc/limitLine';
import { VERDICTS, type Detector, type LevelUnit, type Purpose } from '@/emc/kinds';
import type { EvaluationInput, Trace } from '@/emc/types';
import { readingVerdict, severity } from '@/emc/verdict';
import { inputOf, lineOf, publishedLine, repeatable, tableOf, termOf, traceOf } from './given';

const QP = publishedLine('cispr32-b-ce-qp');
const AV = publishedLine('cispr32-b-ce-av');
const MAINS = { startHz: 150e3, stepHz: 4_500 };
const POINTS = 6_635;

/** A mains sweep on a quiet floor of 20 dBuV, with emissions at the given frequencies. */
function mains(detector: Detector, emissions: [megahertz: number, dbuv: number][], index = 0, floor = 20): Trace {
  const random = repeatable(index + 1);
  const readings = Array.from({ length: POINTS }, (_, i) => {
    const hz = MAINS.startHz + i * MAINS.stepHz;
    const bells = emissions.map(([megahertz, db]) => db - 6 * ((hz - megahertz * 1e6) / 4_500) ** 2);
    return Math.max(floor + 2 * (random() - 0.5), ...bells);
  });
  return traceOf(readings, { ...MAINS, detector, index });
}
const mainsInput = (traces: Trace[], more: Partial<EvaluationInput> = {}) =>
  inputOf({ traces, lines: [QP, AV], ...more });

describe('one mains run against CISPR 32 class B', () => {
  test('quiet in both detectors is under, with nothing missing and the nearest twelve listed', () => {
    const found = evaluateNow(mainsInput([mains('quasi-peak', [], 0), mains('average', [], 1, 10)]));
    expect(found.engine).toBe(ENGINE);
    expect(found).toMatchObject({ verdict: 'under', gaps: [] });
    expect(found.candidates.length).toBeGreaterThanOrEqual(2);
    expect(found.candidates.length).toBeLessThanOrEqual(12);
    expect(found.candidates.every(({ verdict, because }) => verdict === 'under' && because === null)).toBe(true);
    expect(found.counts).toEqual({
      over: 0,
      'needs-final': 0,
      inconclusive: 0,
      'not-covered': 0,
      under: found.candidates.length,
    });
  });

  test('quasi-peak and average each have their margin, and the worst governs', () => {
    const traces = [mains('quasi-peak', [[0.384, 50]], 0), mains('average', [[0.384, 49.9]], 1, 10)];
    const found = evaluateNow(mainsInput(traces, { purpose: 'final' }));
    expect(found.pairs.map(({ traceIndex, lineId }) => [traceIndex, lineId])).toEqual([
      [0, QP.id],
      [1, AV.id],
    ]);
    const [qp, av] = found.pairs;
    expect(qp!.worstMarginDb).toBeGreaterThan(7);
    expect(av!.worstMarginDb).toBeLessThan(-1);
    expect(found.verdict).toBe('inconclusive');
    expect(found.candidates[0]).toMatchObject({
      rank: 1,
      kind: 'peak',
      traceIndex: 1,
      lineId: AV.id,
      verdict: 'inconclusive',
    });
  });

  test('a prescan in peak alone shows under, never over: the emission needs a final', () => {
    const found = evaluateNow(mainsInput([mains('peak', [[1, 75]])]));
    expect(found.verdict).toBe('needs-final');
    expect(found.pairs.map(({ lineId }) => lineId)).toEqual([QP.id, AV.id]);
    expect(found.candidates.filter(({ verdict }) => verdict !== 'under').map(({ lineId }) => lineId)).toEqual([
      AV.id,
      QP.id,
    ]);
    expect(found.candidates[0]!.because).toMatch(/peak can lie above average/);
  });

  test('candidates are numbered from the worst verdict, then from the smallest margin', () => {
    const found = evaluateNow(
      mainsInput([
        mains('quasi-peak', [
          [0.6, 70],
          [1, 55],
          [2, 40],
          [3, 45],
        ]),
        mains('average', [], 1, 10),
      ]),
    );
    expect(found.candidates.map(({ rank }) => rank)).toEqual(found.candidates.map((_, i) => i + 1));
    found.candidates.forEach((candidate, i, all) => {
      const before = all[i - 1];
      if (!before) return;
      const step = severity(candidate.verdict) - severity(before.verdict);
      expect(step > 0 || (step === 0 && candidate.marginDb >= before.marginDb)).toBe(true);
    });
    expect(found.candidates.slice(0, 2).map(({ verdict }) => verdict)).toEqual(['over', 'needs-final']);
  });

  test('more than twelve that are not proven under are all listed, and then no others', () => {
    const emissions = Array.from({ length: 20 }, (_, k) => [1 + k, 57.5] as [number, number]);
    const found = evaluateNow(mainsInput([mains('quasi-peak', emissions), mains('average', [], 1, 10)]));
    const open = found.candidates.filter(({ verdict }) => verdict !== 'under');
    expect(open).toHaveLength(20);
    expect(found.candidates).toHaveLength(20);
  });

  test('a noise floor not proven under is one candidate with its range', () => {
    const found = evaluateNow(mainsInput([mains('quasi-peak', [], 0, 53), mains('average', [], 1, 10)]));
    const floors = found.candidates.filter(({ kind }) => kind === 'floor');
    expect(floors).toHaveLength(1);
    expect(floors[0]!.toHz).toBeGreaterThan(4.9e6);
    expect(floors[0]!.toHz).toBeLessThanOrEqual(5e6);
    expect(floors[0]!.fromHz).toBeLessThan(0.6e6);
    expect(found.candidates.filter(({ verdict }) => verdict !== 'under')).toHaveLength(1);
  });

  test('a prescan is guarded by its own U of 4 dB, a final by its U of 2 dB', () => {
    const traces = [mains('quasi-peak', [[1, 53]], 0), mains('average', [], 1, 10)];
    const worst = (purpose: Purpose) => evaluateNow(mainsInput(traces, { purpose })).candidates[0]!;
    expect(worst('prescan')).toMatchObject({ uncertaintyDb: 4, verdict: 'needs-final' });
    expect(worst('final')).toMatchObject({ uncertaintyDb: 2, verdict: 'under' });
  });

  test('the layer a trace is drawn from reaches down to the worst margin of its line', () => {
    const found = evaluateNow(mainsInput([mains('quasi-peak', [[1, 66]], 0), mains('average', [[2, 30]], 1, 10)]));
    found.pairs.forEach(({ worstMarginDb }, i) => {
      const { marginMin, hasMargin } = found.layers[i]!;
      expect(hasMargin.every((has) => has === 1)).toBe(true);
      expect(Math.min(...marginMin)).toBe(Math.fround(worstMarginDb!));
    });
    expect(found.pairs[0]!.worstMarginDb).toBeLessThan(-9);
  });

  test('an ambient run judges nothing: not covered, whatever its margins', () => {
    const found = evaluateNow(mainsInput([mains('quasi-peak', [[1, 90]])], { purpose: 'ambient' }));
    expect(found.verdict).toBe('not-covered');
    expect(found.candidates[0]).toMatchObject({ verdict: 'not-covered', frequencyHz: expect.closeTo(1e6, -4) });
    expect(found.counts.over).toBe(0);
  });

  test('without a line, and without a trace, nothing is covered', () => {
    expect(evaluateNow(mainsInput([mains('peak', [])], { lines: [] }))).toMatchObject({
      verdict: 'not-covered',
      pairs: [],
    });
    expect(evaluateNow(mainsInput([]))).toMatchObject({
      verdict: 'not-covered',
      pairs: [],
      candidates: [],
      layers: [],
    });
    const empty = evaluateNow(mainsInput([traceOf([])]));
    expect(empty.layers[0]!.frequencyHz).toHaveLength(0);
    expect(empty.gaps.map(({ because }) => because)).toEqual(['no-trace', 'no-trace']);
  });

  test('a part without a factor is not covered, and does not hide what is over elsewhere', () => {
    const terms = [
      termOf(
        tableOf('loss', [
          [1, 0],
          [30, 0],
        ]),
      ),
    ];
    const quiet = evaluateNow(mainsInput([mains('quasi-peak', []), mains('average', [], 1, 10)], { terms }));
    expect(quiet.verdict).toBe('not-covered');
    const loud = evaluateNow(mainsInput([mains('quasi-peak', [[2, 80]]), mains('average', [], 1, 10)], { terms }));
    expect(loud.verdict).toBe('over');
    expect(loud.counts['not-covered']).toBe(2);
  });
});

describe('margins, not readings, make a candidate', () => {
  test('the lower reading below a limit step can be the nearer (230 MHz, CISPR 32 class B)', () => {
    const line = publishedLine('cispr32-b-re-3m');
    const edge = traceOf([20, 38, 40, 20], {
      frequencyHz: [229.9e6, 230e6, 230.1e6, 230.2e6],
      unit: 'dBuV/m',
      rbwHz: 120e3,
    });
    expect(evaluateNow(inputOf({ traces: [edge], lines: [line] })).candidates[0]).toMatchObject({
      frequencyHz: 230e6,
      limit: 40,
      marginDb: 2,
    });
  });
});

describe('1 GHz, where lines of different detectors meet', () => {
  const lines = ['cispr32-b-re-3m', 'cispr32-b-re-1g-av', 'cispr32-b-re-1g-pk'].map(publishedLine);
  test('each line is compared by itself; the edge rule does not reach from one to the other', () => {
    const hz = Array.from({ length: 41 }, (_, i) => 999e6 + i * 50e3);
    const peak = traceOf(
      hz.map(() => 40),
      { frequencyHz: hz, unit: 'dBuV/m', detector: 'peak', rbwHz: 1e6 },
    );
    const found = evaluateNow(inputOf({ traces: [peak], lines }));
    const at1GHz = (id: string) =>
      limitAt(
        lines.find((line) => line.id === id)!,
        1e9,
      );
    expect([at1GHz('cispr32-b-re-3m'), at1GHz('cispr32-b-re-1g-av'), at1GHz('cispr32-b-re-1g-pk')]).toEqual([
      47, 50, 70,
    ]);
    expect(found.pairs.map(({ lineId, points, worstMarginDb }) => [lineId, points, worstMarginDb])).toEqual([
      ['cispr32-b-re-3m', 21, 7],
      ['cispr32-b-re-1g-av', 21, 10],
      ['cispr32-b-re-1g-pk', 21, 30],
    ]);
  });
});

describe('a quasi-peak sweep that ends at 1 GHz beside lines that begin there', () => {
  test('is judged by the quasi-peak line alone; the lines above 1 GHz are open', () => {
    const lines = ['cispr32-b-re-3m', 'cispr32-b-re-1g-av', 'cispr32-b-re-1g-pk'].map(publishedLine);
    const hz = Array.from({ length: 401 }, (_, i) => 980e6 + i * 50e3);
    const swept = traceOf(
      hz.map(() => 20),
      { frequencyHz: hz, unit: 'dBuV/m', rbwHz: 120e3 },
    );
    const found = evaluateNow(inputOf({ traces: [swept], lines }));
    expect(found.pairs.map(({ lineId }) => lineId)).toEqual(['cispr32-b-re-3m']);
    expect(found.counts['needs-final']).toBe(0);
    expect(found.gaps.map(({ lineId, because }) => [lineId, because])).toEqual([
      ['cispr32-b-re-3m', 'no-trace'],
      ['cispr32-b-re-1g-av', 'no-trace'],
      ['cispr32-b-re-1g-pk', 'no-trace'],
    ]);
  });
});

/** Any small run: several traces, terms applied or not, lines with and without holes. */
const anyInput = fc
  .record({
    seed: fc.integer(),
    points: fc.integer({ min: 1, max: 260 }),
    purpose: fc.constantFrom<Purpose>('prescan', 'final'),
    detectors: fc.array(fc.constantFrom<Detector>('peak', 'quasi-peak', 'average', 'unknown'), {
      minLength: 1,
      maxLength: 3,
    }),
    floor: fc.integer({ min: 10, max: 60 }),
    rbwHz: fc.constantFrom(null, 1e3, 9e3, 120e3),
  })
  .map(({ seed, points, purpose, detectors, floor, rbwHz }) => {
    const random = repeatable(seed);
    const traces = detectors.map((detector, index) =>
      traceOf(
        Array.from({ length: points }, () => floor + 12 * (random() - 0.5) + (random() < 0.02 ? 15 : 0)),
        {
          startHz: 400e3,
          stepHz: random() < 0.5 ? 4_500 : 40e3,
          detector,
          rbwHz,
          index,
          unit: index === 1 ? 'dBm' : 'dBuV',
        },
      ),
    );
    const terms = [
      termOf(
        tableOf(
          'loss',
          [
            [0.3, 0.5],
            [2, 1],
            [9, 1.5],
          ],
          'cable',
        ),
      ),
      termOf(
        tableOf(
          'gain',
          [
            [0.1, 10],
            [30, 9],
          ],
          'preamplifier',
        ),
        { applied: random() < 0.5 },
      ),
    ];
    const uncertainty = [
      { startHz: 1e3, stopHz: 1e6, expandedDb: 4 },
      { startHz: 1e6, stopHz: 8e6, expandedDb: 3 },
    ];
    return inputOf({
      traces,
      terms,
      lines: [QP, AV],
      purpose,
      uncertainty: { prescan: uncertainty, final: uncertainty },
    });
  });

describe('any run (property)', () => {
  test('the generator, paced however, gives what one go gives, and the same again', () => {
    fc.assert(
      fc.property(anyInput, (input) => {
        const whole = evaluateNow(input);
        const run = evaluate(input);
        let step = run.next();
        while (!step.done) step = run.next();
        expect(step.value).toEqual(whole);
        expect(evaluateNow(structuredClone(input))).toEqual(whole);
      }),
      { numRuns: 40 },
    );
  });

  test('every figure of a candidate is the sum it stands for, and its verdict that of the reading', () => {
    fc.assert(
      fc.property(anyInput, (input) => {
        const { candidates, verdict } = evaluateNow(input);
        for (const candidate of candidates) {
          const trace = input.traces[candidate.traceIndex]!;
          const line = input.lines.find(({ id }) => id === candidate.lineId)!;
          const receiver = candidate.reading + (trace.unit === 'dBm' ? 90 + 10 * Math.log10(50) : 0);
          const terms = input.terms.filter(({ applied }) => applied);
          const sum = terms.reduce(
            (level, { table }) =>
              level + (table.quantity === 'gain' ? -1 : 1) * factorAt(table, candidate.frequencyHz)!.valueDb,
            receiver,
          );
          expect(candidate.level).toBe(sum);
          expect(candidate.limit).toBe(limitAt(line, candidate.frequencyHz));
          expect(candidate.marginDb).toBe(candidate.limit - candidate.level);
          const judged = readingVerdict({
            marginDb: candidate.marginDb,
            uncertaintyDb: candidate.uncertaintyDb,
            detector: trace.detector,
            rbwHz: trace.rbwHz,
            lineDetector: line.detector,
            requiredBandwidthHz: line.bandwidthHz,
            purpose: input.purpose,
          });
          expect({ verdict: candidate.verdict, because: candidate.because }).toEqual(judged);
          expect(severity(verdict)).toBeLessThanOrEqual(severity(candidate.verdict));
        }
      }),
      { numRuns: 60 },
    );
  });

  test('the worst margin of a pair is the smallest over its points, and no count is negative', () => {
    fc.assert(
      fc.property(anyInput, (input) => {
        const { pairs, counts, candidates, gaps, layers } = evaluateNow(input);
        for (const pair of pairs) {
          const ofPair = candidates.filter((c) => c.traceIndex === pair.traceIndex && c.lineId === pair.lineId);
          for (const { marginDb } of ofPair) expect(marginDb).toBeGreaterThanOrEqual(pair.worstMarginDb!);
        }
        expect(VERDICTS.reduce((sum, verdict) => sum + counts[verdict], 0)).toBe(candidates.length + gaps.length);
        expect(layers).toHaveLength(input.traces.length);
      }),
      { numRuns: 40 },
    );
  });
});

describe('pace', () => {
  test('an emission in the last of several stretches is found where it is', () => {
    const readings = Array.from({ length: 50_000 }, (_, i) => (i === 49_000 ? 58 : 20));
    const trace = traceOf(readings, { startHz: 150e3, stepHz: 500 });
    const found = evaluateNow(inputOf({ traces: [trace] }));
    const frequencyHz = 150e3 + 49_000 * 500;
    expect(found.candidates[0]).toMatchObject({ frequencyHz, marginDb: 2, verdict: 'needs-final' });
    expect(found.pairs[0]).toMatchObject({ points: 50_000, worstMarginDb: 2, worstFrequencyHz: frequencyHz });
  });

  test('a run of 100 000 points yields often, and every yield is a stretch of about 16384 points', () => {
    const trace = traceOf(
      Array.from({ length: 100_000 }, (_, i) => 20 + (i % 7)),
      { startHz: 150e3, stepHz: 290 },
    );
    const run = evaluate(inputOf({ traces: [trace], lines: [lineOf([[0.1, 30, 60, 60]])] }));
    let yields = 0;
    while (!run.next().done) yields++;
    expect(yields).toBeGreaterThanOrEqual(3 * Math.floor(100_000 / 16_384));
  });
});

describe('what a file can hold is never refused', () => {
  const line = lineOf([[1, 1.4, 60, 60]]);
  const readings = (odd: number[], at: number) => {
    const all = Array<number>(120).fill(20);
    all.splice(at, odd.length, ...odd);
    return all;
  };
  const levelsIn = ({ layers, candidates }: ReturnType<typeof evaluateNow>) => [
    ...layers.flatMap((layer) => [...layer.levelMin, ...layer.levelMax, ...layer.marginMin, ...layer.marginMax]),
    ...candidates.flatMap(({ level, marginDb }) => [level, marginDb]),
  ];

  test.each([[[1e39]], [[-1e39]], [[NaN]], [[Infinity, NaN, -Infinity]]])(
    'readings of %p are not read: a gap, and never a level',
    (odd) => {
      for (const unit of ['dBuV', 'dBm', 'uV', 'W'] as const) {
        const base = unit === 'dBm' ? -90 : unit === 'W' ? 1e-12 : 20;
        const trace = traceOf(
          readings(odd, 50).map((value) => (value === 20 ? base : value)),
          { unit },
        );
        const found = evaluateNow(inputOf({ traces: [trace], lines: [line] }));
        expect(found.gaps).toEqual([
          {
            lineId: 'line',
            fromHz: trace.frequencyHz[49],
            toHz: trace.frequencyHz[50 + odd.length],
            because: 'gap',
          },
        ]);
        expect(found.verdict).toBe('not-covered');
        expect(found.pairs[0]!.points).toBe(89 - odd.length);
        expect(levelsIn(found).every(Number.isFinite)).toBe(true);
      }
    },
  );

  test('frequencies of 0 Hz, below, or none have no place: the rest is judged as if they were not there', () => {
    const rest = traceOf(Array<number>(120).fill(20));
    const terms = [termOf(tableOf('loss', [[0.5, 1], [30, 1]]))]; // prettier-ignore
    const whole = evaluateNow(inputOf({ traces: [rest], lines: [line], terms }));
    for (const odd of [0, -4_500, NaN, Infinity]) {
      const trace = traceOf([90, ...rest.reading, 90], { frequencyHz: [odd, ...rest.frequencyHz, odd] });
      expect(evaluateNow(inputOf({ traces: [trace], lines: [line], terms }))).toEqual(whole);
    }
    const split = [...rest.frequencyHz];
    split.splice(10, 3, -1, -1, -1);
    expect(
      evaluateNow(inputOf({ traces: [{ ...rest, frequencyHz: Float64Array.from(split) }], lines: [line] })),
    ).toMatchObject({
      verdict: 'not-covered',
      gaps: [{ fromHz: rest.frequencyHz[9], toHz: rest.frequencyHz[13], because: 'gap' }],
    });
  });

  test('an axis without any frequency leaves every line open from end to end', () => {
    const trace = traceOf([1, 2, 3], { frequencyHz: [-2e6, -1e6, 0] });
    const found = evaluateNow(inputOf({ traces: [trace], lines: [line, { ...line, id: 'other' }] }));
    expect(found).toMatchObject({ verdict: 'not-covered', pairs: [], candidates: [] });
    expect(found.gaps.map(({ lineId, fromHz, toHz, because }) => [lineId, fromHz, toHz, because])).toEqual([
      ['line', 1e6, 1.4e6, 'no-trace'],
      ['other', 1e6, 1.4e6, 'no-trace'],
    ]);
    expect(found.layers[0]!.frequencyHz).toHaveLength(0);
  });

  test('any frequencies and any readings evaluate, and every figure is finite (property)', () => {
    const figure = fc.oneof(fc.double(), fc.integer({ min: -100, max: 200 }));
    const hertz = fc.oneof(fc.double(), fc.integer({ min: -1_000_000, max: 3_000_000 }));
    const units = fc.constantFrom<LevelUnit>('dBuV', 'dBm', 'V', 'mW', 'dB');
    fc.assert(
      fc.property(fc.array(fc.tuple(hertz, figure), { maxLength: 60 }), units, (points, unit) => {
        const trace = traceOf(
          points.map(([, value]) => value),
          { frequencyHz: points.map(([hz]) => hz), unit },
        );
        const found = evaluateNow(inputOf({ traces: [trace], lines: [line] }));
        expect(levelsIn(found).every(Number.isFinite)).toBe(true);
      }),
      { numRuns: 200 },
    );
  });
});

describe('a trace behind a narrow VBW', () => {
  test('proves nothing, and every candidate says why', () => {
    const trace = traceOf(Array<number>(120).fill(20), { detector: 'peak', vbwHz: 100 });
    const found = evaluateNow(inputOf({ traces: [trace], lines: [lineOf([[1, 1.4, 60, 60]])] }));
    expect(found.verdict).toBe('needs-final');
    expect(found.candidates.every(({ because }) => /VBW 100 Hz is narrower than RBW 9 kHz/.test(because!))).toBe(true);
  });
});

describe('what cannot be evaluated is refused', () => {
  test.each<[string, Partial<EvaluationInput>]>([
    [
      'a factor table that does not rise',
      {
        terms: [
          termOf(
            tableOf('loss', [
              [2, 1],
              [1, 1],
            ]),
          ),
        ],
      },
    ],
    ['a line without segments', { lines: [lineOf([])] }],
    ['a negative uncertainty', { uncertainty: { prescan: [{ startHz: 1, stopHz: 2, expandedDb: -1 }], final: [] } }],
    ['fewer readings than frequencies', { traces: [traceOf([1], { frequencyHz: [1, 2] })] }],
  ])('%s', (_, more) => {
    expect(() => evaluateNow(inputOf({ traces: [traceOf([1])], ...more }))).toThrow(RangeError);
  });
});
