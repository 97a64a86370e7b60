import receiver from '@fixtures/published/receiver.json';
import { detectorOrder, provesOver, provesUnder, readAsAsked } from '@/emc/detectors';
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

  test('the order has no place for detectors that prove nothing', () => {
    expect(DETECTORS.filter((detector) => detectorOrder(detector) !== null)).toEqual(['peak', 'quasi-peak', 'average']);
  });
});
