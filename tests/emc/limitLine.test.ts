import fc from 'fast-check';
import limits from '@fixtures/published/limits.json';
import { LINE_DETECTORS, LINE_UNITS } from '@/emc/kinds';
import { limitAt, limitsInto, prepareLine, toLimitLine, toMicrovoltLine } from '@/emc/limitLine';
import { lineOf, publishedLine } from './given';

const slopes = limits.rules.find((rule) => rule.id === 'slope')!.slopeDbPerDecade!;

describe('limit lines', () => {
  test.each(limits.evaluationPoints.rows)(
    '$lineId at $freqMHz MHz is $limit $unit (its line, CISPR/FCC interpolation and band-edge rules)',
    (row) => {
      const line = publishedLine(row.lineId);
      expect(line.unit).toBe(row.unit);
      expect(limitAt(line, Math.round(row.freqMHz * 1e6))).toBeCloseTo(row.limit, 3);
    },
  );

  test.each(limits.evaluationPoints.rows.filter((row) => row.atBandEdge))(
    'the lower limit governs on the edge of $lineId at $freqMHz MHz exactly (47 CFR 15.107, 15.109(c), 15.209(b))',
    (row) => {
      const line = publishedLine(row.lineId);
      const edgeHz = row.freqMHz * 1e6;
      expect(limitAt(line, edgeHz)).toBe(row.limit);
      const beside = [limitAt(line, edgeHz - 1), limitAt(line, edgeHz + 1)].filter((limit) => limit !== null);
      expect(limitAt(line, edgeHz)).toBeLessThanOrEqual(Math.min(...beside) + 1e-4);
    },
  );

  test('a falling edge takes the limit above it as a rising one takes the limit below it (band-edge rule)', () => {
    const line = lineOf([
      [1, 2, 50, 50],
      [2, 3, 40, 40],
      [3, 4, 60, 60],
    ]);
    expect([1.5, 2, 2.5, 3, 3.5].map((megahertz) => limitAt(line, megahertz * 1e6))).toEqual([50, 40, 40, 40, 60]);
  });

  test.each([
    ['fcc15107a-qp', 0.15, 0.5, slopes['66to56over0.15to0.5MHz']],
    ['cispr14-ce-av', 0.15, 0.5, slopes['59to46over0.15to0.5MHz']],
    ['cispr11-g1a20-ce-qp', 5.000001, 30, slopes['90to73over5to30MHz']],
    ['eu-auto-bb-10m', 75, 400, slopes['34to45over75to400MHz']],
  ])('%s from %d to %d MHz slopes by %d dB per decade (47 CFR 15.107(a) footnote)', (id, fromMhz, toMhz, slope) => {
    const line = publishedLine(id);
    const rise = limitAt(line, toMhz * 1e6)! - limitAt(line, fromMhz * 1e6)!;
    expect(rise / Math.log10(toMhz / fromMhz)).toBeCloseTo(slope, 3);
  });

  test('CISPR 14-1 disturbance power rises linearly with frequency, not with its logarithm (CISPR 14-1 Table 7)', () => {
    const line = publishedLine('cispr14-power-qp');
    expect(limitAt(line, 165e6)).toBeCloseTo(50, 9);
    const log = { ...line, segments: line.segments.map((segment) => ({ ...segment, over: 'log-frequency' as const })) };
    expect(limitAt(log, 165e6)! - 50).toBeGreaterThan(2);
  });

  test('outside its segments, and in a hole between them, a line has no limit', () => {
    const line = lineOf([
      [1, 2, 50, 50],
      [3, 4, 60, 60],
    ]);
    expect([0.999999, 2.5, 4.000001].map((megahertz) => limitAt(line, megahertz * 1e6))).toEqual([null, null, null]);
    expect(limitAt(line, NaN)).toBeNull();
  });

  test('all 57 published lines become lines of a known detector and unit, one name each', () => {
    const lines = limits.lines.map(toLimitLine);
    expect(lines).toHaveLength(57);
    for (const line of lines) {
      expect(LINE_DETECTORS).toContain(line.detector);
      expect(LINE_UNITS).toContain(line.unit);
      expect(limitAt(line, line.segments[0]!.startHz)).not.toBeNull();
    }
    expect(new Set(lines.map((line) => line.name)).size).toBe(57);
    expect(publishedLine('cispr32-b-re-3m').name).toBe('CISPR 32:2012/2015 class B, enclosure, 3 m, quasi-peak');
  });

  test('every published limit stands at both ends of its segment, or a lower one where segments meet', () => {
    for (const record of limits.lines) {
      const line = toLimitLine(record);
      for (const segment of line.segments) {
        expect(limitAt(line, segment.startHz)).toBeLessThanOrEqual(segment.startLimit);
        expect(limitAt(line, segment.stopHz)).toBeLessThanOrEqual(segment.stopLimit);
        const middle = (segment.startHz + segment.stopHz) / 2;
        expect(limitAt(line, middle)).toBeGreaterThanOrEqual(Math.min(segment.startLimit, segment.stopLimit));
      }
    }
  });

  test('a shape that is not known is refused', () => {
    const record = structuredClone(limits.lines[0]!);
    record.segments[0]!.shape = 'linear';
    expect(() => toLimitLine(record)).toThrow(/shape linear is not known/);
  });

  describe.each(limits.microvoltLines)('$document stated in uV/m', (record) => {
    const line = toMicrovoltLine(record);
    test.each(record.rows)(
      `from $startMHz MHz $limitUvPerM uV/m is $limitDbUvPerM dBuV/m (${record.source})`,
      (row) => {
        expect(limitAt(line, row.startMHz * 1e6 + 1)).toBeCloseTo(row.limitDbUvPerM, 4);
      },
    );
  });

  test('88, 216 and 960 MHz take the lower limit (47 CFR 15.109(c))', () => {
    const line = toMicrovoltLine(limits.microvoltLines.find((record) => record.id === 'fcc15109a')!);
    expect([88e6, 216e6, 960e6].map((hz) => limitAt(line, hz))).toEqual(
      [100, 150, 200].map((microvolts) => 20 * Math.log10(microvolts)),
    );
    expect(limitAt(line, 1e9)).toBeCloseTo(53.9794, 4);
    expect(limitAt(line, 1e9 + 1)).toBeNull();
  });

  test('many points at once give the same bits as one at a time, in whatever order they come (property)', () => {
    const line = publishedLine('cispr11-g1a20-ce-qp');
    const megahertz = fc.oneof(
      fc.constantFrom(0.1, 0.15, 0.5, 5, 30, 31),
      fc.double({ min: 0.1, max: 31, noNaN: true }),
    );
    fc.assert(
      fc.property(fc.array(megahertz, { maxLength: 50 }), (points) => {
        const hz = Float64Array.from(points, (one) => one * 1e6);
        const limit = new Float64Array(hz.length);
        const has = new Uint8Array(hz.length);
        limitsInto(prepareLine(line), hz, hz.map(Math.log), limit, has);
        expect(Array.from(hz, (_, i) => (has[i] ? limit[i]! : null))).toEqual(
          Array.from(hz, (one) => limitAt(line, one)),
        );
      }),
    );
  });

  test.each([
    ['no segments', lineOf([])],
    ['a reversed segment', lineOf([[2, 1, 50, 50]])],
    ['a limit that is no figure', lineOf([[1, 2, NaN, 50]])],
  ])('a line with %s is refused', (_, line) => {
    expect(() => limitAt(line, 1e6)).toThrow(RangeError);
  });
});
