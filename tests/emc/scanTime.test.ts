import receiver from '@fixtures/published/receiver.json';
import { frequencyCount, scanSeconds } from '@/emc/scanTime';

const UNITS: Record<string, number> = { 'ms/kHz': 1e-6, 's/kHz': 1e-3, 'ms/MHz': 1e-9, 's/MHz': 1e-6 };
/** `100 ms/kHz` as seconds per hertz. */
function secondsPerHz(rate: string): number {
  const [, figure, unit] = /^(\d+) (.*)$/.exec(rate)!;
  return Number(figure) * UNITS[unit!]!;
}
const bandOf = (name: string) => {
  const bands = receiver.bands.rows.filter(({ band }) => name.split(' and ').includes(band));
  const [first, last] = [bands[0]!, bands[bands.length - 1]!];
  const hertz = (megahertz: number) => Math.round(megahertz * 1e6);
  return { startHz: hertz(first.startMHz), stopHz: hertz(last.stopMHz), bandwidthHz: first.bandwidth6dBHz };
};

describe('one scan', () => {
  const { rows } = receiver.minimumScanTimes;
  test.each(rows)('band $band at $peakRate takes $peakScanS s in peak (CISPR 16-2-1/-2-3, from memory)', (row) => {
    const time = { secondsPerHz: secondsPerHz(row.peakRate) };
    expect(scanSeconds({ ...bandOf(row.band), step: 'half the bandwidth', time })).toBeCloseTo(row.peakScanS, 9);
  });

  test.each(rows)(
    'band $band at $qpRate takes $qpScanS s, $qpScanMin min, in quasi-peak (CISPR 16-2-1/-2-3, from memory)',
    (row) => {
      const time = { secondsPerHz: secondsPerHz(row.qpRate) };
      const seconds = scanSeconds({ ...bandOf(row.band), step: 'half the bandwidth', time });
      expect(seconds).toBeCloseTo(row.qpScanS, 6);
      expect(seconds / 60).toBeCloseTo(row.qpScanMin, 4);
    },
  );

  test('1 s at every 50 kHz is the 20 s/MHz asked for from 30 to 1000 MHz (UN Regulation No. 10 Annex 7, verified)', () => {
    const row = receiver.un10ReceiverTables.rows.find(({ detector }) => detector === 'QP')!;
    const range = { startHz: 30e6, stopHz: 1e9, bandwidthHz: row.bandwidthHz! };
    const dwelt = scanSeconds({ ...range, step: { stepHz: row.stepHz! }, time: { dwellS: row.minDwellS! } });
    const rated = scanSeconds({
      ...range,
      step: { stepHz: row.stepHz! },
      time: { secondsPerHz: secondsPerHz(row.minScan!) },
    });
    // One more dwell than steps: both ends are visited.
    expect(dwelt - row.minDwellS!).toBeCloseTo(rated, 6);
  });

  test.each(receiver.sweepPoints.points.rows)(
    'band $band at half its bandwidth has the $publishedPoints frequencies of its preset, or one more (verified)',
    ({ band, publishedPoints }) => {
      const range = bandOf(band);
      const points = frequencyCount(range.startHz, range.stopHz, range.bandwidthHz / 2);
      // Two of the presets step a hair wider than half the bandwidth; here no step is wider.
      const presetStepHz = (range.stopHz - range.startHz) / (publishedPoints - 1);
      expect(points).toBe(publishedPoints + (presetStepHz > range.bandwidthHz / 2 ? 1 : 0));
      const dwelt = scanSeconds({ ...range, step: 'half the bandwidth', time: { dwellS: 0.01 } });
      expect(dwelt).toBe(points * 0.01);
    },
  );

  test('both ends are visited, and the last step may be shorter', () => {
    expect(frequencyCount(10, 20, 5)).toBe(3);
    expect(frequencyCount(10, 21, 5)).toBe(4);
    expect(frequencyCount(10, 12, 5)).toBe(2);
    expect(frequencyCount(0.1, 0.7, 0.1)).toBe(7);
  });

  test('a time for the whole scan is that time, whatever the step', () => {
    for (const stepHz of [1e3, 1e6])
      expect(scanSeconds({ ...bandOf('C'), step: { stepHz }, time: { scanS: 12.5 } })).toBe(12.5);
  });
});

test('what binary leaves of decimals is no step more', () => {
  expect((1.1 - 0.8) / 0.1).toBeGreaterThan(3);
  expect(frequencyCount(0.8, 1.1, 0.1)).toBe(4);
});

describe('what is no scan is refused by name', () => {
  const range = { ...bandOf('C'), step: { stepHz: 60e3 }, time: { scanS: 1 } };

  test('ranges, steps and bandwidths', () => {
    for (const startHz of [0, -1, NaN, 300e6])
      expect(() => scanSeconds({ ...range, startHz })).toThrow(`${startHz} to`);
    expect(() => scanSeconds({ ...range, stopHz: Infinity })).toThrow('to Infinity Hz');
    for (const wrong of [0, -1, NaN, Infinity]) {
      expect(() => scanSeconds({ ...range, step: { stepHz: wrong } })).toThrow(`step of ${wrong} Hz`);
      expect(() => scanSeconds({ ...range, bandwidthHz: wrong })).toThrow(`bandwidth of ${wrong} Hz`);
    }
  });

  test('times: a scan takes some', () => {
    for (const wrong of [0, -1, NaN, Infinity]) {
      expect(() => scanSeconds({ ...range, time: { dwellS: wrong } })).toThrow(`${wrong} s is no time (dwell)`);
      expect(() => scanSeconds({ ...range, time: { scanS: wrong } })).toThrow(`${wrong} s is no time (scan)`);
      expect(() => scanSeconds({ ...range, time: { secondsPerHz: wrong } })).toThrow(`${wrong} s is no time`);
    }
  });
});
