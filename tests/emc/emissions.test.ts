import fc from 'fast-check';
import { groupEmissions, isOneEmission, type Emission, type Place, type Sighting } from '@/emc/emissions';
import { sameEmissions } from '@/emc/sameEmissions';

/** CISPR 16-1-1 bandwidth of bands C and D. */
const RBW_HZ = 120e3;

const peak = (frequencyHz: number, marginDb = 0, bandwidthHz = RBW_HZ): Sighting => ({
  kind: 'peak',
  fromHz: frequencyHz,
  toHz: frequencyHz,
  bandwidthHz,
  verdict: 'needs-final',
  marginDb,
});
const floor = (fromHz: number, toHz: number, marginDb = 0): Sighting => ({
  ...peak(fromHz, marginDb),
  kind: 'floor',
  toHz,
});

const frequency = fc.integer({ min: 30_000, max: 34_000 }).map((khz) => khz * 1e3);
const anyPeak = fc.record({
  kind: fc.constant('peak' as const),
  at: frequency,
  bandwidthHz: fc.constantFrom(9e3, 120e3, 1e6),
  verdict: fc.constantFrom('over' as const, 'needs-final' as const),
  marginDb: fc.integer({ min: -80, max: 40 }).map((tenths) => tenths / 10),
  carried: fc.boolean(),
});
const anyFloor = fc.record({
  at: frequency,
  length: fc.integer({ min: 1, max: 900 }),
  marginDb: fc.integer({ min: -9, max: 9 }),
});
const sightings = fc
  .tuple(fc.array(anyPeak, { maxLength: 40 }), fc.array(anyFloor, { maxLength: 8 }))
  .map(([peaks, floors]): Sighting[] => [
    ...peaks.map(({ at, ...one }) => ({ ...one, fromHz: at, toHz: at })),
    ...floors.map(({ at, length, marginDb }) => floor(at, at + length * 1e3, marginDb)),
  ]);

const places = (emissions: readonly Emission<Sighting>[]): Place[] =>
  emissions.map(({ kind, fromHz, toHz, bandwidthHz }) => ({ kind, fromHz, toHz, bandwidthHz }));

describe('sightings put together as emissions', () => {
  test('nearer than the bandwidth is one, further is two', () => {
    expect(groupEmissions([peak(100e6), peak(100e6 + RBW_HZ)])).toHaveLength(1);
    expect(groupEmissions([peak(100e6), peak(100e6 + RBW_HZ + 1)])).toHaveLength(2);
  });
  test('the worst reading gives the place, and a row of peaks does not run together', () => {
    const [a, b, c] = [peak(100e6, 3), peak(100.1e6, -1), peak(100.2e6, 2)];
    expect(places(groupEmissions([a, b, c]))).toMatchObject([{ fromHz: 100.1e6 }]);
    expect(places(groupEmissions([peak(100e6, -1), b, peak(100.2e6, -2)])).map(({ fromHz }) => fromHz)).toEqual([
      100e6, 100.2e6,
    ]);
  });
  test('what was read in this state gives the place before what was carried to it', () => {
    const [emission] = groupEmissions([{ ...peak(100e6, -9), carried: true }, peak(100.05e6, 3)]);
    expect(emission).toMatchObject({ fromHz: 100.05e6, sightings: [{ marginDb: 3 }, { carried: true }] });
  });
  test('floors that touch are one stretch, and never a peak', () => {
    const found = groupEmissions([floor(40e6, 50e6), peak(45e6), floor(50.1e6, 60e6), floor(70e6, 71e6)]);
    expect(found.map(({ kind, fromHz, toHz }) => [kind, fromHz, toHz])).toEqual([
      ['peak', 45e6, 45e6],
      ['floor', 40e6, 60e6],
      ['floor', 70e6, 71e6],
    ]);
  });

  test('whatever the order, the emissions are the same and hold every sighting once', () => {
    fc.assert(
      fc.property(sightings, fc.func(fc.integer()), (seen, key) => {
        const shuffled = [...seen].sort((a, b) => key(a.fromHz, a.marginDb) - key(b.fromHz, b.marginDb));
        const found = groupEmissions(seen);
        expect(places(groupEmissions(shuffled))).toEqual(places(found));
        expect(places(groupEmissions([...seen].reverse()))).toEqual(places(found));
        const held = found.flatMap((one) => one.sightings);
        expect(held).toHaveLength(seen.length);
        expect(new Set(held)).toEqual(new Set(seen));
      }),
    );
  });
  test('every sighting is one emission with its place, and no two places are one', () => {
    fc.assert(
      fc.property(sightings, (seen) => {
        const found = groupEmissions(seen);
        for (const emission of found)
          for (const one of emission.sightings) expect(isOneEmission(emission, one)).toBe(true);
        found.forEach((a, i) => found.slice(i + 1).forEach((b) => expect(isOneEmission(a, b)).toBe(false)));
      }),
    );
  });
  test('grouping the places again changes nothing', () => {
    fc.assert(
      fc.property(sightings, (seen) => {
        const once = places(groupEmissions(seen));
        const again = once.map((place): Sighting => ({ ...place, verdict: 'over', marginDb: 0 }));
        expect(places(groupEmissions(again))).toEqual(once);
      }),
    );
  });
});

describe('emissions found again', () => {
  const emissionsOf = fc
    .array(fc.record({ gap: fc.integer({ min: 0, max: 500 }), moved: fc.integer({ min: -100, max: 100 }) }), {
      maxLength: 30,
    })
    .map((list) => {
      let at = 30e6;
      return list.map(({ gap, moved }) => {
        at += RBW_HZ + 1 + gap * 1e3;
        return { before: peak(at), after: peak(at + (moved / 100) * RBW_HZ) };
      });
    });

  test('the same sightings are the same items, in any order and beside items long closed', () => {
    fc.assert(
      fc.property(sightings, fc.array(frequency, { maxLength: 10 }), fc.func(fc.integer()), (seen, closed, key) => {
        const found = places(groupEmissions(seen));
        const old = closed.map((at) => peak(at)).filter((one) => found.every((two) => two.fromHz !== one.fromHz));
        const items = [...old, ...found].sort((a, b) => key(a.fromHz, a.toHz) - key(b.fromHz, b.toHz));
        const same = sameEmissions(items, found).map((at) => (at === null ? null : items[at]));
        expect(same).toEqual(found);
      }),
    );
  });
  test('an emission that moves by no more than the spacing stays its item, however its neighbours move', () => {
    fc.assert(
      fc.property(emissionsOf, (list) => {
        const inOrder = list.every(({ after }, i) => i === 0 || after.fromHz > list[i - 1]!.after.fromHz);
        fc.pre(inOrder);
        const matched = sameEmissions(
          list.map(({ before }) => before),
          list.map(({ after }) => after),
        );
        expect(matched).toEqual(list.map((_, i) => i));
      }),
    );
  });
  test('no item is two emissions, none is matched beyond the spacing, and what is new is new', () => {
    fc.assert(
      fc.property(sightings, sightings, (before, after) => {
        const items = places(groupEmissions(before));
        const found = places(groupEmissions(after));
        const matched = sameEmissions(items, found);
        const taken = matched.filter((at) => at !== null);
        expect(new Set(taken).size).toBe(taken.length);
        matched.forEach((at, i) => at !== null && expect(isOneEmission(items[at]!, found[i]!)).toBe(true));
        found.forEach((one, i) => {
          const near = items.map((item, at) => ({ item, at })).filter(({ item }) => isOneEmission(item, one));
          if (matched[i] === null) expect(near.every(({ at }) => taken.includes(at))).toBe(true);
        });
      }),
    );
  });
  test('a floor that is read a little longer stays its item', () => {
    expect(sameEmissions([floor(40e6, 50e6), floor(60e6, 61e6)], [floor(60e6, 62e6), floor(39e6, 52e6)])).toEqual([
      1, 0,
    ]);
  });
  test('of thousands of emissions side by side each is matched with its own', () => {
    const many = Array.from({ length: 8000 }, (_, i) => peak(30e6 + i * (RBW_HZ + 1)));
    const moved = many.map(({ fromHz }) => peak(fromHz + 60e3));
    expect(sameEmissions(many, groupEmissions(moved))).toEqual(many.map((_, i) => i));
  });
});
