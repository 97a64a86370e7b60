import conversions from '@fixtures/published/conversions.json';
import receiver from '@fixtures/published/receiver.json';
import fc from 'fast-check';
import { inPhaseSumDb, powerSumDb, raisedByNoiseDb } from '@/emc/addedLevels';

describe('levels that add', () => {
  test.each(conversions.addition.rows)('$aDb and $bDb dB (definition, computed table)', (row) => {
    expect(powerSumDb([row.aDb, row.bDb])).toBeCloseTo(row.powerSumDb, 4);
    expect(inPhaseSumDb([row.aDb, row.bDb])).toBeCloseTo(row.voltageSumDb, 4);
  });

  test.each(receiver.noiseAndAmbient.computedErrors.rows)(
    'a signal $signalAboveNoiseDb dB above noise reads $readingHighByDb dB high (addition of powers, computed table)',
    (row) => {
      expect(raisedByNoiseDb(row.signalAboveNoiseDb)).toBeCloseTo(row.readingHighByDb, 4);
    },
  );

  test('a sum is never below its highest level, nor above all of them in phase (property)', () => {
    const levels = fc.array(fc.double({ min: -300, max: 300, noNaN: true }), { minLength: 1, maxLength: 12 });
    fc.assert(
      fc.property(levels, (db) => {
        expect(powerSumDb(db)).toBeGreaterThanOrEqual(Math.max(...db));
        expect(inPhaseSumDb(db)).toBeGreaterThanOrEqual(powerSumDb(db) - 1e-9);
      }),
    );
  });

  test('levels beyond what a linear sum could hold still add', () => {
    expect(powerSumDb([-5000, -5000])).toBeCloseTo(-4996.9897, 4);
    expect(powerSumDb([40])).toBe(40);
  });

  test('nothing to add and a level that is not finite are refused', () => {
    expect(() => powerSumDb([])).toThrow(RangeError);
    expect(() => inPhaseSumDb([40, NaN])).toThrow(new RangeError('NaN dB is no level.'));
  });
});
