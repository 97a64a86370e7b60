import type { ReceiverFinding } from '@/emc/receiverFinding';
import { overloadFinding, receiverFindings, type SegmentSettings } from '@/emc/receiverSettings';

const settings = (more: Partial<SegmentSettings> = {}): SegmentSettings => ({
  startHz: 150e3,
  stopHz: 30e6,
  detector: 'peak',
  averageKind: null,
  rbwHz: 9e3,
  rbwShape: '6 dB',
  shape: 'gaussian',
  vbwHz: 30e3,
  stepHz: 4.5e3,
  dwellS: 20e-3,
  scanTimeS: 132,
  pulsePeriodS: 10e-3,
  highestInputDbuv: 80,
  greatestInputDbuv: 107,
  ...more,
});
const of = <What extends ReceiverFinding['what']>(what: What, more: Partial<SegmentSettings>, asked = 'quasi-peak') =>
  receiverFindings(settings(more), asked as 'quasi-peak').filter(
    (finding): finding is Extract<ReceiverFinding, { what: What }> => finding.what === what,
  );
const bandwidths = (more: Partial<SegmentSettings>) =>
  of('bandwidth', more).map(({ fromHz, toHz, outcome }) => [fromHz, toHz, outcome]);

describe('the settings of a swept segment', () => {
  test('a stepped peak scan of band B as CISPR asks has nothing against it', () => {
    const found = receiverFindings(settings(), 'quasi-peak');
    expect(found.map(({ what, outcome }) => [what, outcome])).toEqual([
      ['bandwidth', 'ok'],
      ['dwell', 'ok'],
      ['scan-time', 'ok'],
      ['step', 'ok'],
      ['pulse-period', 'ok'],
      ['video-bandwidth', 'ok'],
      ['detector', 'ok'],
      ['overload', 'ok'],
    ]);
    for (const { because, source } of found) {
      expect(because).toBeNull();
      expect(source).not.toBe('');
    }
  });

  test('150 kHz and 30 MHz, repeated by two segments, are judged by each in its own bandwidth', () => {
    expect(bandwidths({ startHz: 9e3, stopHz: 150e3, rbwHz: 200 })).toEqual([[9e3, 150e3, 'ok']]);
    expect(bandwidths({ startHz: 150e3, stopHz: 30e6, rbwHz: 9e3 })).toEqual([[150e3, 30e6, 'ok']]);
    expect(bandwidths({ startHz: 30e6, stopHz: 300e6, rbwHz: 120e3 })).toEqual([[30e6, 300e6, 'ok']]);
  });

  test('one bandwidth over several bands is right in one of them only', () => {
    expect(bandwidths({ startHz: 9e3, stopHz: 3e9, rbwHz: 120e3 })).toEqual([
      [9e3, 150e3, 'fails'],
      [150e3, 30e6, 'fails'],
      [30e6, 300e6, 'ok'],
      [300e6, 1e9, 'ok'],
      [1e9, 3e9, 'fails'],
    ]);
  });

  test('each band has its share of an even scan', () => {
    const shares = of('scan-time', { startHz: 30e6, stopHz: 1e9, scanTimeS: 0.97 });
    expect(shares.map(({ figures }) => figures.scanTimeS)).toEqual([expect.closeTo(0.27, 9), expect.closeTo(0.7, 9)]);
    expect(shares.map(({ outcome }) => outcome)).toEqual(['ok', 'ok']);
    const faster = of('scan-time', { startHz: 30e6, stopHz: 1e9, scanTimeS: 0.96 });
    expect(faster.map(({ outcome }) => outcome)).toEqual(['fails', 'fails']);
  });

  test('without a stated dwell it is the time within the RBW, which a sweep time and an RBW give', () => {
    const [dwell] = of('dwell', { dwellS: null, scanTimeS: 29.85 });
    expect(dwell!.figures.dwellS).toBeCloseTo(9e-3, 9);
    expect(of('pulse-period', { dwellS: null, scanTimeS: 29.85 })[0]!.outcome).toBe('fails');
    expect(of('dwell', { scanTimeS: 29.85 })[0]!.figures.dwellS).toBe(20e-3);
    for (const unknown of [{ scanTimeS: null }, { rbwHz: null }]) {
      expect(of('dwell', { dwellS: null, ...unknown })[0]).toMatchObject({ outcome: 'unknown' });
    }
  });

  test('settings that nobody has stated are unknown with a reason, never ok', () => {
    const nothing = settings({
      detector: 'unknown',
      rbwHz: null,
      rbwShape: null,
      shape: null,
      vbwHz: null,
      stepHz: null,
      dwellS: null,
      scanTimeS: null,
      pulsePeriodS: null,
      highestInputDbuv: null,
      greatestInputDbuv: null,
    });
    const found = receiverFindings(nothing, 'average');
    expect(found.map(({ what }) => what)).toEqual([
      'bandwidth',
      'dwell',
      'scan-time',
      'step',
      'pulse-period',
      'detector',
      'overload',
    ]);
    for (const { outcome, because } of found) {
      expect(outcome).toBe('unknown');
      expect(because).toMatch(/\.$/);
    }
  });

  test('the detector is held against the one the line asks for', () => {
    expect(of('detector', { detector: 'average', averageKind: 'cispr' }, 'average')[0]!.outcome).toBe('ok');
    expect(of('detector', { detector: 'average', averageKind: 'linear' }, 'average')[0]!.outcome).toBe('fails');
    expect(of('detector', { detector: 'average', averageKind: 'cispr' }, 'peak')[0]!.outcome).toBe('fails');
  });

  test('the VBW is looked at for peak alone', () => {
    expect(of('video-bandwidth', { vbwHz: 9e3 })[0]).toMatchObject({ outcome: 'fails', fromHz: 150e3, toHz: 30e6 });
    expect(of('video-bandwidth', { detector: 'quasi-peak' })).toEqual([]);
  });

  test('what is no range is refused', () => {
    expect(() => receiverFindings(settings({ stopHz: 150e3 }), 'peak')).toThrow(RangeError);
    expect(() => receiverFindings(settings({ scanTimeS: -1 }), 'peak')).toThrow(/-1 s|Scan time/);
  });
});

describe('overload of the input', () => {
  const found = (highest: number | null, greatest: number | null) =>
    overloadFinding({ fromHz: 1e6, toHz: 2e6 }, highest, greatest);
  test('a reading at or above the stated greatest level fails', () => {
    expect([106.9, 107, 120].map((level) => found(level, 107).outcome)).toEqual(['ok', 'fails', 'fails']);
    expect(found(80, 107).figures).toEqual({ highestDbuv: 80, greatestDbuv: 107 });
  });

  test('without either level it is unknown and says which', () => {
    expect(found(80, null)).toMatchObject({
      outcome: 'unknown',
      because: 'The greatest input level is not stated.',
    });
    expect(found(null, 107).because).toBe('The highest input level is not stated.');
    expect(() => found(NaN, 107)).toThrow(new RangeError('NaN dBuV is no level.'));
  });
});
