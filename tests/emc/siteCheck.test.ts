import site from '@fixtures/published/site.json';
import { checkNsa, measuredNsa, NSA_RANGE, NSA_TOLERANCE_DB } from '@/emc/siteCheck';

const [table] = site.nsaTables.tables;
const geometry = { polarisation: 'horizontal' as const, distanceM: 3, txHeightM: 1, rxLowestM: 1, rxHighestM: 4 };
const measured = (offDb: (mhz: number) => number = () => 0) =>
  site.freqMHz.map((mhz, i) => ({ frequencyHz: mhz * 1e6, nsaDb: table!.tableDb[i]! + offDb(mhz) }));
const outcome = (offDb: number) =>
  checkNsa(
    measured(() => offDb),
    geometry,
  ).outcome;

describe('a measured table of site attenuation', () => {
  test('the criterion is 4 dB from 30 to 1000 MHz (ANSI C63.4, CISPR 16-1-4:2019 clause 6, verified)', () => {
    expect(NSA_TOLERANCE_DB).toBe(site.criterion.toleranceDb);
    expect([NSA_RANGE.fromHz, NSA_RANGE.toHz]).toEqual(site.criterion.rangeMHz.map((mhz) => mhz * 1e6));
    expect([-4.1, -3.9, 0, 3.9, 4.1].map(outcome)).toEqual(['outside', 'within', 'within', 'within', 'outside']);
  });

  test('97.0 - 77.4 - 10.6 - 10.9 dB is -1.9 dB, 0.1 dB off theory at 100 MHz (worked example, computed)', () => {
    const { row } = site.nsaWorked;
    const nsaDb = measuredNsa({
      directDbuv: row.vDirectDbUv,
      siteDbuv: row.vSiteDbUv,
      txFactorDbPerM: row.afTxDbPerM,
      rxFactorDbPerM: row.afRxDbPerM,
    });
    expect(nsaDb).toBeCloseTo(row.measuredNsaDb, 9);
    const [judged] = checkNsa([{ frequencyHz: row.freqMHz * 1e6, nsaDb }], geometry).rows;
    expect(judged!.theoreticalDb).toBeCloseTo(row.theoreticalNsaDb, 1);
    expect(judged!.deviationDb).toBeCloseTo(row.deviationDb, 0);
    expect(judged!.within).toBe(row.pass);
    // measured above theory: the site attenuates more
    expect(judged!.deviationDb).toBeGreaterThan(0);
  });

  test('one row outside is enough, and it is the worst', () => {
    const check = checkNsa(
      measured((mhz) => (mhz === 180 ? -4.2 : mhz === 300 ? 3 : 0)),
      geometry,
    );
    expect(check.outcome).toBe('outside');
    expect(check.rows.filter((row) => !row.within).map((row) => row.frequencyHz)).toEqual([180e6]);
    expect(check.worst).toMatchObject({ frequencyHz: 180e6, within: false });
    expect(check.worst!.deviationDb).toBeCloseTo(-4.2, 0);
  });

  test('a table that does not reach from 30 to 1000 MHz is incomplete, but outside stays outside', () => {
    const all = measured();
    expect(checkNsa(all.slice(1), geometry).outcome).toBe('incomplete');
    expect(checkNsa(all.slice(0, -1), geometry).outcome).toBe('incomplete');
    expect(checkNsa([], geometry)).toEqual({ outcome: 'incomplete', rows: [], worst: null });
    expect(checkNsa(measured(() => 5).slice(3), geometry).outcome).toBe('outside');
  });

  test('rows below 30 and above 1000 MHz are not judged', () => {
    const beyond = [{ frequencyHz: 20e6, nsaDb: 99 }, ...measured(), { frequencyHz: 1100e6, nsaDb: 99 }];
    const check = checkNsa(beyond, geometry);
    expect(check.outcome).toBe('within');
    expect(check.rows).toHaveLength(site.freqMHz.length);
  });

  test('a level or frequency that is none is refused', () => {
    expect(() => checkNsa([{ frequencyHz: 1e8, nsaDb: NaN }], geometry)).toThrow(
      'NaN dB at 100000000 Hz is no attenuation.',
    );
    expect(() => checkNsa([{ frequencyHz: NaN, nsaDb: 1 }], geometry)).toThrow(RangeError);
  });
});
