import receiver from '@fixtures/published/receiver.json';
import fc from 'fast-check';
import { CISPR_BANDS } from '@/emc/cisprBands';
import { readsLowDb, stepFinding, sweepPoints } from '@/emc/stepCheck';

const range = { fromHz: 30e6, toHz: 1e9 };
const filter = (rbwHz: number | null, rbwShape: '6 dB' | '3 dB' | null = '6 dB') => ({
  rbwHz,
  rbwShape,
  shape: null,
});

describe('step against the bandwidth', () => {
  test.each(receiver.sweepPoints.rows)('band $band: at most $maxStepHz Hz (half the RBW, common practice)', (row) => {
    const { bandwidthHz } = CISPR_BANDS.find(({ band }) => row.band.startsWith(band))!;
    const found = stepFinding(range, row.maxStepHz, filter(bandwidthHz));
    expect(found).toMatchObject({ outcome: 'ok', figures: { greatestStepHz: row.maxStepHz }, ...range });
    expect(stepFinding(range, row.maxStepHz * 1.02, filter(bandwidthHz)).outcome).toBe('fails');
  });

  test.each(receiver.sweepPoints.points.rows)(
    'band $band: $publishedPoints points (band presets, verified), which pass as half the RBW',
    (row) => {
      const bands = CISPR_BANDS.filter(({ band }) => row.band.split(' and ').includes(band));
      const [startHz, stopHz] = [bands[0]!.startHz, bands[bands.length - 1]!.stopHz];
      const points = sweepPoints(startHz, stopHz, bands[0]!.bandwidthHz);
      expect(points).toBe(row.publishedPoints);
      const stepHz = (stopHz - startHz) / (points - 1);
      expect(stepFinding(range, stepHz, filter(bands[0]!.bandwidthHz)).outcome).toBe('ok');
    },
  );

  test('a step or an RBW that is not stated is unknown, and the other figures stay', () => {
    expect(stepFinding(range, null, filter(120e3))).toMatchObject({
      outcome: 'unknown',
      because: 'The step is not known.',
      figures: { stepHz: null, greatestStepHz: 60e3, readsLowDb: null },
    });
    expect(stepFinding(range, 50e3, filter(null))).toMatchObject({
      outcome: 'unknown',
      because: 'The RBW is not known.',
      figures: { stepHz: 50e3, greatestStepHz: null, readsLowDb: null },
    });
  });

  test('what is no step, RBW or range is refused', () => {
    expect(() => stepFinding(range, 0, filter(120e3))).toThrow(new RangeError('Step 0 Hz is not above zero.'));
    expect(() => stepFinding(range, 1, filter(-1))).toThrow(new RangeError('RBW -1 Hz is not above zero.'));
    expect(() => readsLowDb(1, 0, '6 dB')).toThrow(RangeError);
    expect(() => sweepPoints(2e6, 1e6, 9e3)).toThrow(new RangeError('Span -1000000 Hz is not above zero.'));
  });
});

describe('how low a carrier between two points may read (Gaussian filter)', () => {
  test('at half the RBW 1.51 dB for a 6 dB bandwidth and 0.75 dB for a 3 dB one', () => {
    expect(readsLowDb(60e3, 120e3, '6 dB')).toBeCloseTo(1.5051, 4);
    expect(readsLowDb(60e3, 120e3, '3 dB')).toBeCloseTo(0.7526, 4);
  });

  test('it is the loss of |H| = exp(-a f^2) half a step off, for any step and bandwidth (property)', () => {
    const hertz = fc.double({ min: 1, max: 1e6, noNaN: true });
    fc.assert(
      fc.property(hertz, hertz, (stepHz, rbwHz) => {
        fc.pre(stepHz < 10 * rbwHz);
        const halfAt = (voltage: number) => -Math.log(voltage) / (rbwHz / 2) ** 2;
        const lossDb = (a: number) => -20 * Math.log10(Math.exp(-a * (stepHz / 2) ** 2));
        expect(readsLowDb(stepHz, rbwHz, '6 dB')).toBeCloseTo(lossDb(halfAt(1 / 2)), 6);
        expect(readsLowDb(stepHz, rbwHz, '3 dB')).toBeCloseTo(lossDb(halfAt(Math.SQRT1_2)), 6);
      }),
    );
  });

  test('the finding names its model; not stated counts as 6 dB, the larger loss', () => {
    expect(stepFinding(range, 60e3, filter(120e3, '3 dB')).figures).toMatchObject({
      model: 'Gaussian, 3 dB bandwidth',
      readsLowDb: readsLowDb(60e3, 120e3, '3 dB'),
    });
    expect(stepFinding(range, 60e3, filter(120e3, null)).figures).toMatchObject({
      model: 'Gaussian, 6 dB bandwidth',
      readsLowDb: readsLowDb(60e3, 120e3, '6 dB'),
    });
  });
});
