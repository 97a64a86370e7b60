import receiver from '@fixtures/published/receiver.json';
import { bandParts, CISPR_BANDS, type CisprBand } from '@/emc/cisprBands';
import { dwellFinding, dwellOfSweepS, pulsePeriodFinding, scanTimeFinding } from '@/emc/timeCheck';

const partOf = (band: CisprBand) => ({ band, fromHz: band.startHz, toHz: band.stopHz });
const bandOf = (name: string) => partOf(CISPR_BANDS.find(({ band }) => name.startsWith(band))!);
const noBand = bandParts(20e9, 30e9)[0]!;

describe('time at one frequency', () => {
  test.each(receiver.minimumMeasurementTimes.rows)(
    'band $band: $minMs ms in peak is enough, less is not (CISPR 16-2-1 and 16-2-3, from memory)',
    ({ band, minMs }) => {
      const found = (ms: number) => dwellFinding(bandOf(band), 'peak', ms / 1e3);
      expect(found(minMs)).toMatchObject({ outcome: 'ok', figures: { dwellS: minMs / 1e3 } });
      expect(found(minMs * 0.99).outcome).toBe('fails');
      expect(found(minMs).figures.leastS! * 1e3).toBeCloseTo(minMs, 12);
    },
  );

  test('quasi-peak needs 1 s in any band (user manual and UN Regulation No. 10 Annex 7, verified)', () => {
    const { minDwellS } = receiver.qpDwell;
    const row = receiver.un10ReceiverTables.rows.find(({ detector }) => detector === 'QP')!;
    expect(row.minDwellS).toBe(minDwellS);
    for (const band of CISPR_BANDS.map(partOf)) {
      expect(dwellFinding(band, 'quasi-peak', 0.999)).toMatchObject({
        outcome: 'fails',
        figures: { leastS: minDwellS },
      });
      expect(dwellFinding(band, 'quasi-peak', minDwellS).outcome).toBe('ok');
    }
  });

  test('what is not stated and what no table asks is unknown, each with its reason', () => {
    expect(dwellFinding(bandOf('B'), 'peak', null)).toMatchObject({
      outcome: 'unknown',
      because: 'The dwell time is not stated.',
      figures: { dwellS: null, leastS: 0.5e-3 },
    });
    expect(dwellFinding(noBand, 'peak', 1)).toMatchObject({ outcome: 'unknown', figures: { leastS: null } });
    expect(() => dwellFinding(noBand, 'peak', 0)).toThrow(new RangeError('Dwell 0 s is not above zero.'));
  });
});

describe('scan time', () => {
  test.each(receiver.minimumScanTimes.rows)(
    'band $band: $peakScanS s in peak and $qpScanS s in quasi-peak (CISPR 16-2-1 and 16-2-3, from memory, confirmed by computation)',
    (row) => {
      const parts = CISPR_BANDS.filter(({ band }) => row.band.split(' and ').includes(band)).map(partOf);
      for (const [detector, scanS] of [
        ['peak', row.peakScanS],
        ['quasi-peak', row.qpScanS],
      ] as const) {
        const least = parts.map((part) => scanTimeFinding(part, detector, 1).figures.leastS!);
        expect(least.reduce((a, b) => a + b)).toBeCloseTo(scanS, 6);
        parts.forEach((part, i) => {
          expect(scanTimeFinding(part, detector, least[i]!).outcome).toBe('ok');
          expect(scanTimeFinding(part, detector, least[i]! * 0.999).outcome).toBe('fails');
        });
      }
    },
  );

  test('part of a band needs its part of the time', () => {
    const part = bandParts(150e3, 1.15e6)[0]!;
    expect(scanTimeFinding(part, 'peak', 1).figures.leastS).toBeCloseTo(0.1, 12);
    expect(scanTimeFinding(part, 'quasi-peak', 1).figures.leastS).toBeCloseTo(200, 9);
  });

  test('averages, band E and no band have no rate: unknown', () => {
    for (const found of [
      scanTimeFinding(bandOf('B'), 'average', 100),
      scanTimeFinding(bandOf('E'), 'peak', 100),
      scanTimeFinding(noBand, 'peak', 100),
    ]) {
      expect(found).toMatchObject({
        outcome: 'unknown',
        because: 'The table of least scan times has no rate for this band and detector.',
        figures: { scanTimeS: 100, leastS: null },
      });
    }
    expect(scanTimeFinding(bandOf('B'), 'peak', null)).toMatchObject({
      outcome: 'unknown',
      because: 'The scan time is not stated.',
    });
  });
});

describe('time against the pulse period (common practice)', () => {
  const range = { fromHz: 150e3, toHz: 30e6 };
  test('a dwell of one period is enough, a shorter one is not', () => {
    expect(pulsePeriodFinding(range, 0.02, 0.02)).toMatchObject({ outcome: 'ok', ...range });
    expect(pulsePeriodFinding(range, 0.0199, 0.02).outcome).toBe('fails');
  });

  test('it is unknown while the period or the dwell is not stated', () => {
    expect(pulsePeriodFinding(range, 0.02, null).because).toBe('The period of the pulses is not stated.');
    expect(pulsePeriodFinding(range, null, 0.02).because).toBe('The dwell time is not stated.');
    expect(() => pulsePeriodFinding(range, 0.02, -1)).toThrow(new RangeError('Pulse period -1 s is not above zero.'));
  });

  test('a sweep of 9.7 s over 970 MHz stays 1.2 ms within 120 kHz', () => {
    expect(dwellOfSweepS(9.7, 970e6, 120e3)).toBeCloseTo(1.2e-3, 12);
  });
});
