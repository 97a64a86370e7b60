import uncertainties from '@fixtures/published/uncertainty.json';
import fc from 'fast-check';
import { verdictOfMargin } from '@/emc/decisionRule';
import { evaluateNow } from '@/emc/evaluate';
import { guardAt, guardSteps } from '@/emc/guard';
import { DECISION_RULES, type DecisionRule } from '@/emc/kinds';
import type { EvaluationInput } from '@/emc/types';
import { ucisprSteps } from '@/emc/ucispr';
import { workingAt } from '@/emc/working';
import { inputOf, lineOf, traceOf } from './given';

const band = (expandedDb: number) => [{ startHz: 30e6, stopHz: 1e9, expandedDb }];

/** A final in the line's own detector and bandwidth, flat at a level, against a flat limit. */
function final(level: number, limit: number, rule: DecisionRule, expandedDb: number, ucisprDb: number | null) {
  const line = lineOf([[30, 1000, limit, limit]], { detector: 'quasi-peak', bandwidthHz: 120e3 });
  const trace = traceOf([level, level, level], {
    startHz: 100e6,
    stepHz: 50e3,
    detector: 'quasi-peak',
    rbwHz: 120e3,
    unit: line.unit,
  });
  const input: EvaluationInput = {
    ...inputOf({ traces: [trace], lines: [line], purpose: 'final', terms: [] }),
    uncertainty: { prescan: band(expandedDb), final: band(expandedDb) },
    rule,
    ucispr: ucisprDb === null ? [] : band(ucisprDb),
  };
  return input;
}

test.each(uncertainties.cisprDecision.cases.rows)(
  'a run judged by CISPR 16-4-2, $case: $complies (CISPR 16-4-2:2011 clause 4.1, rule verified, case computed)',
  ({ reading, limit, uLabDb, uCisprDb, complies }) => {
    const found = evaluateNow(final(reading, limit, 'cispr-16-4-2', uLabDb, uCisprDb));
    const listed = found.candidates.map(({ verdict }) => verdict);
    expect(listed.length).toBeGreaterThan(0);
    expect(new Set(listed)).toEqual(new Set([complies ? 'under' : 'over']));
  },
);

test('a run and its Working say what the rule says of the margin, whatever rule, margin, U and Ucispr (property)', () => {
  const db = (min: number, max: number) => fc.integer({ min: min * 8, max: max * 8 }).map((eighths) => eighths / 8);
  fc.assert(
    fc.property(
      fc.constantFrom(...DECISION_RULES),
      db(-12, 12),
      db(0, 9),
      fc.option(db(0, 9)),
      (rule, marginDb, expandedDb, ucisprDb) => {
        const input = final(40 - marginDb, 40, rule, expandedDb, ucisprDb);
        const wanted = verdictOfMargin(rule, marginDb, expandedDb, ucisprDb) ?? 'not-covered';
        const found = evaluateNow(input);
        if (wanted === 'not-covered') expect(found.candidates).toEqual([]);
        else expect(found.candidates[0]!.verdict).toBe(wanted);
        expect(workingAt(input, 0, 100.05e6, input.lines[0]!.id).verdict).toBe(wanted);
      },
    ),
  );
});

test('only the rule guarded by U leaves a final inconclusive', () => {
  const verdicts = DECISION_RULES.map((rule) => evaluateNow(final(38, 40, rule, 5, 6.3)).candidates[0]!.verdict);
  expect(verdicts).toEqual(['inconclusive', 'under', 'under']);
});

test('a peak prescan over the limit still needs a final by every rule, since it may read high', () => {
  for (const rule of DECISION_RULES) {
    const input = final(48, 40, rule, 5, 6.3);
    const peak = {
      ...input,
      purpose: 'prescan' as const,
      traces: [{ ...input.traces[0]!, detector: 'peak' as const }],
    };
    expect(evaluateNow(peak).candidates[0]!.verdict).toBe('needs-final');
  }
});

test('where Ucispr is not stated the rule that needs it covers nothing, and the Working says why', () => {
  const input = final(30, 40, 'cispr-16-4-2', 5, null);
  const found = evaluateNow(input);
  expect(found.verdict).toBe('not-covered');
  expect(found.gaps).toContainEqual(expect.objectContaining({ because: 'no-uncertainty' }));
  expect(workingAt(input, 0, 100e6, input.lines[0]!.id).because).toMatch(/needs Ucispr/);
});

test('steps meet where both are stated and nowhere else', () => {
  const own = [{ startHz: 30e6, stopHz: 300e6, expandedDb: 7 }];
  expect(guardSteps('cispr-16-4-2', own, [{ startHz: 100e6, stopHz: 1e9, expandedDb: 6.3 }])).toEqual([
    { startHz: 100e6, stopHz: 300e6, expandedDb: expect.closeTo(0.7, 12) },
  ]);
  expect(guardAt('cispr-16-4-2', own, ucisprSteps('enclosure'), 20e6)).toBeNull();
  expect(guardAt('guarded-by-u', own, [], 50e6)).toEqual({ db: 7, between: true });
});

test.each([
  ['enclosure', 100e6, 6.3],
  ['enclosure', 2e9, 5.2],
  ['ac-mains', 100e3, 3.8],
  ['ac-mains', 1e6, 3.4],
  ['wired-network', 1e6, 5.0],
] as const)('Ucispr for %s at %d Hz is %d dB (CISPR 16-4-2:2011 table 1, from memory)', (port, hz, db) => {
  const steps = ucisprSteps(port).filter(({ startHz, stopHz }) => hz >= startHz && hz <= stopHz);
  expect(steps.map(({ expandedDb }) => expandedDb)).toEqual([db]);
});
