import site from '@fixtures/published/site.json';
import fc from 'fast-check';
import { POSITIONS_CM, SITE_VSWR_DB, SITE_VSWR_RANGE, siteVswr, vswrDb, type PositionReading } from '@/emc/siteVswr';

const { siteVswr: published } = site;
const readings = (levels: number[], frequencyHz = 2e9): PositionReading[] =>
  levels.map((levelDbuv, i) => ({ positionCm: POSITIONS_CM[i]!, frequencyHz, levelDbuv }));

describe('site VSWR', () => {
  test('6 dB, a ratio of 2, over six positions from 1 to 18 GHz (CISPR 16-1-4, from memory)', () => {
    expect(SITE_VSWR_DB).toBe(published.maxDb);
    expect(vswrDb(published.maxRatio)).toBeCloseTo(published.maxDb, 1);
    expect(POSITIONS_CM).toEqual(published.positionsPerLocationCm);
    expect([SITE_VSWR_RANGE.fromHz, SITE_VSWR_RANGE.toHz]).toEqual(published.rangeMHz.map((mhz) => mhz * 1e6));
  });

  test('48.2 and 43.1 dBuV are 5.1 dB (computed example)', () => {
    const { maxDbUv, minDbUv, siteVswrDb } = published.check;
    const [found] = siteVswr(readings([45, maxDbUv, 46, 44, minDbUv, 47]));
    expect(found).toMatchObject({ frequencyHz: 2e9, highestAtCm: 2, lowestAtCm: 30, missingCm: [], outcome: 'ok' });
    expect(found!.vswrDb).toBeCloseTo(siteVswrDb, 9);
  });

  test('6 dB is enough, more is not', () => {
    const outcome = (spread: number) => siteVswr(readings([40, 40, 40, 40, 40, 40 + spread]))[0]!.outcome;
    expect([6, 6.01].map(outcome)).toEqual(['ok', 'fails']);
  });

  test('with a position missing it is unknown, unless what is there already fails', () => {
    const [few] = siteVswr(readings([40, 41, 42]));
    expect(few).toMatchObject({ outcome: 'unknown', missingCm: [18, 30, 40], vswrDb: 2 });
    expect(siteVswr(readings([40, 47]))[0]).toMatchObject({ outcome: 'fails', missingCm: [10, 18, 30, 40] });
  });

  test('each frequency stands alone, in ascending order, whatever the order of the readings (property)', () => {
    const level = fc.double({ min: 0, max: 100, noNaN: true });
    const six = fc.array(level, { minLength: 6, maxLength: 6 });
    fc.assert(
      fc.property(six, six, fc.integer(), (low, high, seed) => {
        const all = [...readings(high, 6e9), ...readings(low, 1e9)];
        const shuffled = all.map((r, i) => [Math.sin(seed + i), r] as const).sort(([a], [b]) => a - b);
        const found = siteVswr(shuffled.map(([, reading]) => reading));
        expect(found.map(({ frequencyHz }) => frequencyHz)).toEqual([1e9, 6e9]);
        expect(found[0]!.vswrDb).toBe(Math.max(...low) - Math.min(...low));
        expect(found[1]!.vswrDb).toBe(Math.max(...high) - Math.min(...high));
      }),
    );
  });

  test('no readings give no result; levels, frequencies and ratios that are none are refused', () => {
    expect(siteVswr([])).toEqual([]);
    expect(() => siteVswr(readings([NaN]))).toThrow('NaN dBuV at 2000000000 Hz is no level.');
    expect(() => siteVswr(readings([40], 0.9e9))).toThrow('Site VSWR has no criterion at 900000000 Hz.');
    expect(() => siteVswr(readings([40], 19e9))).toThrow(RangeError);
    expect(() => siteVswr([...readings([40]), ...readings([41])])).toThrow('0 cm has two readings at 2000000000 Hz.');
    expect(() => vswrDb(0.9)).toThrow(RangeError);
  });
});
