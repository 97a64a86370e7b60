import conversions from '@fixtures/published/conversions.json';
import fc from 'fast-check';
import {
  dbmFromDbpw,
  dbmFromDbuvAcross,
  dbpwFromDbm,
  dbuaFromDbuv,
  dbuvFromDbmAcross,
  dbuvFromDbua,
  dbuvFromVolts,
  impedanceDbOhm,
  voltsFromDbuv,
} from '@/emc/inputLevels';
import { dbuvFromDbm } from '@/emc/units';

const constant = (name: string) => conversions.constants.rows.find((row) => row.name === name)!;
const published = (start: string) => conversions.publishedConstants.find((row) => row.fact.startsWith(start))!;

describe('voltage, current and power at an input', () => {
  test.each([50, 75])('dBm to dBuV in %d ohm (definition, computed with CODATA values)', (ohm) => {
    expect(dbuvFromDbmAcross(0, ohm)).toBeCloseTo(constant(`dBm to dBuV in ${ohm} ohm`).addDb!, 4);
  });

  test.each(conversions.powerToVoltage.rows)(
    '$powerDbm dBm in 50 ohm, back from dBuV and from V (computed table)',
    (row) => {
      expect(dbmFromDbuvAcross(row.voltageDbUv50ohm, 50)).toBeCloseTo(row.powerDbm, 4);
      expect(dbuvFromVolts(row.voltageUv / 1e6)).toBeCloseTo(row.voltageDbUv50ohm, 4);
      expect((voltsFromDbuv(dbuvFromDbmAcross(row.powerDbm, 50)) * 1e6) / row.voltageUv).toBeCloseTo(1, 6);
    },
  );

  test('50 ohm is the figure the receiver levels use', () => {
    expect(dbuvFromDbmAcross(-73, 50)).toBe(dbuvFromDbm(-73));
  });

  test('a current probe of 5 ohm stands 13.98 dB above its current (conversion note and technical tip, verified)', () => {
    expect(impedanceDbOhm(5)).toBeCloseTo(published('current probe').db!, 4);
    expect(dbuaFromDbuv(50, 5)).toBeCloseTo(50 - 13.9794, 4);
  });

  test('0 dBm is 90 dBpW (definitions)', () => {
    expect(dbpwFromDbm(0)).toBe(90);
    expect(dbmFromDbpw(45)).toBe(-45);
  });

  test('there and back is the same level in any impedance (property)', () => {
    const level = fc.double({ min: -200, max: 200, noNaN: true });
    fc.assert(
      fc.property(level, fc.double({ min: 1e-3, max: 1e6, noNaN: true }), (db, ohm) => {
        expect(dbmFromDbuvAcross(dbuvFromDbmAcross(db, ohm), ohm)).toBeCloseTo(db, 9);
        expect(dbuvFromDbua(dbuaFromDbuv(db, ohm), ohm)).toBeCloseTo(db, 9);
        // P = U·I: the level of power lies midway between those of voltage and current
        const wattsDb = dbmFromDbuvAcross(db, ohm) - 30;
        expect((db + dbuaFromDbuv(db, ohm)) / 2 - 120).toBeCloseTo(wattsDb, 9);
      }),
    );
  });

  test('an impedance of zero or less is refused, a voltage of zero has no level', () => {
    for (const ohm of [0, -50, NaN, Infinity]) {
      expect(() => dbuvFromDbmAcross(0, ohm)).toThrow(new RangeError(`Impedance ${ohm} ohm is not above zero.`));
      expect(() => dbuaFromDbuv(0, ohm)).toThrow(RangeError);
    }
    expect(dbuvFromVolts(0)).toBeNull();
  });
});
