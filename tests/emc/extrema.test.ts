import fc from 'fast-check';
import { localMinima, nthSmallest, prominentMinima } from '@/emc/extrema';
import { runThrough } from './given';

const minima = (values: number[]) => runThrough(localMinima(Float64Array.from(values), 0, values.length));
const prominent = (values: number[], by: number) =>
  runThrough(prominentMinima(Float64Array.from(values), 0, values.length, by));

/** Small integers make plateaus and ties common. */
const series = fc.array(fc.integer({ min: 0, max: 8 }), { minLength: 1, maxLength: 60 });

/** A minimum by the definition: the first point of a plateau that rises, or ends, on both sides. */
function byDefinition(values: number[]): number[] {
  return values.flatMap((value, i) => {
    if (values[i - 1] === value) return [];
    let last = i;
    while (values[last + 1] === value) last++;
    return (values[i - 1] ?? Infinity) > value && (values[last + 1] ?? Infinity) > value ? [i] : [];
  });
}

/** Prominence by the definition: the lower of the two rises that part a value from anything lower. */
function prominenceOf(values: number[], at: number): number {
  const rise = (step: 1 | -1) => {
    let highest = values[at]!;
    for (let i = at + step; i >= 0 && i < values.length; i += step) {
      if (values[i]! < values[at]!) return highest - values[at]!;
      highest = Math.max(highest, values[i]!);
    }
    return Infinity;
  };
  return Math.min(rise(1), rise(-1));
}

describe('local minima', () => {
  test.each<[string, number[], number[]]>([
    ['one point alone', [3], [0]],
    ['a falling end counts', [3, 2, 1], [2]],
    ['a plateau counts once, by its first point', [3, 1, 1, 1, 2], [1]],
    ['a flat line is one plateau', [2, 2, 2], [0]],
    ['a step down is no minimum', [3, 2, 2, 1, 4], [3]],
    ['both ends', [1, 5, 1], [0, 2]],
  ])('%s', (_, values, expected) => expect(minima(values)).toEqual(expected));

  test('are those of the definition (property)', () => {
    fc.assert(fc.property(series, (values) => expect(minima(values)).toEqual(byDefinition(values))));
  });
});

describe('prominent minima', () => {
  test('are the minima whose prominence, by the definition, is at least the threshold (property)', () => {
    fc.assert(
      fc.property(series, fc.integer({ min: 1, max: 6 }), (values, by) => {
        const found = prominent(values, by);
        const sunk = found.map((i) => values[i]);
        for (const i of found) {
          expect(byDefinition(values)).toContain(i);
          expect(prominenceOf(values, i)).toBeGreaterThanOrEqual(by);
        }
        // Equal minima with no sufficient rise between them count once, so compare what must be there: strict ones.
        for (const i of byDefinition(values)) {
          const rivals = values.filter((value, k) => k !== i && value === values[i]).length;
          if (rivals === 0 && prominenceOf(values, i) >= by) expect(found).toContain(i);
        }
        expect(sunk).toContain(Math.min(...values));
      }),
      { numRuns: 500 },
    );
  });
});

test('the nth smallest is that of the sorted values, for any two ranks in a row (property)', () => {
  const numbers = fc.array(fc.double({ noNaN: true, min: -50, max: 50 }), { minLength: 1, maxLength: 80 });
  fc.assert(
    fc.property(numbers, fc.nat(), fc.nat(), (values, a, b) => {
      const buffer = Float64Array.from(values);
      const sorted = Float64Array.from(values).sort();
      for (const rank of [a % values.length, b % values.length]) expect(nthSmallest(buffer, rank)).toBe(sorted[rank]);
    }),
    { numRuns: 300 },
  );
});
