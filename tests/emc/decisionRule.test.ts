import uncertainties from '@fixtures/published/uncertainty.json';
import fc from 'fast-check';
import { decide, verdictOfMargin, type DecisionFacts } from '@/emc/decisionRule';
import { DECISION_RULES } from '@/emc/kinds';
import { readingVerdict } from '@/emc/verdict';

const facts = (more: Partial<DecisionFacts>): DecisionFacts => {
  return { level: 39, limit: 40, expandedUDb: 5, ucisprDb: 6.3, ...more };
};

describe('CISPR 16-4-2', () => {
  test.each(uncertainties.cisprDecision.cases.rows)(
    '$case: $reading against $limit is compared as $compared (CISPR 16-4-2:2011 clause 4.1, rule verified, case computed)',
    ({ reading, limit, uLabDb, uCisprDb, addedDb, compared, complies }) => {
      const given = { level: reading, limit, expandedUDb: uLabDb, ucisprDb: uCisprDb };
      const { verdict, comparedAs } = decide('cispr-16-4-2', given);
      expect(verdict).toBe(complies ? 'under' : 'over');
      expect(comparedAs).toBeCloseTo(compared, 10);
      expect(comparedAs! - reading).toBeCloseTo(addedDb, 10);
    },
  );

  test('says whether anything was added, and on which side of the limit it leaves the level', () => {
    const worse = { expandedUDb: 6.9 };
    expect(decide('cispr-16-4-2', facts({})).because).toMatch(/not above Ucispr, .* itself is not over/);
    expect(decide('cispr-16-4-2', facts({ level: 41 })).because).toMatch(/not above Ucispr, .* itself is over/);
    expect(decide('cispr-16-4-2', facts({ ...worse })).because).toMatch(/added, the level is not over/);
    expect(decide('cispr-16-4-2', facts({ ...worse, level: 39.6 })).because).toMatch(/added, the level is over/);
  });

  test('without U or without Ucispr it does not decide and says which is missing', () => {
    const withoutU = decide('cispr-16-4-2', facts({ expandedUDb: null }));
    expect(withoutU).toMatchObject({ verdict: null, comparedAs: null });
    expect(withoutU.because).toMatch(/expanded uncertainty/);
    const withoutUcispr = decide('cispr-16-4-2', facts({ ucisprDb: null }));
    expect(withoutUcispr).toMatchObject({ verdict: null, comparedAs: null });
    expect(withoutUcispr.because).toMatch(/needs Ucispr/);
  });
});

describe('simple acceptance and guarded by U against the published decisions', () => {
  test.each(uncertainties.ilacDecision.table.rows)(
    'reading $reading, limit $limit, U $expandedUDb: simple $simpleAcceptance, w = U $guardedAcceptanceWequalsU (ILAC-G8:09/2019 4.2, rule verified, row computed)',
    ({ reading, limit, expandedUDb, simpleAcceptance, guardedAcceptanceWequalsU }) => {
      const given = facts({ level: reading, limit, expandedUDb, ucisprDb: null });
      expect(decide('simple-acceptance', given).verdict).toBe(simpleAcceptance === 'pass' ? 'under' : 'over');
      const guarded = decide('guarded-by-u', given).verdict;
      // The published table accepts a margin of exactly U, and all of its accepted rows are such; here it takes more.
      const beyond = limit - reading > expandedUDb;
      expect(guarded).toBe(beyond ? 'under' : 'inconclusive');
      if (guardedAcceptanceWequalsU !== 'pass') expect(guarded).toBe('inconclusive');
      else expect(decide('guarded-by-u', { ...given, level: reading - 0.001 }).verdict).toBe('under');
    },
  );

  test('guarded by U needs U and says so; simple acceptance needs neither figure', () => {
    expect(decide('guarded-by-u', facts({ expandedUDb: null }))).toMatchObject({ verdict: null, comparedAs: null });
    expect(decide('guarded-by-u', facts({ expandedUDb: null })).because).toMatch(/needs the expanded uncertainty/);
    const alone = decide('simple-acceptance', facts({ expandedUDb: null, ucisprDb: null }));
    expect(alone).toMatchObject({ verdict: 'under', comparedAs: 39 });
    expect(alone.because).toMatch(/not over the limit; uncertainty has no part/);
    expect(decide('simple-acceptance', facts({ level: 40.1 })).because).toMatch(/itself is over the limit/);
  });

  test.each([
    [36.9999, 'under'],
    [37, 'inconclusive'],
    [43, 'inconclusive'],
    [43.0001, 'over'],
  ])('%d against 40 with U 3 is %s when guarded, and compared as itself', (level, verdict) => {
    const decision = decide('guarded-by-u', facts({ level, expandedUDb: 3 }));
    expect(decision).toMatchObject({ verdict, comparedAs: level });
    expect(decision.because).toMatch(
      verdict === 'inconclusive' ? /within the expanded/ : new RegExp(`${verdict} the limit by more than`),
    );
  });
});

test('guarded by U is what a final in the asked detector and bandwidth gets today (property)', () => {
  const db = fc.double({ min: -20, max: 20, noNaN: true });
  const u = fc.double({ min: 0, max: 8, noNaN: true });
  const asAsked = { detector: 'average', lineDetector: 'average', rbwHz: 9e3, requiredBandwidthHz: 9e3 } as const;
  fc.assert(
    fc.property(db, u, fc.boolean(), (margin, uncertaintyDb, onTheEdge) => {
      const marginDb = onTheEdge ? Math.sign(margin) * uncertaintyDb : margin;
      const { verdict } = readingVerdict({ ...asAsked, marginDb, uncertaintyDb, purpose: 'final' });
      expect(verdictOfMargin('guarded-by-u', marginDb, uncertaintyDb, null)).toBe(verdict);
    }),
  );
});

test('under when guarded is under by each rule, over when guarded is over by each, and CISPR 16-4-2 is never milder than simple acceptance (property)', () => {
  // Eighths are exact in binary, so that what is equal on paper is equal.
  const db = fc.integer({ min: -160, max: 160 }).map((eighths) => eighths / 8);
  const u = fc.integer({ min: 0, max: 64 }).map((eighths) => eighths / 8);
  fc.assert(
    fc.property(db, u, u, (marginDb, expandedUDb, ucisprDb) => {
      const [guarded, cispr, simple] = DECISION_RULES.map((rule) =>
        verdictOfMargin(rule, marginDb, expandedUDb, ucisprDb),
      );
      if (guarded === 'under') expect(cispr).toBe('under');
      if (cispr === 'under') expect(simple).toBe('under');
      if (guarded === 'over') expect([cispr, simple]).toEqual(['over', 'over']);
      if (expandedUDb <= ucisprDb) expect(cispr).toBe(simple);
    }),
  );
});

test('a level on the limit on paper is not over it for what binary leaves of decimals', () => {
  expect(37.3 - (0.1 + 37.2)).toBeLessThan(0);
  expect(decide('simple-acceptance', facts({ level: 0.1 + 37.2, limit: 37.3 })).verdict).toBe('under');
  expect(decide('cispr-16-4-2', facts({ level: 0.1 + 37.2, limit: 37.3 })).verdict).toBe('under');
  for (const rule of ['simple-acceptance', 'cispr-16-4-2'] as const) {
    expect(decide(rule, facts({ level: 37.3 + 1e-4, limit: 37.3 })).verdict).toBe('over');
  }
});

test('no sentence says pass or fail, and figures that are none are refused by name', () => {
  for (const rule of DECISION_RULES) {
    for (const level of [30, 39.9, 41, 50]) {
      for (const expandedUDb of [null, 5, 7]) {
        expect(decide(rule, facts({ level, expandedUDb })).because).toMatch(/^[A-Z](?!.*(pass|fail)).*\.$/);
      }
    }
    for (const wrong of [NaN, Infinity]) {
      expect(() => decide(rule, facts({ level: wrong }))).toThrow(String(wrong));
      expect(() => decide(rule, facts({ limit: wrong }))).toThrow(String(wrong));
      expect(() => decide(rule, facts({ expandedUDb: wrong }))).toThrow(String(wrong));
      expect(() => decide(rule, facts({ ucisprDb: wrong }))).toThrow(String(wrong));
      expect(() => verdictOfMargin(rule, wrong, 1, 1)).toThrow(String(wrong));
    }
    expect(() => decide(rule, facts({ expandedUDb: -0.1 }))).toThrow('-0.1');
    expect(() => decide(rule, facts({ ucisprDb: -0.1 }))).toThrow('-0.1');
  }
  expect(() => decide('by-feel' as never, facts({}))).toThrow('by-feel');
});
