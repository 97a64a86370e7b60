import { limitSets } from '@fixtures/demo/limitSets';
import published from '@fixtures/published/limits.json';
import { prepareLine } from '@/emc/limitLine';
import { publishedLines } from '@/ops/publishedLimits';

const lines = publishedLines();
const microvolts = published.microvoltLines;

test('every line of limits.json can be entered, in the unit and with the source and basis it has there', () => {
  expect(published.lines).toHaveLength(57);
  for (const record of published.lines) {
    const line = lines.get(record.id)!;
    expect(line).toMatchObject({ unit: record.limitUnit, source: record.source, basis: record.basis });
    expect(line.segments).toHaveLength(record.segments.length);
    expect(() => prepareLine({ ...line, id: line.key })).not.toThrow();
  }
});

test('a line in µV/m says so, and above 1 GHz asks for average and 20 dB more for peak (47 CFR 15.35(b))', () => {
  const line = lines.get('fcc15109a')!;
  expect(line.source).toBe('47 CFR 15.109(a), stated as 100, 150, 200, 500 µV/m');
  expect(line.segments.at(-1)).toMatchObject({ startHz: 960e6, stopHz: 1e9 });
  const average = lines.get('fcc15109a-1g-av')!;
  const peak = lines.get('fcc15109a-1g-pk')!;
  expect(average).toMatchObject({ detector: 'average', bandwidthHz: 1e6, distanceM: 3 });
  expect(average.segments).toMatchObject([{ startHz: 1e9, stopHz: 40e9 }]);
  // 500 uV/m printed as 53.9794 dBuV/m.
  expect(average.segments[0]!.startLimit).toBeCloseTo(microvolts[0]!.rows.at(-1)!.limitDbUvPerM, 4);
  expect(peak.segments[0]!.startLimit - average.segments[0]!.startLimit).toBeCloseTo(20, 12);
  expect(average.basis).not.toBe('verified');
  expect(lines.has('fcc15109d-cb-1g-av')).toBe(false);
  expect(lines.size).toBe(published.lines.length + microvolts.length + 2 * 3);
});

test('every line stands in one set, and what a table has room for is not exceeded', () => {
  const named = limitSets.flatMap(({ lineIds }) => lineIds);
  expect(named.toSorted()).toEqual([...lines.keys()].toSorted());
  for (const line of lines.values()) {
    expect(line.key.length).toBeLessThanOrEqual(60);
    expect(line.name.length).toBeLessThanOrEqual(200);
    expect(line.document.length).toBeLessThanOrEqual(160);
    expect(line.basis.length).toBeLessThanOrEqual(80);
    expect(line.source.length).toBeLessThanOrEqual(300);
    expect(line.port.length).toBeGreaterThan(0);
  }
});

test('a set holds lines of one standard, distance and unit, each for a detector of its own, and none of two ports', () => {
  for (const set of limitSets) {
    const own = set.lineIds.map((id) => lines.get(id)!);
    const one = (of: (line: (typeof own)[number]) => unknown) => expect(new Set(own.map(of)).size).toBe(1);
    one(({ document }) => document);
    one(({ class: of }) => of);
    one(({ distanceM }) => distanceM);
    one(({ unit }) => unit);
    expect(new Set(own.map(({ detector }) => detector)).size).toBe(own.length);
    const [{ port, unit }] = own as [(typeof own)[number]];
    if (unit === 'dBpW') expect(port).toBe('disturbance power (clamp)');
    else expect(port).toBe(set.port);
  }
  expect(new Set(limitSets.map(({ name }) => name)).size).toBe(limitSets.length);
});
