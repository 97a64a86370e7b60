import conversions from '@fixtures/published/conversions.json';
import fc from 'fast-check';
import {
  eirpFromErp,
  eirpFromField,
  electricFromMagnetic,
  erpFromEirp,
  erpFromField,
  fieldFromEirp,
  fieldFromErp,
  fieldFromPowerFlux,
  fluxDensityFromMagnetic,
  HALF_WAVE_DIPOLE_DBI,
  magneticFromElectric,
  powerFluxFromField,
} from '@/emc/fieldStrength';
import { dbuvFromMicrovolts } from '@/emc/units';

const constant = (name: string) => conversions.constants.rows.find((row) => row.name === name)!;
const published = (start: string) => conversions.publishedConstants.find((row) => row.fact.startsWith(start))!;

describe('field strength from radiated power and back (free space, far field)', () => {
  test('EIRP to dBuV/m at 1, 3 and 10 m (definition, computed with CODATA values)', () => {
    const at1 = constant('EIRP dBm to dBuV/m at 1 m (E = sqrt(30 P)/d)').addDb!;
    expect(fieldFromEirp(0, 1)).toBeCloseTo(at1, 4);
    expect(fieldFromEirp(0, 3)).toBeCloseTo(constant('same at 3 m').addDb!, 4);
    expect(fieldFromEirp(0, 10)).toBeCloseTo(constant('same at 10 m').addDb!, 4);
  });

  test('30 ohm for Z0/4pi reads 0.003 dB high, no more (computed)', () => {
    const exact = constant('same at 3 m with Z0/4pi instead of 30 ohm').addDb!;
    expect(fieldFromEirp(0, 3) - exact).toBeCloseTo(0.003, 3);
  });

  test.each(conversions.eirpToField.rows)('$eirpDbm dBm EIRP at $distanceM m (computed table)', (row) => {
    expect(fieldFromEirp(row.eirpDbm, row.distanceM)).toBeCloseTo(row.fieldDbUvPerM, 4);
    expect(eirpFromField(row.fieldDbUvPerM, row.distanceM)).toBeCloseTo(row.eirpDbm, 3);
  });

  test('-10 dBm EIRP is 85.2 dBuV/m at 3 m, 55 dBuV/m is -40.2 dBm (conversion page, verified)', () => {
    expect(fieldFromEirp(-10, 3)).toBeCloseTo(85.2, 1);
    expect(eirpFromField(55, 3)).toBeCloseTo(-40.2, 1);
  });

  test('500 uV/m at 3 m is -41.2 dBm EIRP, 43.5 dBuV/m is -51.7 dBm, ERP is 2.15 dB less (conversion page, verified)', () => {
    expect(eirpFromField(dbuvFromMicrovolts(500)!, 3)).toBeCloseTo(-41.2, 0);
    expect(Math.abs(eirpFromField(54, 3) + 41.2)).toBeLessThan(0.05);
    expect(Math.abs(eirpFromField(43.5, 3) + 51.7)).toBeLessThan(0.05);
    expect(erpFromEirp(0)).toBe(-2.15);
    expect(fieldFromErp(0, 3) - fieldFromEirp(0, 3)).toBeCloseTo(2.15, 12);
  });

  test("ERP's 2.15 dB is the half-wave dipole's gain as handbooks round it (computed 2.1509 dBi)", () => {
    expect(HALF_WAVE_DIPOLE_DBI).toBeCloseTo(conversions.halfWaveDipole.gainDbi, 2);
  });

  test('there and back is the same level, and ten times the distance is 20 dB (property)', () => {
    const level = fc.double({ min: -200, max: 200, noNaN: true });
    const distance = fc.double({ min: 0.1, max: 1000, noNaN: true });
    fc.assert(
      fc.property(level, distance, (db, distanceM) => {
        expect(eirpFromField(fieldFromEirp(db, distanceM), distanceM)).toBeCloseTo(db, 9);
        expect(erpFromField(fieldFromErp(db, distanceM), distanceM)).toBeCloseTo(db, 9);
        expect(eirpFromErp(erpFromEirp(db))).toBeCloseTo(db, 9);
        expect(fieldFromEirp(db, distanceM) - fieldFromEirp(db, 10 * distanceM)).toBeCloseTo(20, 9);
      }),
    );
  });

  test('a distance of zero or less is refused', () => {
    for (const distanceM of [0, -3, NaN]) {
      expect(() => fieldFromEirp(0, distanceM)).toThrow(new RangeError(`Distance ${distanceM} m is not above zero.`));
      expect(() => eirpFromField(0, distanceM)).toThrow(RangeError);
    }
  });
});

describe('electric and magnetic field of a plane wave', () => {
  test.each(conversions.electricToMagnetic.rows)('$fieldDbUvPerM dBuV/m (Z0 = 376.73 ohm, computed table)', (row) => {
    expect(magneticFromElectric(row.fieldDbUvPerM)).toBeCloseTo(row.fieldDbUaPerM, 4);
    expect(electricFromMagnetic(row.fieldDbUaPerM)).toBeCloseTo(row.fieldDbUvPerM, 4);
  });

  test('Z0 is 51.52 dB (CODATA values, computed), printed as 51.5 (conversion note, verified)', () => {
    expect(electricFromMagnetic(0)).toBeCloseTo(constant('Z0 free space').db!, 5);
    expect(Math.abs(magneticFromElectric(0) + published('dBuA/m').db!)).toBeLessThan(0.05);
  });

  test('dBpT is dBuA/m + 1.984, printed as 2 (conversion note, verified)', () => {
    expect(fluxDensityFromMagnetic(0)).toBeCloseTo(1.984, 3);
    expect(Math.abs(fluxDensityFromMagnetic(0) - published('dBpT').db!)).toBeLessThan(0.05);
  });

  test('dBuV/m is dBm/m2 + 115.8 (conversion note, verified)', () => {
    expect(Math.abs(fieldFromPowerFlux(0) - published('dBuV/m = dBm/m2').db!)).toBeLessThan(0.05);
    expect(powerFluxFromField(fieldFromPowerFlux(-31.7))).toBeCloseTo(-31.7, 12);
  });

  test('the power flux of an EIRP is P/(4 pi d^2), within the 0.003 dB of 120 pi (property)', () => {
    fc.assert(
      fc.property(fc.double({ min: 0.1, max: 1000, noNaN: true }), (distanceM) => {
        const fluxDbm = -10 * Math.log10(4 * Math.PI * distanceM ** 2);
        expect(powerFluxFromField(fieldFromEirp(0, distanceM)) - fluxDbm).toBeCloseTo(0.003, 3);
      }),
    );
  });
});
