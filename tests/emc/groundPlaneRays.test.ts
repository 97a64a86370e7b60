import site from '@fixtures/published/site.json';
import fc from 'fast-check';
import { groundPlaneRays } from '@/emc/groundPlaneRays';

describe('direct and reflected ray over a ground plane', () => {
  test.each(site.geometry.rows)(
    '$distanceM m, $txHeightM m to $rxHeightM m (image theory, computed table)',
    ({ distanceM, txHeightM, rxHeightM, ...row }) => {
      const rays = groundPlaneRays({ distanceM, txHeightM, rxHeightM });
      expect(rays.directM).toBeCloseTo(row.directM, 5);
      expect(rays.reflectedM).toBeCloseTo(row.reflectedM, 5);
      expect(rays.pathDifferenceM).toBeCloseTo(row.pathDifferenceM, 5);
      expect(rays.firstHorizontalNullHz / 1e6).toBeCloseTo(row.firstHorizontalNullMHz, 3);
      expect(rays.firstHorizontalPeakHz / 1e6).toBeCloseTo(row.firstHorizontalPeakMHz, 3);
      expect(rays.grazingAngleDeg).toBeCloseTo(row.grazingAngleDeg, 4);
      expect(rays.reflectionPointFromTxM).toBeCloseTo(row.reflectionPointFromTxM, 5);
    },
  );

  test('the difference is that of the two rays, and the same from either end (property)', () => {
    const metres = fc.double({ min: 0.1, max: 100, noNaN: true });
    fc.assert(
      fc.property(metres, metres, metres, (distanceM, txHeightM, rxHeightM) => {
        const rays = groundPlaneRays({ distanceM, txHeightM, rxHeightM });
        expect(rays.pathDifferenceM).toBeCloseTo(rays.reflectedM - rays.directM, 9);
        const back = groundPlaneRays({ distanceM, txHeightM: rxHeightM, rxHeightM: txHeightM });
        expect(back.pathDifferenceM).toBeCloseTo(rays.pathDifferenceM, 12);
        expect(back.reflectionPointFromTxM + rays.reflectionPointFromTxM).toBeCloseTo(distanceM, 9);
      }),
    );
  });

  test('a distance or height of zero or less is refused', () => {
    const of = (distanceM: number, txHeightM: number, rxHeightM: number) =>
      groundPlaneRays({ distanceM, txHeightM, rxHeightM });
    expect(() => of(0, 1, 1)).toThrow(new RangeError('Distance 0 m is not above zero.'));
    expect(() => of(3, -1, 1)).toThrow(new RangeError('Height -1 m is not above zero.'));
    expect(() => of(3, 1, NaN)).toThrow(new RangeError('Height NaN m is not above zero.'));
  });
});
