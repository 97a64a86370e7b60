import receiver from '@fixtures/published/receiver.json';
import {
  detectorOrder,
  GAUSSIAN_6DB_PER_3DB,
  provesOver,
  provesUnder,
  readAsAsked,
  widestAt6DbHz,
} from '@/emc/detectors';
import { DETECTORS, LINE_DETECTORS, type Detector, type LineDetector } from '@/emc/kinds';

/** CISPR 16-1-1: peak >= quasi-peak >= average for one signal in one bandwidth. Rows read, columns asked. */
const SHOWS: Record<Detector, Record<LineDetector, 'under' | 'over' | 'both' | 'nothing'>> = {
  peak: { peak: 'both', 'quasi-peak': 'under', average: 'under' },
  'quasi-peak': { peak: 'over', 'quasi-peak': 'both', average: 'under' },
  average: { peak: 'over', 'quasi-peak': 'over', average: 'both' },
  'rms-average': { peak: 'nothing', 'quasi-peak': 'nothing', average: 'nothing' },
  'log-average': { peak: 'nothing', 'quasi-peak': 'nothing', average: 'nothing' },
  sample: { peak: 'nothing', 'quasi-peak': 'nothing', average: 'nothing' },
  'negative-peak': { peak: 'nothing', 'quasi-peak': 'nothing', average: 'nothing' },
  unknown: { peak: 'nothing', 'quasi-peak': 'nothing', average: 'nothing' },
};
const EVERY = DETECTORS.flatMap((read) => LINE_DETECTORS.map((asked) => [read, asked, SHOWS[read][asked]] as const));

describe('what a detector can show (CISPR 16-1-1 detector definitions: average <= quasi-peak <= peak)', () => {
  test.each(EVERY)('%s against a limit in %s in the same bandwidth shows %s', (detector, asked, shows) => {
    const trace = { detector, rbwHz: 120e3 };
    const line = { detector: asked, bandwidthHz: 120e3 };
    expect(provesUnder(trace, line)).toBe(shows === 'under' || shows === 'both');
    expect(provesOver(trace, line)).toBe(shows === 'over' || shows === 'both');
    expect(readAsAsked(trace, line)).toBe(detector === asked);
  });

  test.each(receiver.bands.rows)(
    'band $band: narrower than $bandwidth6dBHz Hz cannot show under, wider cannot show over (CISPR 16-1-1)',
    (band) => {
      const asked = band.bandwidth6dBHz;
      const line = { detector: 'quasi-peak' as const, bandwidthHz: asked };
      const shows = (rbwHz: number | null) => {
        const trace = { detector: 'quasi-peak' as const, rbwHz };
        return [provesUnder(trace, line), provesOver(trace, line), readAsAsked(trace, line)];
      };
      expect(shows(asked)).toEqual([true, true, true]);
      expect(shows(asked * 0.83)).toEqual([false, true, false]);
      expect(shows(asked * 1.2)).toEqual([true, false, false]);
      expect(shows(null)).toEqual([false, false, false]);
    },
  );

  test('bandwidths within 1 % of one another count as equal, beyond they do not', () => {
    const line = { detector: 'peak' as const, bandwidthHz: 120e3 };
    const shows = (rbwHz: number) => readAsAsked({ detector: 'peak', rbwHz }, line);
    expect([118.7e3, 118.81e3, 121.19e3, 121.3e3].map(shows)).toEqual([false, true, true, false]);
  });

  test('a VBW narrower than the RBW makes peak and quasi-peak a video average that shows nothing', () => {
    const line = { detector: 'quasi-peak' as const, bandwidthHz: 120e3 };
    const shows = (detector: Detector, vbwHz: number | null | undefined) => {
      const trace = { detector, rbwHz: 120e3, vbwHz };
      return [provesUnder(trace, line), provesOver(trace, line), readAsAsked(trace, line)];
    };
    for (const vbwHz of [undefined, null, 119e3, 120e3, 3e6]) {
      expect(shows('peak', vbwHz)).toEqual([true, false, false]);
      expect(shows('quasi-peak', vbwHz)).toEqual([true, true, true]);
    }
    expect(shows('peak', 100)).toEqual([false, false, false]);
    expect(shows('quasi-peak', 100e3)).toEqual([false, false, false]);
    // Averaging is what an average is for.
    expect(shows('average', 100)).toEqual([false, true, false]);
  });

  test('a filter stated at 3 dB is wider 6 dB down: 1.41 times where it is Gaussian', () => {
    const line = { detector: 'peak' as const, bandwidthHz: 120e3 };
    const shows = (rbwHz: number, rbwShape: '3 dB' | '6 dB' | null) => {
      const trace = { detector: 'peak' as const, rbwHz, rbwShape };
      return [provesUnder(trace, line), provesOver(trace, line), readAsAsked(trace, line)];
    };
    expect(shows(120e3, '6 dB')).toEqual([true, true, true]);
    expect(shows(120e3, null)).toEqual([true, true, true]);
    expect(shows(120e3, '3 dB')).toEqual([true, false, false]);
    expect(shows(300e3, '3 dB')).toEqual([true, false, false]);
    // At least 100 kHz and, as a Gaussian, 141 kHz wide 6 dB down: neither is certain.
    expect(shows(100e3, '3 dB')).toEqual([false, false, false]);
    expect(shows(85e3, '3 dB')).toEqual([false, true, false]);
    // |H|² = exp(−ln 2 · (2f / B3)²) is 10^−0.3 at B3 / 2; at B3 · √2 / 2 it is a quarter, 6.02 dB down.
    const downDb = (f: number) => -10 * Math.log10(Math.exp(-Math.LN2 * (2 * f) ** 2));
    expect(downDb(GAUSSIAN_6DB_PER_3DB / 2) / downDb(1 / 2)).toBeCloseTo(2, 12);
    expect(widestAt6DbHz({ detector: 'peak', rbwHz: null, rbwShape: '3 dB' })).toBeNull();
  });

  test('the order has no place for detectors that prove nothing', () => {
    expect(DETECTORS.filter((detector) => detectorOrder(detector) !== null)).toEqual(['peak', 'quasi-peak', 'average']);
  });
});
