import conversions from '@fixtures/published/conversions.json';
import { LEVEL_UNITS } from '@/emc/kinds';
import {
  DBM_TO_DBUV_50_OHM,
  dbmFromMilliwatts,
  dbuvFromDbm,
  dbuvFromMicrovolts,
  isReceiverInput,
  microvoltsFromDbuv,
  toReceiverLevel,
} from '@/emc/units';

describe('levels at the receiver input (definitions of dBm and dBuV, 50 ohm)', () => {
  test('dBm to dBuV adds 106.9897 dB (definition, CODATA values)', () => {
    expect(DBM_TO_DBUV_50_OHM).toBeCloseTo(conversions.dbmToDbuv50Ohm.addDb, 4);
  });

  test.each(conversions.powerToVoltage.rows)('$powerDbm dBm in 50 ohm (definition, computed table)', (row) => {
    expect(dbuvFromDbm(row.powerDbm)).toBeCloseTo(row.voltageDbUv50ohm, 4);
    expect(toReceiverLevel(row.powerDbm, 'dBm')).toBeCloseTo(row.voltageDbUv50ohm, 4);
    expect(microvoltsFromDbuv(dbuvFromDbm(row.powerDbm)) / row.voltageUv).toBeCloseTo(1, 6);
  });

  test.each(conversions.microvoltToDb.rows)('$voltageUv uV (definition, computed table)', (row) => {
    expect(dbuvFromMicrovolts(row.voltageUv)).toBeCloseTo(row.voltageDbUv, 4);
    expect(toReceiverLevel(row.voltageUv, 'uV')).toBeCloseTo(row.voltageDbUv, 4);
    expect(toReceiverLevel(row.voltageUv / 1e3, 'mV')).toBeCloseTo(row.voltageDbUv, 4);
    expect(toReceiverLevel(row.voltageUv / 1e6, 'V')).toBeCloseTo(row.voltageDbUv, 4);
  });

  test('1 mW and 0.001 W are 0 dBm and read 106.9897 dBuV (definitions)', () => {
    expect(dbmFromMilliwatts(1)).toBe(0);
    expect(toReceiverLevel(1, 'mW')).toBeCloseTo(106.9897, 4);
    expect(toReceiverLevel(0.001, 'W')).toBeCloseTo(106.9897, 4);
    expect(toReceiverLevel(0.01, 'W')).toBeCloseTo(116.9897, 4);
  });

  test('a reading in dBuV, dBuV/m, dBuA, dBuA/m or dBpW stays the figure it is', () => {
    for (const unit of ['dBuV', 'dBuV/m', 'dBuA', 'dBuA/m', 'dBpW'] as const) {
      expect(toReceiverLevel(-12.5, unit)).toBe(-12.5);
    }
  });

  test('a relative dB, a linear zero or less and a figure that is not finite are no level', () => {
    expect(toReceiverLevel(40, 'dB')).toBeNull();
    for (const unit of ['V', 'mV', 'uV', 'W', 'mW'] as const) {
      expect(toReceiverLevel(0, unit)).toBeNull();
      expect(toReceiverLevel(-1, unit)).toBeNull();
    }
    for (const unit of LEVEL_UNITS) {
      expect(toReceiverLevel(NaN, unit)).toBeNull();
      expect(toReceiverLevel(-Infinity, unit)).toBeNull();
    }
    expect(dbuvFromMicrovolts(0)).toBeNull();
    expect(dbmFromMilliwatts(-1)).toBeNull();
  });

  test('voltage and power are read at the receiver input, field and current are not', () => {
    expect(LEVEL_UNITS.filter(isReceiverInput)).toEqual(['dBuV', 'dBm', 'V', 'mV', 'uV', 'W', 'mW']);
  });
});
