import receiver from '@fixtures/published/receiver.json';
import fc from 'fast-check';
import { bandParts, bandsAt, CISPR_BANDS } from '@/emc/cisprBands';

const bandOf = (name: string) => CISPR_BANDS.filter(({ band }) => name.split(' and ').includes(band));
const named = (hz: number) => bandsAt(hz).map(({ band }) => band);
const cut = (startHz: number, stopHz: number) =>
  bandParts(startHz, stopHz).map(({ band, fromHz, toHz }) => [band?.band ?? null, fromHz, toHz]);

describe('CISPR bands', () => {
  test.each(receiver.bands.rows)('band $band with its bandwidth (CISPR 16-1-1:2019 Table 1, verified)', (row) => {
    const [band] = bandOf(row.band);
    expect(band).toMatchObject({ startHz: row.startMHz * 1e6, stopHz: row.stopMHz * 1e6 });
    expect(band!.bandwidthHz).toBe(row.bandwidth6dBHz);
  });

  test.each(receiver.minimumMeasurementTimes.rows)(
    'band $band: at least $minMs ms at one frequency (CISPR 16-2-1 and 16-2-3, from memory)',
    (row) => {
      for (const band of bandOf(row.band)) expect(band.leastDwellS * 1e3).toBeCloseTo(row.minMs, 12);
    },
  );

  test.each(receiver.minimumScanTimes.rows)(
    'band $band: least scan times in peak and quasi-peak (CISPR 16-2-1 and 16-2-3, from memory, confirmed by computation)',
    (row) => {
      const bands = bandOf(row.band);
      const seconds = (detector: 'peak' | 'quasi-peak') =>
        bands.reduce((sum, band) => sum + band.leastScanSPerHz![detector] * (band.stopHz - band.startHz), 0);
      expect(seconds('peak')).toBeCloseTo(row.peakScanS, 9);
      expect(seconds('quasi-peak')).toBeCloseTo(row.qpScanS, 6);
      expect(seconds('quasi-peak') / 60).toBeCloseTo(row.qpScanMin, 4);
    },
  );

  test('the bandwidth changes at 150 kHz, 30 MHz and 1 GHz, where two bands meet', () => {
    expect([149e3, 150e3, 151e3].map(named)).toEqual([['A'], ['A', 'B'], ['B']]);
    expect([30e6, 300e6, 1e9].map(named)).toEqual([
      ['B', 'C'],
      ['C', 'D'],
      ['D', 'E'],
    ]);
    expect([8e3, 9e3, 18e9, 19e9].map(named)).toEqual([[], ['A'], ['E'], []]);
  });

  test('a segment that ends at an edge stays in its own band', () => {
    expect(cut(9e3, 150e3)).toEqual([['A', 9e3, 150e3]]);
    expect(cut(150e3, 30e6)).toEqual([['B', 150e3, 30e6]]);
    expect(cut(30e6, 1e9)).toEqual([
      ['C', 30e6, 300e6],
      ['D', 300e6, 1e9],
    ]);
  });

  test('below 9 kHz and above 18 GHz there is no band', () => {
    expect(cut(1e3, 10e3)).toEqual([
      [null, 1e3, 9e3],
      ['A', 9e3, 10e3],
    ]);
    expect(cut(17e9, 40e9)).toEqual([
      ['E', 17e9, 18e9],
      [null, 18e9, 40e9],
    ]);
    expect(cut(1, 2)).toEqual([[null, 1, 2]]);
  });

  test('the parts of a segment are all of it, in order and in different bands (property)', () => {
    const hertz = fc.double({ min: 1, max: 40e9, noNaN: true });
    fc.assert(
      fc.property(hertz, hertz, (a, b) => {
        fc.pre(Math.abs(a - b) > 1e-6 * Math.max(a, b));
        const parts = bandParts(Math.min(a, b), Math.max(a, b));
        expect(parts[0]!.fromHz / Math.min(a, b)).toBeCloseTo(1, 6);
        expect(parts[parts.length - 1]!.toHz / Math.max(a, b)).toBeCloseTo(1, 6);
        parts.slice(1).forEach((part, i) => expect(part.fromHz / parts[i]!.toHz).toBeCloseTo(1, 6));
        for (const { band, fromHz, toHz } of parts) {
          if (band) expect(band.startHz <= fromHz && toHz <= band.stopHz).toBe(true);
        }
      }),
    );
  });

  test('what is no range is refused', () => {
    for (const [startHz, stopHz] of [
      [0, 1e6],
      [1e6, 1e6],
      [2e6, 1e6],
      [1e6, Infinity],
      [NaN, 1e6],
    ] as const) {
      expect(() => bandParts(startHz, stopHz)).toThrow(new RangeError(`${startHz} to ${stopHz} Hz is no range.`));
    }
  });
});
