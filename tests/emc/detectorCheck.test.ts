import { detectorFinding } from '@/emc/detectorCheck';
import { DETECTORS, type Detector, type LineDetector } from '@/emc/kinds';
import type { AverageKind } from '@/emc/receiverFinding';

const found = (detector: Detector, asked: LineDetector, kind: AverageKind | null = null) =>
  detectorFinding({ fromHz: 1, toHz: 2 }, detector, kind, asked);
const says = (detector: Detector, asked: LineDetector, kind?: AverageKind) => {
  const { outcome, figures } = found(detector, asked, kind);
  return [outcome, figures.relation];
};

describe('detector of a reading against the line (CISPR 16-1-1: average <= quasi-peak <= peak)', () => {
  test('peak, quasi-peak and CISPR average in their order', () => {
    const read: [Detector, AverageKind?][] = [['peak'], ['quasi-peak'], ['average', 'cispr']];
    const table = read.map(([detector, kind]) =>
      (['peak', 'quasi-peak', 'average'] as const).map((asked) => says(detector, asked, kind)),
    );
    const same = ['ok', 'same'];
    const above = ['ok', 'at-or-above'];
    const below = ['fails', 'at-or-below'];
    expect(table).toEqual([
      [same, above, above],
      [below, same, above],
      [below, below, same],
    ]);
  });

  test('linear, CISPR and RMS average are three (from memory)', () => {
    expect(says('average', 'average', 'cispr')).toEqual(['ok', 'same']);
    expect(says('average', 'average', 'linear')).toEqual(['fails', 'at-or-below']);
    expect(says('rms-average', 'average')).toEqual(['fails', 'none']);
    expect(says('log-average', 'average')).toEqual(['fails', 'none']);
  });

  test('an average of a kind nobody stated is unknown against average, and below the others either way', () => {
    expect(found('average', 'average')).toMatchObject({ outcome: 'unknown', figures: { relation: null } });
    expect(found('average', 'average').because).toMatch(/linear or a CISPR average/);
    expect(says('average', 'quasi-peak')).toEqual(['fails', 'at-or-below']);
    expect(says('average', 'peak', 'linear')).toEqual(['fails', 'at-or-below']);
  });

  test('an unknown detector is unknown, and says so', () => {
    expect(found('unknown', 'peak')).toMatchObject({ outcome: 'unknown', because: 'The detector is not known.' });
    const decided = DETECTORS.filter((detector) => found(detector, 'quasi-peak').outcome !== 'unknown');
    expect(decided).toEqual(DETECTORS.filter((detector) => detector !== 'unknown'));
  });
});
