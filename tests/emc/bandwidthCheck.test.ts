import receiver from '@fixtures/published/receiver.json';
import { bandwidthFinding, videoBandwidthFinding, type Filter } from '@/emc/bandwidthCheck';
import { bandParts } from '@/emc/cisprBands';
import type { Detector } from '@/emc/kinds';

const partAt = (startHz: number, stopHz: number) => bandParts(startHz, stopHz)[0]!;
const inBandC = partAt(30e6, 300e6);
const outcome = (rbwHz: number | null, rbwShape: Filter['rbwShape'] = '6 dB', shape: Filter['shape'] = null) =>
  bandwidthFinding(inBandC, { rbwHz, rbwShape, shape }).outcome;

describe('RBW against the band', () => {
  test.each(receiver.bands.rows)(
    'band $band: $bandwidth6dBHz Hz is as asked, a sixth less or more is not (CISPR 16-1-1:2019 Table 1, verified)',
    (row) => {
      const part = partAt(row.startMHz * 1e6, row.stopMHz * 1e6);
      const outcomes = [5 / 6, 0.989, 0.991, 1, 1.009, 1.011, 7 / 6].map(
        (ratio) => bandwidthFinding(part, { rbwHz: row.bandwidth6dBHz * ratio, rbwShape: null, shape: null }).outcome,
      );
      expect(outcomes).toEqual(['fails', 'fails', 'ok', 'ok', 'ok', 'fails', 'fails']);
    },
  );

  test('a Gaussian of 85 kHz at 3 dB is 120 kHz wide at 6 dB; 120 kHz at 3 dB is too wide', () => {
    expect([85e3, 100e3, 120e3].map((hz) => outcome(hz, '3 dB', 'gaussian'))).toEqual(['ok', 'fails', 'fails']);
    const { figures } = bandwidthFinding(inBandC, { rbwHz: 85e3, rbwShape: '3 dB', shape: 'gaussian' });
    expect(figures.at6DbHz).toBeCloseTo(85e3 * Math.SQRT2, 6);
    expect(figures).toMatchObject({ rbwHz: 85e3, askedHz: 120e3 });
  });

  test('another filter stated at 3 dB is unknown unless it is already too wide', () => {
    expect([85e3, 100e3, 120e3, 130e3].map((hz) => outcome(hz, '3 dB'))).toEqual([
      'unknown',
      'unknown',
      'unknown',
      'fails',
    ]);
    expect(bandwidthFinding(inBandC, { rbwHz: 100e3, rbwShape: '3 dB', shape: null })).toMatchObject({
      because: 'How wide the filter is 6 dB down is not known.',
      figures: { at6DbHz: null },
    });
  });

  test('without an RBW, and without a band, it is unknown and says why', () => {
    expect(bandwidthFinding(inBandC, { rbwHz: null, rbwShape: null, shape: null })).toMatchObject({
      outcome: 'unknown',
      because: 'The RBW is not known.',
    });
    expect(bandwidthFinding(partAt(20e9, 30e9), { rbwHz: 1e6, rbwShape: null, shape: null })).toMatchObject({
      outcome: 'unknown',
      because: 'CISPR 16-1-1 has no band here.',
      fromHz: 20e9,
      toHz: 30e9,
    });
    expect(() => outcome(0)).toThrow(new RangeError('RBW 0 Hz is not above zero.'));
  });
});

describe('VBW against the RBW', () => {
  const range = { fromHz: 30e6, toHz: 1e9 };
  const video = (vbwHz: number | null, rbwHz: number | null = 120e3, detector: Detector = 'peak') =>
    videoBandwidthFinding(range, detector, rbwHz, vbwHz);

  test('a peak needs three times the RBW (UN Regulation No. 10 Annex 7, verified)', () => {
    const { ratio } = receiver.un10ReceiverTables.rows.find((row) => row.ratio !== undefined)!;
    expect(video(360e3)).toMatchObject({ outcome: 'ok', figures: { vbwHz: 360e3, leastHz: ratio! * 120e3 }, ...range });
    expect([356e3, 357e3, 1e6].map((hz) => video(hz)!.outcome)).toEqual(['fails', 'ok', 'ok']);
  });

  test('of other detectors it is not asked', () => {
    for (const detector of ['quasi-peak', 'average', 'rms-average', 'unknown'] as const) {
      expect(video(10, 120e3, detector)).toBeNull();
    }
  });

  test('without either bandwidth it is unknown and says which', () => {
    expect(video(null)).toMatchObject({ outcome: 'unknown', because: 'The VBW is not known.' });
    expect(video(1e6, null)).toMatchObject({ outcome: 'unknown', because: 'The RBW is not known.' });
    expect(() => video(-1)).toThrow(new RangeError('VBW -1 Hz is not above zero.'));
  });
});
