import uncertainties from '@fixtures/published/uncertainty.json';
import fc from 'fast-check';
import {
  conformityProbability,
  falseAcceptRisk,
  guardInStandardUncertainties,
  isAccepted,
  largestFalseAcceptRisk,
  nonBinaryStatement,
  STATEMENTS,
} from '@/emc/guardBand';

const { ilacDecision, guardBands } = uncertainties;
const PUBLISHED = ['pass', 'conditional pass', 'conditional fail', 'fail'];

describe.each(ilacDecision.table.rows)('reading $reading against $limit with U $expandedUDb', (row) => {
  const stated = { level: row.reading, limit: row.limit, expandedUDb: row.expandedUDb };

  test(`the probability of conformity is ${row.conformanceProbability} (JCGM 106:2012, computed)`, () => {
    expect(conformityProbability(stated)).toBeCloseTo(row.conformanceProbability, 5);
  });

  test(`the specific risk of false acceptance is ${row.falseAcceptRisk} (JCGM 106:2012, computed)`, () => {
    expect(falseAcceptRisk(stated)).toBeCloseTo(row.falseAcceptRisk, 5);
  });

  test(`guarded with w = U is ${row.guardedAcceptanceWequalsU}, without guard ${row.simpleAcceptance} (ILAC-G8:09/2019 4.2)`, () => {
    expect(isAccepted(row.reading, row.limit, row.expandedUDb)).toBe(row.guardedAcceptanceWequalsU === 'pass');
    expect(isAccepted(row.reading, row.limit, 0)).toBe(row.simpleAcceptance === 'pass');
  });

  test(`the non-binary statement is ${row.nonBinary} (ILAC-G8:09/2019 4.2.3)`, () => {
    const statement = nonBinaryStatement(row.reading, row.limit, row.expandedUDb);
    expect(PUBLISHED[STATEMENTS.indexOf(statement)]).toBe(row.nonBinary);
  });
});

test.each(guardBands.rows)(
  'a risk of $risk takes a guard band of $guardInU u (computed, R qnorm)',
  ({ risk, guardInU }) => {
    // The risk for 2 u is printed to five digits, which moves the guard band by 2.5e-6.
    expect(Math.abs(guardInStandardUncertainties(risk) - guardInU)).toBeLessThanOrEqual(guardInU === 2 ? 3e-6 : 5e-7);
  },
);

test('the largest risk is 50 % without a guard band and 2.5 % with w = U, exactly 2.275 % (ILAC-G8:09/2019 4.2, verified)', () => {
  const [simple, guarded] = ilacDecision.facts.map(({ maxFalseAccept }) => maxFalseAccept);
  expect(largestFalseAcceptRisk(0, 5)).toBe(simple);
  expect(largestFalseAcceptRisk(5, 5)).toBeCloseTo(0.02275013, 8);
  expect(Math.abs(largestFalseAcceptRisk(5, 5) - guarded!)).toBeLessThan(0.0025);
  expect(largestFalseAcceptRisk(5, 5, 1.96)).toBeCloseTo(guarded!, 5);
});

describe('any statement', () => {
  const db = fc.double({ min: -30, max: 30, noNaN: true });
  const u = fc.double({ min: 0.1, max: 8, noNaN: true });

  test('probability and risk add up to 1 (property)', () => {
    fc.assert(
      fc.property(db, db, u, (level, limit, expandedUDb) => {
        const stated = { level, limit, expandedUDb };
        expect(conformityProbability(stated) + falseAcceptRisk(stated)).toBeCloseTo(1, 12);
      }),
    );
  });

  test('no accepted level has a larger risk than the guard band was chosen for (property)', () => {
    fc.assert(
      fc.property(db, db, u, fc.double({ min: 0.001, max: 0.5, noNaN: true }), (level, limit, expandedUDb, risk) => {
        const guardDb = (guardInStandardUncertainties(risk) * expandedUDb) / 2;
        expect(largestFalseAcceptRisk(guardDb, expandedUDb)).toBeCloseTo(risk, 10);
        if (isAccepted(level, limit, guardDb)) {
          expect(falseAcceptRisk({ level, limit, expandedUDb })).toBeLessThanOrEqual(risk + 1e-12);
        }
      }),
    );
  });

  test('statements worsen with the level and change on the edges: limit − w, limit, limit + w', () => {
    const at = [36.9, 37, 37.1, 40, 40.1, 43, 43.1].map((level) => nonBinaryStatement(level, 40, 3));
    const [under, conditional, overConditional, over] = STATEMENTS;
    expect(at).toEqual([under, under, conditional, conditional, overConditional, overConditional, over]);
  });
});

test('a level on an edge on paper is on it, whatever binary leaves of decimals', () => {
  const level = 0.1 + 37.2;
  expect(isAccepted(level, 37.3, 0)).toBe(true);
  expect(isAccepted(37.3 + 1e-4, 37.3, 0)).toBe(false);
  expect(nonBinaryStatement(level, 37.3, 1)).toBe('under, conditional');
  expect(nonBinaryStatement(level, 36.3, 1)).toBe('over, conditional');
});

test('what gives no probability is refused by name', () => {
  for (const expandedUDb of [0, -1, NaN, Infinity]) {
    expect(() => conformityProbability({ level: 1, limit: 2, expandedUDb })).toThrow(String(expandedUDb));
    expect(() => falseAcceptRisk({ level: 1, limit: 2, expandedUDb })).toThrow(RangeError);
  }
  for (const k of [0, -2, NaN, Infinity]) {
    expect(() => conformityProbability({ level: 1, limit: 2, expandedUDb: 1, k })).toThrow(RangeError);
  }
  expect(() => conformityProbability({ level: NaN, limit: 2, expandedUDb: 1 })).toThrow('NaN');
  expect(() => conformityProbability({ level: 1, limit: Infinity, expandedUDb: 1 })).toThrow('Infinity');
  for (const risk of [0, 0.51, -1, NaN]) expect(() => guardInStandardUncertainties(risk)).toThrow(String(risk));
  for (const guard of [-1, NaN, Infinity]) {
    expect(() => isAccepted(1, 2, guard)).toThrow(String(guard));
    expect(() => nonBinaryStatement(1, 2, guard)).toThrow(String(guard));
    expect(() => largestFalseAcceptRisk(guard, 1)).toThrow(String(guard));
  }
});
