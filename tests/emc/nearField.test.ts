import conversions from '@fixtures/published/conversions.json';
import fc from 'fast-check';
import { WAVE_IMPEDANCE, wavelengthM } from '@/emc/freeSpace';
import { largeSourceBoundaryM, smallSourceBoundaryHz, smallSourceBoundaryM } from '@/emc/nearField';

const { nearField, constants } = conversions;

describe('wavelength and the borders of the near field', () => {
  test('Z0 is 376.7303137 ohm (CODATA values, computed)', () => {
    const published = constants.rows.find((row) => row.name === 'Z0 free space')!.valueOhm!;
    expect(WAVE_IMPEDANCE).toBeCloseTo(published, 6);
  });

  test.each(nearField.rows)('$freqMHz MHz: wavelength and lambda/2pi (computed table)', (row) => {
    expect(wavelengthM(row.freqMHz * 1e6)).toBeCloseTo(row.wavelengthM, 6);
    expect(smallSourceBoundaryM(row.freqMHz * 1e6)).toBeCloseTo(row.lambdaOver2piM, 6);
  });

  test.each(nearField.frequencyWhereBoundaryEqualsDistance)(
    'lambda/2pi is $distanceM m at $freqMHz MHz (computed table)',
    (row) => {
      expect(smallSourceBoundaryHz(row.distanceM) / 1e6).toBeCloseTo(row.freqMHz, 4);
    },
  );

  test('2 D^2/lambda: a source of 1 m at 300 MHz has its far field from 2.0014 m on (free-field notes, verified form)', () => {
    expect(largeSourceBoundaryM(300e6, 1)).toBeCloseTo(2 / 0.999308, 5);
    expect(largeSourceBoundaryM(300e6, 2) / largeSourceBoundaryM(300e6, 1)).toBeCloseTo(4, 12);
    expect(largeSourceBoundaryM(600e6, 1) / largeSourceBoundaryM(300e6, 1)).toBeCloseTo(2, 12);
  });

  test('distance to frequency and back is the same distance (property)', () => {
    fc.assert(
      fc.property(fc.double({ min: 0.01, max: 1000, noNaN: true }), (distanceM) => {
        expect(smallSourceBoundaryM(smallSourceBoundaryHz(distanceM)) / distanceM).toBeCloseTo(1, 12);
      }),
    );
  });

  test('what is no frequency, distance or extent is refused by name', () => {
    for (const figure of [0, -1, NaN, Infinity]) {
      expect(() => wavelengthM(figure)).toThrow(new RangeError(`Frequency ${figure} Hz is not above zero.`));
      expect(() => smallSourceBoundaryHz(figure)).toThrow(new RangeError(`Distance ${figure} m is not above zero.`));
      expect(() => largeSourceBoundaryM(1e6, figure)).toThrow(new RangeError(`Extent ${figure} m is not above zero.`));
    }
  });
});
