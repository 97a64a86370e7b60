import uncertainties from '@fixtures/published/uncertainty.json';
import fc from 'fast-check';
import { expandedAt, expandedInto, prepareUncertainty } from '@/emc/uncertainty';

const of2011 = (measurement: string) =>
  uncertainties.ucispr.rows.find((row) => row.measurement === measurement)!.ucisprDb2011;

/** CISPR 16-4-2:2011 Table 1, mains port with an AMN. */
const mains = [
  { startHz: 9e3, stopHz: 150e3, expandedDb: of2011('AMN, mains port, 9-150 kHz') },
  { startHz: 150e3, stopHz: 30e6, expandedDb: of2011('AMN, mains port, 150 kHz-30 MHz') },
];

describe('expanded uncertainty as steps over frequency', () => {
  test.each([
    [100e3, 3.8],
    [1e6, 3.4],
    [9e3, 3.8],
    [30e6, 3.4],
  ])('mains port at %d Hz is %d dB (CISPR 16-4-2:2011 Table 1)', (hz, expected) => {
    expect(expandedAt(mains, hz)).toBe(expected);
  });

  test('at 150 kHz, shared by two steps, the larger governs, whichever comes first', () => {
    expect(expandedAt(mains, 150e3)).toBe(3.8);
    expect(expandedAt([...mains].reverse(), 150e3)).toBe(3.8);
    expect(
      expandedAt(
        [
          { startHz: 1, stopHz: 2, expandedDb: 1 },
          { startHz: 2, stopHz: 3, expandedDb: 5 },
        ],
        2,
      ),
    ).toBe(5);
  });

  test('outside every step, and without any, it is not known', () => {
    expect(expandedAt(mains, 8_999)).toBeNull();
    expect(expandedAt(mains, 30e6 + 1)).toBeNull();
    expect(expandedAt([], 1e6)).toBeNull();
  });

  test('zero is a figure; less than zero, NaN and an empty range are refused', () => {
    expect(expandedAt([{ startHz: 1, stopHz: 2, expandedDb: 0 }], 1.5)).toBe(0);
    for (const expandedDb of [-0.1, NaN, Infinity]) {
      expect(() => expandedAt([{ startHz: 1, stopHz: 2, expandedDb }], 1.5)).toThrow(RangeError);
    }
    expect(() => expandedAt([{ startHz: 2, stopHz: 2, expandedDb: 1 }], 2)).toThrow(RangeError);
  });

  test('many points at once give what one at a time gives, in whatever order they come (property)', () => {
    const hertz = fc.oneof(
      fc.constantFrom(8e3, 9e3, 150e3, 30e6, 31e6),
      fc.double({ min: 8e3, max: 31e6, noNaN: true }),
    );
    fc.assert(
      fc.property(fc.array(hertz, { maxLength: 40 }), (points) => {
        const hz = Float64Array.from(points);
        const expanded = new Float64Array(hz.length);
        const has = new Uint8Array(hz.length);
        expandedInto(prepareUncertainty(mains), hz, expanded, has);
        expect(points.map((_, i) => (has[i] ? expanded[i]! : null))).toEqual(
          points.map((one) => expandedAt(mains, one)),
        );
      }),
    );
  });
});
