import radiation from '@fixtures/published/radiation.json';
import fc from 'fast-check';
import { wavelengthM } from '@/emc/freeSpace';
import { loopFieldPerAmpere, smallLoopCurrentAt, smallLoopField, type LoopPlace } from '@/emc/loopRadiation';

const { differentialMode, necChecks } = radiation;
const square = (form: LoopPlace['form'], frequencyHz: number, areaM2: number, distanceM: number): LoopPlace => ({
  form,
  frequencyHz,
  areaM2,
  perimeterM: 4 * Math.sqrt(areaM2),
  distanceM,
});
const dbuv = (voltsPerMetre: number) => 20 * Math.log10(voltsPerMetre * 1e6);

describe('field of a small loop', () => {
  test('the free-space constant is 1.316858e-14 (Z0·pi/c², confirmed by computation)', () => {
    const place = { form: 'free-space', frequencyHz: 1, areaM2: 1, distanceM: 1 } as const;
    expect(loopFieldPerAmpere(place) / differentialMode.constantComputed).toBeCloseTo(1, 6);
  });

  test.each(differentialMode.rows)(
    '$currentMa mA round $loopAreaCm2 cm² at $freqMHz MHz, $distanceM m (Electromagnetic Compatibility Engineering, from memory, confirmed by computation)',
    (row) => {
      const field = (form: LoopPlace['form']) =>
        smallLoopField(square(form, row.freqMHz * 1e6, row.loopAreaCm2 * 1e-4, row.distanceM), row.currentMa * 1e-3)
          .fieldVPerM!;
      expect(field('free-space') * 1e6).toBeCloseTo(row.freeSpaceUvPerM, 3);
      expect(field('ground-plane-doubled') * 1e6).toBeCloseTo(row.groundPlaneDoubledUvPerM, 3);
      expect(dbuv(field('free-space'))).toBeCloseTo(row.freeSpaceDbUvPerM, 2);
      expect(dbuv(field('ground-plane-doubled'))).toBeCloseTo(row.doubledDbUvPerM, 2);
    },
  );

  test('a square loop by method of moments (computed) lies within 0.1 % of the form', () => {
    const loop = necChecks.rows[2]!;
    const { fieldVPerM } = smallLoopField(square('free-space', 30e6, 25e-4, 3), loop.meanCurrentA!);
    // The figure was made with the constant printed to five digits.
    expect(fieldVPerM! / loop.formulaFieldVPerM!).toBeCloseTo(1, 4);
    expect(loop.necFieldVPerM! / fieldVPerM! - 1).toBeCloseTo(loop.relativeError!, 4);
  });

  test('40 dB per decade of frequency, 6.0206 dB per doubling of area or current (published scaling, computed)', () => {
    const base = square('free-space', 10e6, 1e-4, 10);
    const level = (place: LoopPlace, currentA: number) => dbuv(smallLoopField(place, currentA).fieldVPerM!);
    const { scaling } = differentialMode;
    const from = level(base, 0.01);
    expect(level({ ...base, frequencyHz: 100e6 }, 0.01) - from).toBeCloseTo(scaling['db per decade of frequency'], 9);
    expect(level({ ...base, areaM2: 2e-4, perimeterM: 0.06 }, 0.01) - from).toBeCloseTo(
      scaling['per doubling of area'],
      4,
    );
    expect(level(base, 0.02) - from).toBeCloseTo(scaling['per doubling of current'], 4);
    expect(level({ ...base, distanceM: 100 }, 0.01) - from).toBeCloseTo(-20, 9);
  });

  test('current and field are each other’s inverse (property)', () => {
    fc.assert(
      fc.property(
        fc.double({ min: 30e6, max: 1e9, noNaN: true }),
        fc.double({ min: 1e-6, max: 1e-2, noNaN: true }),
        (frequencyHz, limit) => {
          const place = square('ground-plane-doubled', frequencyHz, 1e-4, 3);
          const { currentA } = smallLoopCurrentAt(place, limit);
          expect(smallLoopField(place, currentA!).fieldVPerM! / limit).toBeCloseTo(1, 12);
        },
      ),
    );
  });
});

describe('where the small-loop form holds', () => {
  test('to a perimeter of a quarter of a wavelength (from memory) and from λ/2π on', () => {
    const perimeterM = wavelengthM(300e6) / 4;
    const loop: LoopPlace = { form: 'free-space', frequencyHz: 300e6, areaM2: 1e-3, perimeterM, distanceM: 3 };
    expect(smallLoopField(loop, 1e-3).because).toBeNull();
    const larger = { ...loop, perimeterM: perimeterM * (1 + 1e-9) };
    expect(smallLoopField(larger, 1e-3)).toEqual({ fieldVPerM: null, because: expect.stringContaining('not small') });
    expect(smallLoopCurrentAt(larger, 1e-3)).toMatchObject({ currentA: null });
    const near = { ...loop, distanceM: 0.159 };
    expect(smallLoopField(near, 1e-3)).toEqual({ fieldVPerM: null, because: expect.stringContaining('nearer') });
    expect(smallLoopField({ ...loop, distanceM: 0.16 }, 1e-3).because).toBeNull();
  });

  test('at that perimeter a circle’s true field is within 0.1 dB of the form (uniform current summed round it)', () => {
    const k = 2 * Math.PI;
    const radius = 1 / 4 / k;
    // Far field in the plane of the loop: the sum of cos φ·exp(j k a cos φ), of which only the sine part is left.
    let summed = 0;
    const pieces = 3_600;
    for (let i = 0; i < pieces; i++) {
      const phi = (k * (i + 0.5)) / pieces;
      summed += (Math.cos(phi) * Math.sin(k * radius * Math.cos(phi)) * radius * k) / pieces;
    }
    const small = k * Math.PI * radius ** 2;
    expect(Math.abs(20 * Math.log10(summed / small))).toBeLessThan(0.1);
  });

  test('a perimeter shorter than the circle’s, and what is not above zero, are refused by name', () => {
    const loop = square('free-space', 30e6, 1e-4, 3);
    expect(() => smallLoopField({ ...loop, perimeterM: 0.035 }, 1)).toThrow('No loop of 0.0001 m²');
    expect(smallLoopField({ ...loop, perimeterM: 0.0355 }, 1).because).toBeNull();
    expect(() => smallLoopField({ ...loop, areaM2: 0 }, 1)).toThrow('Area 0 m²');
    expect(() => smallLoopField(loop, -1)).toThrow('Current -1 A');
    expect(() => smallLoopCurrentAt(loop, NaN)).toThrow('Limit NaN V/m');
    expect(() => smallLoopField({ ...loop, frequencyHz: 0 }, 1)).toThrow('Frequency 0 Hz');
  });
});
