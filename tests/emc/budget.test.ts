import uncertainties from '@fixtures/published/uncertainty.json';
import fc from 'fast-check';
import {
  budgetOf,
  coverageFactorAt,
  divisorOf,
  rootSumOfSquares,
  type Contribution,
  type Distribution,
} from '@/emc/budget';

const RECTANGULAR: Distribution = { shape: 'rectangular' };

/** How the published tables write a distribution. */
function distributionOf(written: string): Distribution {
  const k = /^normal k=(\d+)$/.exec(written)?.[1];
  if (k) return { shape: 'normal', k: Number(k) };
  if (written === 'rectangular' || written === 'triangular' || written === 'U-shaped') return { shape: written };
  throw new Error(`${written} is not known`);
}

function contributionOf(more: Partial<Contribution>): Contribution {
  return { name: 'cable loss', valueDb: 1, distribution: RECTANGULAR, sensitivity: 1, source: 'test', ...more };
}

describe('divisors (JCGM 100:2008 4.3, NIST TN 1297 section 4, LAB34 3.4)', () => {
  const table = uncertainties.divisors.rows.flatMap(({ distribution, divisor }) =>
    typeof divisor === 'number' ? [{ distribution, divisor }] : [],
  );
  test.each(table.filter(({ distribution }) => !distribution.startsWith('normal')))(
    '$distribution is $divisor (verified; √6 from memory)',
    ({ distribution, divisor }) => {
      expect(Math.abs(divisorOf(distributionOf(distribution)) - divisor)).toBeLessThanOrEqual(1e-6);
    },
  );

  test.each(table.filter(({ distribution }) => distribution.startsWith('normal')))(
    'a $distribution is divided by its own factor, $divisor (verified)',
    ({ distribution, divisor }) => {
      const level = Number(/(\d+) %/.exec(distribution)![1]) / 100;
      expect(divisorOf({ shape: 'normal', k: divisor })).toBe(divisor);
      expect(coverageFactorAt(1e15, level)).toBeCloseTo(divisor, divisor === 1.96 ? 2 : 3);
    },
  );

  test('a normal half-width that holds 50 % is multiplied by 1.48 (GUM 4.3.5, verified)', () => {
    const row = uncertainties.divisors.rows.find(({ multiplier }) => multiplier !== undefined)!;
    expect(Math.abs(1 / coverageFactorAt(1e15, 0.5) - row.multiplier!)).toBeLessThanOrEqual(0.005);
  });

  test.each(uncertainties.divisors.worked)('±$halfWidth $distribution is $exact, printed 0.87 (verified)', (row) => {
    const { rows } = budgetOf([contributionOf({ valueDb: row.halfWidth })]);
    expect(rows[0]!.standardDb).toBeCloseTo(row.exact, 6);
    expect(Math.abs(rows[0]!.standardDb - row.standardUncertainty)).toBeLessThanOrEqual(0.005);
  });
});

test('5.0 and 3.67 percent combine to 6.2 (power sensor manual, verified)', () => {
  const { componentsPercent, combinedPercent, recomputed } = uncertainties.rssExample;
  expect(rootSumOfSquares(componentsPercent)).toBeCloseTo(recomputed, 2);
  expect(Math.abs(rootSumOfSquares(componentsPercent) - combinedPercent)).toBeLessThanOrEqual(0.05);
});

describe.each(uncertainties.budgets)('$measurement ($source, $basis)', (published) => {
  const result = budgetOf(
    published.rows.map((row) =>
      contributionOf({
        name: row.contribution,
        valueDb: row.halfWidthDb,
        distribution: distributionOf(row.distribution),
        sensitivity: row.sensitivity,
      }),
    ),
  );

  test('each standard uncertainty and divisor is the published one to its four digits', () => {
    published.rows.forEach((row, i) => {
      expect(Math.abs(result.rows[i]!.standardDb - row.standardUncertaintyDb)).toBeLessThanOrEqual(5.001e-5);
      expect(Math.abs(result.rows[i]!.divisor - row.divisor)).toBeLessThanOrEqual(5.001e-5);
    });
  });

  test('combined and expanded are the published ones', () => {
    expect(Math.abs(result.combinedDb - published.combinedDb)).toBeLessThanOrEqual(5.001e-5);
    expect(Math.abs(result.expandedDb - published.expandedK2Db)).toBeLessThanOrEqual(5.001e-5);
    expect(result.coverageFactor).toBe(2);
    expect(result.effectiveDegreesOfFreedom).toBeNull();
  });

  test('it is the Ucispr of its edition to one digit, or below where that is the largest of several budgets', () => {
    const { publishedUcisprDb } = published;
    if (publishedUcisprDb === undefined) expect(published.id).toBe('constructed');
    else if (published.publishedNote) expect(result.expandedDb).toBeLessThan(publishedUcisprDb);
    else expect(Math.abs(result.expandedDb - publishedUcisprDb)).toBeLessThanOrEqual(0.05);
  });
});

describe('effective degrees of freedom (Welch-Satterthwaite)', () => {
  test('0.25, 0.57 and 0.82 percent with 9, 4 and 14 give 19.0, k 2.09 and U 2.2 (GUM G.4.1 example, from memory)', () => {
    const given = uncertainties.welchSatterthwaite;
    const { combinedDb, effectiveDegreesOfFreedom } = budgetOf(
      given.componentsPercent.map((valueDb, i) =>
        contributionOf({
          valueDb,
          distribution: { shape: 'normal', k: 1 },
          degreesOfFreedom: given.degreesOfFreedom[i],
        }),
      ),
    );
    expect(Math.abs(combinedDb - given.combinedPercent)).toBeLessThanOrEqual(0.005);
    expect(Math.abs(effectiveDegreesOfFreedom! - given.effectiveDegreesOfFreedom)).toBeLessThanOrEqual(0.1);
    const expanded = coverageFactorAt(effectiveDegreesOfFreedom!, given.level) * combinedDb;
    expect(Math.abs(expanded - given.expandedPercent)).toBeLessThanOrEqual(0.05);
  });

  test.each(uncertainties.coverageFactors.rows)(
    'one contribution with $dof alone is expanded by $k9545',
    ({ dof, k9545 }) => {
      const { coverageFactor, expandedDb, combinedDb, effectiveDegreesOfFreedom } = budgetOf([
        contributionOf({ degreesOfFreedom: dof }),
      ]);
      expect(effectiveDegreesOfFreedom).toBeCloseTo(dof, 9);
      expect(Math.abs(coverageFactor - k9545)).toBeLessThanOrEqual(1e-4);
      expect(expandedDb).toBe(coverageFactor * combinedDb);
    },
  );

  test('two equal contributions with ν each have 2ν, and one of them without limit makes it 4ν', () => {
    const limited = contributionOf({ degreesOfFreedom: 6 });
    expect(budgetOf([limited, limited]).effectiveDegreesOfFreedom).toBeCloseTo(12, 9);
    expect(budgetOf([limited, contributionOf({})]).effectiveDegreesOfFreedom).toBeCloseTo(24, 9);
  });

  test('with degrees of freedom beyond count k is 2, with infinitely many and none alike', () => {
    expect(budgetOf([contributionOf({ degreesOfFreedom: 1e15 })]).coverageFactor).toBeCloseTo(2, 12);
    expect(budgetOf([contributionOf({ degreesOfFreedom: Infinity })]).coverageFactor).toBe(2);
    expect(budgetOf([contributionOf({ degreesOfFreedom: null })]).coverageFactor).toBe(2);
  });
});

describe('any budget', () => {
  const distribution = fc.oneof(
    fc.constantFrom<Distribution>({ shape: 'rectangular' }, { shape: 'triangular' }, { shape: 'U-shaped' }),
    fc.double({ min: 0.5, max: 4, noNaN: true }).map((k): Distribution => ({ shape: 'normal', k })),
  );
  const contribution = fc.record({
    name: fc.constant('one'),
    source: fc.constant('test'),
    valueDb: fc.double({ min: 0.01, max: 5, noNaN: true }),
    sensitivity: fc.double({ min: -2, max: 2, noNaN: true }).filter((c) => Math.abs(c) > 0.01),
    distribution,
    degreesOfFreedom: fc.option(fc.integer({ min: 1, max: 40 })),
  });
  const budgets = fc.array(contribution, { minLength: 1, maxLength: 8 });

  test('shares of the variance add up to 1, and the sign of a sensitivity moves nothing (property)', () => {
    fc.assert(
      fc.property(budgets, (contributions) => {
        const result = budgetOf(contributions);
        expect(result.rows.reduce((sum, row) => sum + row.shareOfVariance!, 0)).toBeCloseTo(1, 10);
        const mirrored = contributions.map((one) => ({ ...one, sensitivity: -one.sensitivity }));
        expect(budgetOf(mirrored).expandedDb).toBe(result.expandedDb);
      }),
      { numRuns: 30 },
    );
  });

  test('twice every value is twice the combined uncertainty; one more contribution never lowers it (property)', () => {
    fc.assert(
      fc.property(budgets, contribution, (contributions, another) => {
        const { combinedDb } = budgetOf(contributions);
        const doubled = contributions.map((one) => ({ ...one, valueDb: 2 * one.valueDb }));
        expect(budgetOf(doubled).combinedDb).toBeCloseTo(2 * combinedDb, 10);
        expect(budgetOf([...contributions, another]).combinedDb).toBeGreaterThanOrEqual(combinedDb);
      }),
      { numRuns: 30 },
    );
  });

  test('k is at least 2 and the effective degrees of freedom at least the fewest given (property)', () => {
    fc.assert(
      fc.property(budgets, (contributions) => {
        const { effectiveDegreesOfFreedom, coverageFactor } = budgetOf(contributions);
        const given = contributions.flatMap((one) => one.degreesOfFreedom ?? []);
        expect(effectiveDegreesOfFreedom === null).toBe(given.length === 0);
        expect(coverageFactor).toBeGreaterThanOrEqual(2);
        if (effectiveDegreesOfFreedom !== null) {
          expect(effectiveDegreesOfFreedom).toBeGreaterThanOrEqual(Math.min(...given) * (1 - 1e-9));
        }
      }),
      { numRuns: 30 },
    );
  });
});

describe('what cannot be', () => {
  test('a sensitivity scales what a contribution adds', () => {
    const { rows } = budgetOf([contributionOf({ sensitivity: -0.5 })]);
    expect(rows[0]!.contributedDb).toBeCloseTo(0.5 / Math.sqrt(3), 12);
  });

  test('a budget of zeros has no shares', () => {
    const zero = budgetOf([contributionOf({ valueDb: 0, degreesOfFreedom: 4 })]);
    expect(zero.rows[0]!.shareOfVariance).toBeNull();
    expect(zero).toMatchObject({ combinedDb: 0, expandedDb: 0, effectiveDegreesOfFreedom: null });
  });

  test('no contributions, and values, factors and degrees of freedom that are none, are refused by name', () => {
    expect(() => budgetOf([])).toThrow(RangeError);
    for (const valueDb of [-0.1, NaN, Infinity]) {
      expect(() => budgetOf([contributionOf({ valueDb })])).toThrow(`cable loss: ${valueDb} dB`);
    }
    for (const k of [0, -2, NaN, Infinity]) {
      expect(() => budgetOf([contributionOf({ distribution: { shape: 'normal', k } })])).toThrow(RangeError);
    }
    for (const sensitivity of [NaN, Infinity])
      expect(() => budgetOf([contributionOf({ sensitivity })])).toThrow(RangeError);
    for (const degreesOfFreedom of [0, 0.9, -1, NaN]) {
      expect(() => budgetOf([contributionOf({ degreesOfFreedom })])).toThrow(`${degreesOfFreedom} degrees`);
    }
    expect(() => coverageFactorAt(0.5)).toThrow('0.5');
  });
});
