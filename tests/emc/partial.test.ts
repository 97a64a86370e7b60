import fc from 'fast-check';
import { DETECTORS, PURPOSES, VERDICTS } from '@/emc/kinds';
import { evaluateNow } from '@/emc/evaluate';
import { portVerdict, type PortRun } from '@/emc/port';
import type { Evaluation, EvaluationInput, Trace } from '@/emc/types';
import { workingAt } from '@/emc/working';
import { inputOf, lineOf, traceOf } from './given';

/* A run kept from a file that breaks off finds what is over and proves nothing else. */

const generated = fc.record({
  readings: fc.array(fc.float({ min: -20, max: 90, noNaN: true }), { minLength: 2, maxLength: 60 }),
  cut: fc.nat(),
  detector: fc.constantFrom(...DETECTORS),
  rbwHz: fc.constantFrom(9_000, 100_000, 200, null),
  purpose: fc.constantFrom(...PURPOSES),
  limit: fc.integer({ min: -30, max: 100 }),
  expandedDb: fc.float({ min: 0, max: 8, noNaN: true }),
  falling: fc.boolean(),
});
type Generated = typeof generated extends fc.Arbitrary<infer T> ? T : never;

function inputFor({ readings, detector, rbwHz, purpose, limit, expandedDb, falling }: Generated): EvaluationInput {
  const trace = traceOf(readings, { startHz: falling ? 2e6 : 1e6, stepHz: falling ? -4_500 : 4_500, detector, rbwHz });
  const steps = [{ startHz: 1e3, stopHz: 1e9, expandedDb }];
  const lines = [
    lineOf([[0.1, 30, limit, limit]]),
    lineOf([[1.05, 1.2, limit, limit]], { id: 'average', detector: 'average' }),
  ];
  return inputOf({ traces: [trace], purpose, lines, uncertainty: { prescan: steps, final: steps } });
}

/** The first points of each trace, as a file that breaks off leaves them. */
function broken(input: EvaluationInput, cut: number): EvaluationInput {
  const points = 1 + (cut % input.traces[0]!.reading.length);
  const traces = input.traces.map((trace): Trace => {
    const { frequencyHz, reading } = trace;
    return { ...trace, frequencyHz: frequencyHz.slice(0, points), reading: reading.slice(0, points) };
  });
  return { ...input, traces, partial: true };
}

const portRun = (input: EvaluationInput, { verdict, gaps }: Evaluation, line: 'L' | 'N'): PortRun => ({
  purpose: input.purpose,
  polarisation: null,
  line,
  heightM: null,
  heightSwept: false,
  verdict,
  gaps,
  lines: input.lines,
  partial: input.partial,
});

const stays = (verdict: string) => verdict !== 'under' && verdict !== 'not-covered';

test('cut anywhere, nothing of a partial run is under: no candidate, no run, no port, no Working', () => {
  fc.assert(
    fc.property(generated, (given) => {
      const input = broken(inputFor(given), given.cut);
      const evaluation = evaluateNow(input);
      expect(evaluation.verdict).not.toBe('under');
      expect(evaluation.counts.under).toBe(0);
      for (const { verdict, because } of evaluation.candidates) {
        expect(verdict).not.toBe('under');
        if (verdict === 'not-covered') expect(because).toMatch(/\S/);
      }
      const trace = input.traces[0]!;
      for (const frequencyHz of trace.frequencyHz) {
        for (const { id } of input.lines) expect(workingAt(input, 0, frequencyHz, id).verdict).not.toBe('under');
      }
      const alone = (['L', 'N'] as const).map((line) => portRun(input, evaluation, line));
      expect(portVerdict('ac-mains', alone).verdict).not.toBe('under');
    }),
    { numRuns: 500 },
  );
});

test('what a partial run finds over, needing a final or inconclusive is what the same points say of a whole run', () => {
  fc.assert(
    fc.property(generated, (given) => {
      const partial = broken(inputFor(given), given.cut);
      const whole = evaluateNow({ ...partial, partial: false });
      const found = evaluateNow(partial);
      expect(found.candidates.filter((one) => stays(one.verdict))).toEqual(
        whole.candidates.filter((one) => stays(one.verdict)),
      );
      if (stays(whole.verdict)) expect(found.verdict).toBe(whole.verdict);
      expect(found.pairs).toEqual(whole.pairs);
      expect(found.layers).toEqual(whole.layers);
    }),
    { numRuns: 300 },
  );
});

test('a partial run covers nothing: every line is open over all that it asks', () => {
  fc.assert(
    fc.property(generated, (given) => {
      const input = broken(inputFor(given), given.cut);
      const { gaps } = evaluateNow(input);
      for (const { id, segments } of input.lines) {
        const own = gaps.filter(({ lineId }) => lineId === id);
        expect(own[0]?.fromHz).toBe(segments[0]!.startHz);
        expect(own.at(-1)?.toHz).toBe(segments[0]!.stopHz);
        for (const [i, gap] of own.entries()) if (i > 0) expect(gap.fromHz).toBe(own[i - 1]!.toHz);
      }
    }),
    { numRuns: 300 },
  );
});

const runs = fc.array(
  fc.record({
    purpose: fc.constantFrom(...PURPOSES),
    line: fc.constantFrom('L' as const, 'N' as const, 'L1' as const),
    verdict: fc.constantFrom(...VERDICTS),
    open: fc.boolean(),
    partial: fc.boolean(),
  }),
  { maxLength: 6 },
);

test('a port is never under because of a partial run: with it, it is never under where it was not without', () => {
  fc.assert(
    fc.property(runs, (given) => {
      const all = given.map(({ purpose, line, verdict, open, partial }): PortRun => ({
        purpose,
        polarisation: null,
        line,
        heightM: null,
        heightSwept: false,
        // what `evaluate` never gives a partial run
        verdict: partial && verdict === 'under' ? 'not-covered' : verdict,
        gaps: open ? [{ lineId: 'qp', fromHz: 1e6, toHz: 2e6, because: 'no-trace' }] : [],
        lines: [{ id: 'qp', name: 'the quasi-peak line' }],
        partial,
      }));
      const whole = all.filter(({ partial }) => !partial);
      if (portVerdict('ac-mains', all).verdict === 'under') {
        expect(portVerdict('ac-mains', whole)).toEqual({ verdict: 'under', missing: [] });
      }
    }),
    { numRuns: 1000 },
  );
});

test('a position that was measured only in part says so, and a partial final settles no prescan', () => {
  const run = (more: Partial<PortRun>): PortRun => ({
    purpose: 'prescan',
    polarisation: null,
    line: 'L',
    heightM: null,
    heightSwept: false,
    verdict: 'under',
    gaps: [],
    lines: [{ id: 'qp', name: 'the quasi-peak line' }],
    ...more,
  });
  const partial = portVerdict('ac-mains', [
    run({}),
    run({ line: 'N', verdict: 'not-covered', partial: true, gaps: [] }),
  ]);
  expect(partial).toMatchObject({ verdict: 'not-covered', missing: [{ what: 'partial', position: 'N' }] });
  const final = run({ purpose: 'final', verdict: 'inconclusive', partial: true });
  const settled = portVerdict('ac-mains', [run({ verdict: 'needs-final' }), final, run({ line: 'N' })]);
  expect(settled.verdict).toBe('needs-final');
});
