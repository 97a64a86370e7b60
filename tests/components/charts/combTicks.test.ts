import { combTicks, combToleranceHz, harmonicOf } from '@/components/charts/combTicks';
import { parseFrequency } from '@/components/charts/parseFrequency';

const SPAN = { fromHz: 30e6, toHz: 1e9 };
const x = (hz: number) => 46 + (Math.log(hz / 30e6) / Math.log(1000 / 30)) * 934;
const STEP_HZ = 75e3;
/** Demo emissions of a 12 MHz clock, worst first; 151.400 MHz belongs to something else. */
const EMISSIONS_HZ = [144.018, 156.02, 36.006, 84.015, 168.022, 151.4, 216.028, 60.012, 48.01].map((mhz) => mhz * 1e6);

describe('harmonics of a clock', () => {
  test('144.018 MHz is the 12th of 12 MHz, 151.400 MHz is none', () => {
    expect(harmonicOf(144.018e6, 12e6, combToleranceHz(144.018e6, STEP_HZ))).toBe(12);
    expect(harmonicOf(151.4e6, 12e6, combToleranceHz(151.4e6, STEP_HZ))).toBeNull();
    expect(harmonicOf(5e6, 12e6, combToleranceHz(5e6, STEP_HZ))).toBeNull();
  });

  test('being near a harmonic says nothing where the harmonics are as dense as the tolerance', () => {
    expect(harmonicOf(800e6, 100e3, combToleranceHz(800e6, STEP_HZ))).toBeNull();
  });

  test('every harmonic in the span has a tick; those with a candidate are marked', () => {
    const ticks = combTicks(12e6, SPAN, x, EMISSIONS_HZ, STEP_HZ);
    expect(ticks[0]!.n).toBe(3);
    expect(ticks.at(-1)!.n).toBe(83);
    expect(ticks.filter(({ near }) => near).map(({ n }) => n)).toEqual([3, 4, 5, 7, 12, 13, 14, 18]);
  });

  test('numbers closer than 16 px are left out, the worst candidate keeps its own (DESIGN section 8)', () => {
    const narrow = (hz: number) => (Math.log(hz / 30e6) / Math.log(1000 / 30)) * 334;
    const ticks = combTicks(12e6, SPAN, narrow, EMISSIONS_HZ, STEP_HZ).filter(({ numbered }) => numbered);
    for (let i = 1; i < ticks.length; i++) expect(ticks[i]!.x - ticks[i - 1]!.x).toBeGreaterThanOrEqual(16);
    expect(ticks.map(({ n }) => n)).toContain(12);
    expect(ticks.map(({ n }) => n)).not.toContain(13);
  });

  test('a low clock over a wide span costs no more ticks than pixels, and keeps those with a candidate', () => {
    const ticks = combTicks(
      65e3,
      { fromHz: 150e3, toHz: 1e9 },
      (hz) => (Math.log(hz / 150e3) / Math.log(1e9 / 150e3)) * 934,
      [65e3 * 9],
      4500,
    );
    expect(ticks.length).toBeLessThan(934);
    expect(ticks.find(({ n }) => n === 9)!.near).toBe(true);
  });

  test('no clock, no ticks', () => {
    expect(combTicks(0, SPAN, x, [], null)).toEqual([]);
    expect(combTicks(NaN, SPAN, x, [], null)).toEqual([]);
  });
});

describe('a frequency as it is typed', () => {
  test.each([
    ['12', 12e6],
    ['12.000 MHz', 12e6],
    ['24,576', 24.576e6],
    ['65 kHz', 65e3],
    ['65khz', 65e3],
    ['1.5 GHz', 1.5e9],
    [' 50 Hz ', 50],
    ['.5', 5e5],
  ])('%s', (text, hz) => expect(parseFrequency(text)).toBeCloseTo(hz, 6));

  test.each(['', 'clock', '12 dB', '-12', '0', '12.3.4', '1e3'])('%p is none', (text) => {
    expect(parseFrequency(text)).toBeNull();
  });
});
