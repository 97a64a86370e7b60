import fc from 'fast-check';
import { bringIn, clampSpan, padded, panBy, pinch, zoomAt } from '@/components/charts/viewport';

const WHOLE = { fromHz: 30e6, toHz: 1e9 };
const shareOf = (span: typeof WHOLE, hz: number) => Math.log(hz / span.fromHz) / Math.log(span.toHz / span.fromHz);

describe('what a chart shows', () => {
  test('zooming keeps the frequency under the cursor where it is', () => {
    const closer = zoomAt(WHOLE, WHOLE, 144e6, 3);
    expect(shareOf(closer, 144e6)).toBeCloseTo(shareOf(WHOLE, 144e6), 9);
    expect(Math.log(closer.toHz / closer.fromHz)).toBeCloseTo(Math.log(1000 / 30) / 3, 9);
  });

  test('zooming out ends at the whole range', () => {
    expect(zoomAt({ fromHz: 100e6, toHz: 200e6 }, WHOLE, 150e6, 1e-3)).toEqual(WHOLE);
  });

  test('a pan keeps the width in log f and stops at the ends', () => {
    const moved = panBy({ fromHz: 100e6, toHz: 200e6 }, WHOLE, 0.5);
    expect(moved.toHz / moved.fromHz).toBeCloseTo(2, 9);
    expect(moved.fromHz / 1e6).toBeCloseTo(100 * Math.SQRT2, 6);
    expect(panBy({ fromHz: 100e6, toHz: 200e6 }, WHOLE, 50).toHz).toBeCloseTo(1e9, 3);
    expect(panBy(WHOLE, WHOLE, 0.3)).toEqual(WHOLE);
  });

  test('two fingers keep their frequencies', () => {
    const span = pinch(WHOLE, [100e6, 200e6], [0.2, 0.8]);
    expect(shareOf(span, 100e6)).toBeCloseTo(0.2, 6);
    expect(shareOf(span, 200e6)).toBeCloseTo(0.8, 6);
  });

  test('a candidate outside is brought to the middle, one inside moves nothing', () => {
    const span = { fromHz: 100e6, toHz: 200e6 };
    expect(bringIn(span, WHOLE, 150e6)).toBe(span);
    expect(shareOf(bringIn(span, WHOLE, 400e6), 400e6)).toBeCloseTo(0.5, 6);
  });

  test('property: whatever is asked, the span lies inside the whole range and has a width', () => {
    const hz = fc.double({ min: 1e3, max: 1e11, noNaN: true });
    fc.assert(
      fc.property(hz, hz, (a, b) => {
        const span = clampSpan({ fromHz: Math.min(a, b), toHz: Math.max(a, b) }, WHOLE);
        expect(span.fromHz).toBeGreaterThanOrEqual(WHOLE.fromHz);
        expect(span.toHz).toBeLessThanOrEqual(WHOLE.toHz);
        expect(span.toHz).toBeGreaterThan(span.fromHz);
        const wanted = padded(span, WHOLE);
        expect(wanted.fromHz).toBeLessThanOrEqual(span.fromHz);
        expect(wanted.toHz).toBeGreaterThanOrEqual(span.toHz);
      }),
    );
  });
});
