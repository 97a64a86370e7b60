import fc from 'fast-check';
import { columnsOf } from '@/emc/columns';
import { differenceOf, matchEmissions, pairTraces, type PairableHead } from '@/emc/difference';
import { isOneEmission, type Place } from '@/emc/emissions';
import { DETECTORS } from '@/emc/kinds';
import type { Columns } from '@/emc/types';

/* Two runs over each other. The rules are the product's own; what they promise is tested as properties. */

/** Levels at frequencies in MHz as columns of a window. */
function columnsAt(points: readonly (readonly [mhz: number, level: number])[], window: typeof WINDOW): Columns {
  const frequencyHz = Float64Array.from(points, ([mhz]) => mhz * 1e6);
  const level = Float64Array.from(points, ([, value]) => value);
  const none = new Uint8Array(points.length);
  return columnsOf(
    { frequencyHz, logHz: frequencyHz.map(Math.log), level, state: none, marginDb: level, hasMargin: none },
    window.fromHz,
    window.toHz,
    window.columns,
  );
}

const WINDOW = { fromHz: 30e6, toHz: 300e6, columns: 64 };
const sweep = fc.array(fc.tuple(fc.double({ min: 30, max: 300, noNaN: true }), fc.integer({ min: -20, max: 80 })), {
  minLength: 1,
  maxLength: 200,
});
const stepHz = fc.constantFrom(0, 75e3, 5e6, 400e6);

describe('the difference of two runs per column', () => {
  test('a run with itself is 0 wherever it has a point', () => {
    fc.assert(
      fc.property(sweep, stepHz, (points, step) => {
        const run = columnsAt(points, WINDOW);
        const found = differenceOf(run, run, WINDOW, WINDOW, step);
        expect(found.length).toBeGreaterThan(0);
        for (const { differenceDb } of found) expect(differenceDb).toBe(0);
      }),
    );
  });

  test('turned round it has the other sign at the same stretches', () => {
    fc.assert(
      fc.property(sweep, sweep, stepHz, (one, other, step) => {
        const [a, b] = [columnsAt(one, WINDOW), columnsAt(other, WINDOW)];
        const there = differenceOf(a, b, WINDOW, WINDOW, step);
        const back = differenceOf(b, a, WINDOW, WINDOW, step);
        expect(back.map((stretch) => ({ ...stretch, differenceDb: 0 - stretch.differenceDb }))).toEqual(
          there.map((stretch) => ({ ...stretch, differenceDb: stretch.differenceDb + 0 })),
        );
      }),
    );
  });

  test('it is the highest of b less the highest of a, by brute force over the points of each stretch', () => {
    fc.assert(
      fc.property(sweep, sweep, (one, other) => {
        const found = differenceOf(columnsAt(one, WINDOW), columnsAt(other, WINDOW), WINDOW, WINDOW, 0);
        const highest = (points: typeof one, fromHz: number, toHz: number) =>
          Math.max(...points.filter(([mhz]) => mhz * 1e6 >= fromHz && mhz * 1e6 < toHz).map(([, level]) => level));
        for (const { fromHz, toHz, differenceDb } of found) {
          // Points on an edge fall to one side by rounding; such stretches are left to the other properties.
          const onEdge = [...one, ...other].some(([mhz]) =>
            [fromHz, toHz].some((edge) => Math.abs(mhz * 1e6 - edge) < 1),
          );
          if (onEdge) continue;
          expect(differenceDb).toBe(highest(other, fromHz, toHz) - highest(one, fromHz, toHz));
        }
      }),
    );
  });

  test('nothing is said outside the range that both cover, nor where only one of them has points', () => {
    const a = columnsAt(
      Array.from({ length: 271 }, (_, i) => [30 + i, 40] as const),
      WINDOW,
    );
    const b = columnsAt(
      Array.from({ length: 61 }, (_, i) => [120 + i, 34] as const),
      WINDOW,
    );
    const found = differenceOf(a, b, WINDOW, { fromHz: 120e6, toHz: 180e6 }, 1e6);
    expect(found.length).toBeGreaterThan(5);
    for (const { fromHz, toHz, differenceDb } of found) {
      expect(fromHz).toBeGreaterThanOrEqual(120e6);
      expect(toHz).toBeLessThanOrEqual(180e6);
      expect(differenceDb).toBe(-6);
    }
  });

  test('stretches are as wide as the coarser step, so that two axes leave no holes between them', () => {
    const axis = (stepMhz: number, level: number) =>
      columnsAt(
        Array.from({ length: Math.floor(270 / stepMhz) + 1 }, (_, i) => [30 + i * stepMhz, level] as const),
        WINDOW,
      );
    const found = differenceOf(axis(3, 40), axis(4.5, 42), WINDOW, WINDOW, 4.5e6);
    for (const [i, stretch] of found.entries()) {
      expect(stretch.differenceDb).toBe(2);
      if (i > 0) expect(stretch.fromHz).toBe(found[i - 1]!.toHz);
    }
    expect([found[0]!.fromHz, found.at(-1)!.toHz]).toEqual([30e6, 300e6]);
  });
});

const head = fc.record({
  name: fc.constantFrom('Trace 1', 'Trace 2', 'Peak'),
  detector: fc.constantFrom(...DETECTORS),
  rbwHz: fc.constantFrom(null, 9e3, 120e3),
});
const heads = fc
  .array(head, { maxLength: 6 })
  .map((list) => list.map((one, index): PairableHead => ({ ...one, index })));

describe('which traces are laid over each other', () => {
  test('each trace once, and turned round the same pairs', () => {
    fc.assert(
      fc.property(heads, heads, (a, b) => {
        const pairs = pairTraces(a, b);
        for (const side of ['a', 'b'] as const) {
          const used = pairs.map((pair) => pair[side]);
          expect(new Set(used).size).toBe(used.length);
        }
        const key = ({ a: one, b: other }: { a: number; b: number }) => `${one} ${other}`;
        const back = pairTraces(b, a).map((pair) => key({ a: pair.b, b: pair.a }));
        expect(new Set(back)).toEqual(new Set(pairs.map(key)));
      }),
    );
  });

  test('a run beside itself lays each trace over itself', () => {
    fc.assert(
      fc.property(heads, (a) => {
        const pairs = pairTraces(a, a);
        expect(pairs.map((pair) => pair.b)).toEqual(pairs.map((pair) => pair.a));
        expect(pairs).toHaveLength(a.length);
      }),
    );
  });

  test('prescan and final have no detector in common: the uppermost traces are paired, and it is said', () => {
    const of = (...detectors: PairableHead['detector'][]) =>
      detectors.map((detector, index) => ({ index, name: detector, detector, rbwHz: 120e3 }));
    expect(pairTraces(of('average', 'peak'), of('quasi-peak'))).toEqual([{ a: 1, b: 0, sameDetector: false }]);
    expect(pairTraces(of('peak'), [])).toEqual([]);
  });
});

const place = fc
  .record({ mhz: fc.integer({ min: 300, max: 340 }), wide: fc.integer({ min: 1, max: 20 }), floor: fc.boolean() })
  .map(({ mhz, wide, floor }): Place => {
    const fromHz = mhz * 1e5;
    return { kind: floor ? 'floor' : 'peak', fromHz, toHz: floor ? fromHz + wide * 1e5 : fromHz, bandwidthHz: 120e3 };
  });
const places = fc.uniqueArray(place, { maxLength: 12, selector: (one) => `${one.kind} ${one.fromHz}` });

describe('which emissions are one', () => {
  test('turned round the same pairs; every emission of both stands in exactly one of them', () => {
    fc.assert(
      fc.property(places, places, (a, b) => {
        const pairs = matchEmissions(a, b);
        const key = (one: number | null, other: number | null) => `${one} ${other}`;
        expect(new Set(matchEmissions(b, a).map((pair) => key(pair.b, pair.a)))).toEqual(
          new Set(pairs.map((pair) => key(pair.a, pair.b))),
        );
        expect(pairs.flatMap((pair) => pair.a ?? []).sort((x, y) => x - y)).toEqual(a.map((_, i) => i));
        expect(pairs.flatMap((pair) => pair.b ?? []).sort((x, y) => x - y)).toEqual(b.map((_, i) => i));
        for (const pair of pairs) {
          if (pair.a !== null && pair.b !== null) expect(isOneEmission(a[pair.a]!, b[pair.b]!)).toBe(true);
        }
      }),
    );
  });

  test('a list with itself matches each with itself, and what was matched matches again', () => {
    fc.assert(
      fc.property(places, places, (a, b) => {
        for (const pair of matchEmissions(a, a)) expect(pair.b).toBe(pair.a);
        const both = matchEmissions(a, b).filter((pair) => pair.a !== null && pair.b !== null);
        const again = matchEmissions(
          both.map((pair) => a[pair.a!]!),
          both.map((pair) => b[pair.b!]!),
        );
        expect(again.filter((pair) => pair.a !== null && pair.b !== null)).toHaveLength(both.length);
      }),
    );
  });
});
