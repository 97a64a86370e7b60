import radiation from '@fixtures/published/radiation.json';
import fc from 'fast-check';
import {
  halfWaveCurrentAt,
  halfWaveField,
  halfWaveFieldPerAmpere,
  shortCableCurrentAt,
  shortCableField,
  shortFormExcessDb,
  uniformCurrentFieldPerAmpere,
  type CablePlace,
} from '@/emc/cableRadiation';
import { nearFieldReason, SPEED_OF_LIGHT, WAVE_IMPEDANCE, wavelengthM } from '@/emc/freeSpace';

const { hertzianDipole, halfWaveDipole, commonMode, necChecks } = radiation;
const doubled = (freqMHz: number, lengthM: number, distanceM: number): CablePlace => ({
  form: 'ground-plane-doubled',
  frequencyHz: freqMHz * 1e6,
  lengthM,
  distanceM,
});
const dbuv = (voltsPerMetre: number) => 20 * Math.log10(voltsPerMetre * 1e6);

describe('field of a common-mode current on a cable', () => {
  test('the free-space constant is 6.283185e-7 (Hertzian dipole, computed)', () => {
    const place = { form: 'free-space', frequencyHz: 1, lengthM: 1, distanceM: 1 } as const;
    expect(uniformCurrentFieldPerAmpere(place) / hertzianDipole.constantComputed).toBeCloseTo(1, 6);
  });

  test.each(commonMode.rows)(
    '$currentUa uA on $lengthM m at $freqMHz MHz is $fieldUvPerM uV/m at $distanceM m, doubled (Electromagnetic Compatibility Engineering, from memory, confirmed by computation)',
    (row) => {
      const place = doubled(row.freqMHz, row.lengthM, row.distanceM);
      const field = uniformCurrentFieldPerAmpere(place) * row.currentUa * 1e-6;
      expect(field * 1e6).toBeCloseTo(row.fieldUvPerM, 2);
      expect(dbuv(field)).toBeCloseTo(row.fieldDbUvPerM, 3);
    },
  );

  test.each(commonMode.maxCurrentRows.rows)(
    '$limit: $maxCurrentUa uA at $freqMHz MHz just makes $limitUvPerM uV/m at $distanceM m (computed)',
    (row) => {
      const place = doubled(row.freqMHz, row.lengthM, row.distanceM);
      expect((row.limitUvPerM / uniformCurrentFieldPerAmpere(place)).toFixed(3)).toBe(row.maxCurrentUa.toFixed(3));
      const { currentA, because } = shortCableCurrentAt(place, row.limitUvPerM * 1e-6);
      // 1 m is a quarter of a wavelength at 74.9 MHz: the tabulated figure at 88 MHz is outside the form.
      if (row.freqMHz === 88) expect({ currentA, because }).toEqual({ currentA: null, because: expect.any(String) });
      else expect(currentA! * 1e6).toBeCloseTo(row.maxCurrentUa, 3);
    },
  );

  test('5 uA for class B at 3 m and 15 uA for class A at 10 m round the allowed current at 50 MHz and 1 m (published currents, verified)', () => {
    const { classAUa, classBUa } = commonMode.publishedCurrents;
    const allowed = (limitUv: number, distanceM: number, lengthM: number) =>
      shortCableCurrentAt(doubled(50, lengthM, distanceM), limitUv * 1e-6).currentA! * 1e6;
    expect(Math.abs(allowed(100, 3, 1) - classBUa)).toBeLessThan(0.5);
    expect(Math.abs(allowed(90, 10, 1) - classAUa)).toBeLessThan(1);
    expect(allowed(100, 3, 0.5) / allowed(100, 3, 1)).toBeCloseTo(2, 12);
  });

  test('a short monopole on perfect ground by method of moments (computed) lies within 0.5 % of the doubled form', () => {
    const monopole = necChecks.rows[1]!;
    // The printed current moment stands for current times length.
    const field = uniformCurrentFieldPerAmpere(doubled(50, 1, 10)) * monopole.currentMomentAm!;
    expect(field / monopole.formulaFieldVPerM!).toBeCloseTo(1, 4);
    expect(monopole.necFieldVPerM! / field - 1).toBeCloseTo(monopole.relativeError!, 4);
  });

  test('a short dipole in free space by method of moments (computed) lies within 0.5 % of the free-space form', () => {
    const dipole = necChecks.rows[0]!;
    const place = { ...doubled(50, 1, 10), form: 'free-space' as const };
    const field = uniformCurrentFieldPerAmpere(place) * dipole.currentMomentAm!;
    expect(field / dipole.formulaFieldVPerM!).toBeCloseTo(1, 4);
    expect(dipole.necFieldVPerM! / field - 1).toBeCloseTo(dipole.relativeError!, 4);
  });

  test('current and field are each other’s inverse, 20 dB per decade of frequency, 6.02 dB between the forms (property)', () => {
    const place = fc.record({
      form: fc.constantFrom('free-space' as const, 'ground-plane-doubled' as const),
      frequencyHz: fc.double({ min: 30e6, max: 300e6, noNaN: true }),
      lengthM: fc.double({ min: 0.01, max: 0.24, noNaN: true }),
      distanceM: fc.double({ min: 3, max: 30, noNaN: true }),
    });
    fc.assert(
      fc.property(place, fc.double({ min: 1e-6, max: 1e-2, noNaN: true }), (at, limit) => {
        const { currentA } = shortCableCurrentAt(at, limit);
        expect(shortCableField(at, currentA!).fieldVPerM! / limit).toBeCloseTo(1, 12);
        const half = halfWaveCurrentAt(at, limit);
        expect(halfWaveField(at, half.currentA!).fieldVPerM! / limit).toBeCloseTo(1, 12);
        const field = uniformCurrentFieldPerAmpere(at);
        expect(uniformCurrentFieldPerAmpere({ ...at, frequencyHz: at.frequencyHz * 10 }) / field).toBeCloseTo(10, 9);
        expect(uniformCurrentFieldPerAmpere({ ...at, lengthM: at.lengthM * 2 }) / field).toBeCloseTo(2, 9);
        expect(uniformCurrentFieldPerAmpere({ ...at, distanceM: at.distanceM * 2 }) / field).toBeCloseTo(0.5, 9);
        const [single, double] = (['free-space', 'ground-plane-doubled'] as const).map((form) => ({ ...at, form }));
        expect(uniformCurrentFieldPerAmpere(double!) / uniformCurrentFieldPerAmpere(single!)).toBeCloseTo(2, 12);
        expect(halfWaveFieldPerAmpere(double!) / halfWaveFieldPerAmpere(single!)).toBeCloseTo(2, 12);
      }),
    );
  });
});

describe('where the short form holds', () => {
  const atQuarter = wavelengthM(75e6) / 4;

  test('to a quarter of a wavelength, not beyond (Electromagnetic Compatibility Engineering, from memory)', () => {
    expect(shortCableField(doubled(75, atQuarter, 3), 5e-6).fieldVPerM).toBeGreaterThan(0);
    const beyond = shortCableField(doubled(75, atQuarter * 1.0001, 3), 5e-6);
    expect(beyond.fieldVPerM).toBeNull();
    expect(beyond.because).toContain('more than a quarter of a wavelength at 75000000 Hz');
  });

  test('from a wavelength over 2π on, not nearer (standard antenna theory texts)', () => {
    const boundaryM = (SPEED_OF_LIGHT / (2 * Math.PI * 10e6)) * (1 + 1e-12);
    const edge = { ...doubled(10, 1, 1), distanceM: boundaryM };
    expect(nearFieldReason(10e6, boundaryM)).toBeNull();
    expect(shortCableField(edge, 1e-6).because).toBeNull();
    const nearer = { ...edge, distanceM: boundaryM * 0.9999 };
    expect(shortCableField(nearer, 1e-6)).toEqual({ fieldVPerM: null, because: expect.stringContaining('nearer') });
    expect(shortCableCurrentAt(nearer, 1e-6).currentA).toBeNull();
    expect(halfWaveField(nearer, 1e-6).fieldVPerM).toBeNull();
    expect(halfWaveCurrentAt(nearer, 1e-6).currentA).toBeNull();
  });

  test('impossible input is refused by name', () => {
    expect(() => shortCableField(doubled(50, 1, 3), -1e-6)).toThrow('Current -0.000001 A');
    expect(() => shortCableField(doubled(50, 1, 3), NaN)).toThrow(RangeError);
    expect(() => shortCableField(doubled(0, 1, 3), 1)).toThrow('Frequency 0 Hz');
    expect(() => shortCableField(doubled(50, 0, 3), 1)).toThrow('Length 0 m');
    expect(() => shortCableField(doubled(50, 1, Infinity), 1)).toThrow('Distance Infinity m');
    expect(() => halfWaveField(doubled(-50, 1, 3), 1)).toThrow('Frequency -50000000 Hz');
    expect(() => shortCableCurrentAt(doubled(50, 1, 3), 0)).toThrow('Limit 0 V/m');
    expect(shortCableField(doubled(50, 1, 3), 0)).toEqual({ fieldVPerM: 0, because: null });
  });
});

describe('a half wave of cable', () => {
  test.each(halfWaveDipole.rows)(
    'E = 60 I/r agrees with E = 7.01 sqrt(P)/r at $distanceM m through 73.13 ohm (half-wave dipole, computed)',
    (row) => {
      const place = { form: 'free-space', frequencyHz: 300e6, distanceM: row.distanceM } as const;
      // The radiation resistance follows from the printed constants: (60 / 7.01624)².
      const currentA = Math.sqrt(row.powerW / (WAVE_IMPEDANCE / (2 * Math.PI) / halfWaveDipole.constantComputed) ** 2);
      const { fieldVPerM } = halfWaveField(place, currentA);
      if (row.fieldVPerM) expect(fieldVPerM).toBeCloseTo(row.fieldVPerM, 4);
      if (row.fieldDbUvPerM) expect(dbuv(fieldVPerM!)).toBeCloseTo(row.fieldDbUvPerM, 3);
      if (row.fieldUvPerM) expect(fieldVPerM! * 1e6).toBeCloseTo(row.fieldUvPerM, 3);
    },
  );

  test('one ampere makes 60 V/m at 1 m in free space (60 I/r, standard antenna theory texts)', () => {
    const place = { form: 'free-space', frequencyHz: 300e6, distanceM: 1 } as const;
    expect(halfWaveFieldPerAmpere(place)).toBeCloseTo(60, 1);
  });

  test('the short form is 6.02 dB too high where the current is a triangle: 80 against 20 pi² ohm (hertzianDipole, computed)', () => {
    expect(shortFormExcessDb(1e6, 1e-3)).toBeCloseTo(10 * Math.log10(80 / 20), 6);
  });

  test('at half a wave the short form is 20 log10(pi/2) = 3.92 dB above 60 I/r (computed from both published forms)', () => {
    const half = wavelengthM(150e6) / 2;
    const place = doubled(150, half, 3);
    const ratio = uniformCurrentFieldPerAmpere(place) / halfWaveFieldPerAmpere(place);
    expect(20 * Math.log10(ratio)).toBeCloseTo(3.92, 2);
    expect(shortFormExcessDb(150e6, half)).toBeCloseTo(20 * Math.log10(ratio), 9);
    expect(shortFormExcessDb(150e6, half * 1.0001)).toBeNull();
  });

  test('in between it is what summing a sinusoidal current piece by piece gives (property)', () => {
    fc.assert(
      fc.property(fc.double({ min: 0.01, max: 0.5, noNaN: true }), (wavelengths) => {
        const pieces = 2_000;
        let mean = 0;
        for (let i = 0; i < pieces; i++) {
          const fromEnd = Math.PI * wavelengths * (1 - Math.abs((2 * i + 1) / pieces - 1));
          mean += Math.sin(fromEnd) / Math.sin(Math.PI * wavelengths) / pieces;
        }
        expect(shortFormExcessDb(300e6, wavelengths * wavelengthM(300e6))).toBeCloseTo(-20 * Math.log10(mean), 4);
      }),
      { numRuns: 30 },
    );
  });
});
