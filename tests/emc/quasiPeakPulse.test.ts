import receiver from '@fixtures/published/receiver.json';
import fc from 'fast-check';
import { ENVELOPE_PEAK, envelopeRate, quasiPeakDetector } from '@/emc/quasiPeakModel';
import {
  QUASI_PEAK_RECEIVERS,
  quasiPeakBelowPeakDb,
  quasiPeakOfPulsesDbuv,
  relativePulseResponseDb,
  type PulseRate,
} from '@/emc/quasiPeakPulse';

const of = (band: string) => QUASI_PEAK_RECEIVERS[band as keyof typeof QUASI_PEAK_RECEIVERS];
const rateOf = (key: string): PulseRate => (key === 'isolated' ? 'isolated' : Number(key));
const RESPONSES = receiver.qpPulseResponse.tables.flatMap(({ band, tableDb, toleranceDb, modelDb }) =>
  Object.entries(modelDb).map(([key, model]) => {
    const entry = (table: Record<string, number | undefined>) => table[key]!;
    return { band, key, rate: rateOf(key), tabulated: entry(tableDb), tolerance: entry(toleranceDb), model: model! };
  }),
);

describe('quasi-peak of pulses (CISPR 16-1-1:2019)', () => {
  test.each(receiver.quasiPeak.rows)('band $band: time constants (CISPR 16-1-1:2019, verified)', (row) => {
    expect(of(row.band).chargeS * 1e3).toBeCloseTo(row.chargeMs, 9);
    expect(of(row.band).dischargeS * 1e3).toBeCloseTo(row.dischargeMs, 9);
    expect(of(row.band).meterS * 1e3).toBeCloseTo(row.meterMs, 9);
    const bands = receiver.bands.rows.filter(({ band }) => row.band.split(' and ').includes(band));
    for (const { bandwidth6dBHz } of bands) expect(of(row.band).bandwidthHz).toBe(bandwidth6dBHz);
  });

  test.each(RESPONSES)(
    'band $band, $key: $tabulated dB within $tolerance dB (CISPR 16-1-1:2019 pulse response, from memory, confirmed by computation)',
    ({ band, rate, tabulated, tolerance, model }) => {
      const responseDb = relativePulseResponseDb(of(band), rate)!;
      expect(Math.abs(responseDb - tabulated)).toBeLessThanOrEqual(tolerance);
      // the same circuit stepped in another program
      expect(Math.abs(responseDb - model)).toBeLessThan(0.03);
    },
  );

  test('where pulses overlap there is no answer: band A at 60 and 100 Hz', () => {
    expect([60, 100].map((rate) => relativePulseResponseDb(of('A'), rate))).toEqual([null, null]);
    expect(quasiPeakOfPulsesDbuv(of('A'), 1e-6, 100)).toBeNull();
    const modelled = RESPONSES.map(({ band, key }) => `${band} ${key}`);
    const tabulated = receiver.qpPulseResponse.tables.flatMap(({ band, tableDb }) =>
      Object.keys(tableDb).map((key) => `${band} ${key}`),
    );
    expect(tabulated.filter((entry) => !modelled.includes(entry)).sort()).toEqual(['A 100', 'A 60']);
  });

  test.each(receiver.peakToQp.rows)(
    'band $band: peak stands $tablePeakMinusQpDb dB above quasi-peak at $prfHz Hz (CISPR 16-1-1:2019, from memory, confirmed by computation)',
    (row) => {
      const belowDb = quasiPeakBelowPeakDb(of(row.band), row.prfHz)!;
      expect(belowDb).toBeCloseTo(row.modelDb, 1);
      // the model lies up to 0.81 dB from the printed figure, within the receiver's 1.5 dB
      expect(Math.abs(belowDb - row.tablePeakMinusQpDb)).toBeLessThan(0.82);
    },
  );

  test.each(receiver.qpAbsolute.rows)(
    'band $band: $impulseAreaUvs uVs read as 66 dBuV within 1.5 dB (CISPR 16-1-1:2019, from memory, confirmed by computation)',
    (row) => {
      const level = quasiPeakOfPulsesDbuv(of(row.band), row.impulseAreaUvs * 1e-6, row.prfHz)!;
      expect(Math.abs(level - row.expectedDbUv)).toBeLessThan(1.5);
      expect(Math.abs(level - row.modelDbUv)).toBeLessThan(0.03);
    },
  );

  test('the filter passes pulses as 1.048 times its 6 dB bandwidth', () => {
    expect((2 * ENVELOPE_PEAK * envelopeRate(of('B'))) / of('B').bandwidthHz).toBeCloseTo(1.048, 3);
  });

  test('a steady carrier leaves the detector a little below its amplitude, more so where it charges slowly', () => {
    const kept = (['A', 'B', 'C and D'] as const).map((band) => quasiPeakDetector(of(band)).ofCarrier);
    expect(kept.every((voltage) => voltage < 1)).toBe(true);
    expect([...kept].sort()).toEqual(kept);
  });

  test('slower pulses never read higher, and quasi-peak never above peak (property, band B)', () => {
    const rate = fc.double({ min: 0.2, max: 400, noNaN: true });
    fc.assert(
      fc.property(rate, rate, (a, b) => {
        const [slow, fast] = [Math.min(a, b), Math.max(a, b)].map((hz) => quasiPeakBelowPeakDb(of('B'), hz)!);
        expect(slow!).toBeGreaterThanOrEqual(fast! - 0.01);
        expect(fast!).toBeGreaterThan(0);
      }),
      { numRuns: 20 },
    );
  });

  test('twice the area is 6.02 dB, and what is no rate or area is refused', () => {
    const at = (areaVs: number) => quasiPeakOfPulsesDbuv(of('B'), areaVs, 10)!;
    expect(at(2e-6) - at(1e-6)).toBeCloseTo(20 * Math.log10(2), 9);
    expect(() => quasiPeakBelowPeakDb(of('B'), 0)).toThrow(new RangeError('Pulse rate 0 Hz is not above zero.'));
    expect(() => at(-1)).toThrow(new RangeError('Pulse area -1 Vs is not above zero.'));
  });
});
