import conversions from '@fixtures/published/conversions.json';
import { levelUnitOf } from '@/emc/correction';
import { factorUnitOf, levelUnitAfter, signOf } from '@/emc/factorQuantity';
import { FACTOR_QUANTITIES, type FactorQuantity, type LineUnit } from '@/emc/kinds';
import { hangTrace, judgeSegment } from '@/emc/segment';
import type { PathTerm } from '@/emc/types';
import { tableOf, termOf, traceOf } from './given';

const flat = (quantity: FactorQuantity, db: number): PathTerm =>
  termOf(
    tableOf(
      quantity,
      [
        [0.009, db],
        [6000, db],
      ],
      quantity,
    ),
  );

function levelOf(readingDbuv: number, terms: PathTerm[], megahertz = 1): number {
  const trace = traceOf([readingDbuv], { frequencyHz: [megahertz * 1e6] });
  return judgeSegment(hangTrace(trace, terms, []), trace.frequencyHz, trace.reading).level[0]!;
}

describe('how each quantity takes a reading in dBuV to a level (common practice, clauses from memory)', () => {
  test.each<[FactorQuantity, string, string, LineUnit, number]>([
    ['antenna-factor', 'E = V + AF (CISPR 16-1-4)', 'dB/m', 'dBuV/m', 62.5],
    ['loss', 'a limiter or a cable takes away, so its loss is added', 'dB', 'dBuV', 62.5],
    ['gain', 'a preamplifier gives, so its gain is subtracted', 'dB', 'dBuV', 37.5],
    ['amn-voltage-division', 'V at the EUT = V + VDF of the AMN (CISPR 16-1-2)', 'dB', 'dBuV', 62.5],
    ['aan-voltage-division', 'V at the EUT = V + VDF of the AAN (CISPR 16-1-2)', 'dB', 'dBuV', 62.5],
    ['transfer-impedance', 'I = V − Zt (CISPR 16-1-2)', 'dBΩ', 'dBuA', 37.5],
    ['magnetic-antenna-factor', 'H = V + AF(H) (CISPR 16-1-4)', 'dB(S/m)', 'dBuA/m', 62.5],
    ['clamp-factor', 'P = V + CF (CISPR 16-1-3)', 'dB(pW/µV)', 'dBpW', 62.5],
  ])('%s: %s', (quantity, _source, unit, levelUnit, level) => {
    expect(factorUnitOf(quantity)).toBe(unit);
    expect(levelUnitOf('dBuV', [flat(quantity, 12.5)])).toBe(levelUnit);
    expect(levelOf(50, [flat(quantity, 12.5)])).toBe(level);
  });

  test('a current probe of 5 ohm, +14 dB in dBΩ, makes 54 dBuV 40 dBuA ($source of publishedConstants)', () => {
    const row = conversions.publishedConstants.find(({ fact }) => fact.startsWith('current probe'))!;
    expect(row.fact).toContain('5 ohm is +14 dB');
    const ztDbohm = 20 * Math.log10(5);
    expect(ztDbohm).toBeCloseTo(14, 1);
    expect(levelOf(54, [flat('transfer-impedance', ztDbohm)])).toBeCloseTo(54 - ztDbohm, 10);
    // 500 uV across 5 ohm are 100 uA: definition of the transfer impedance.
    expect(levelOf(20 * Math.log10(500), [flat('transfer-impedance', ztDbohm)])).toBeCloseTo(40, 5);
  });

  test('a plane wave read by both factors of one loop: they differ by 20 log10 of 376.73 ohm, 51.52 dB (definition)', () => {
    const magnetic = levelOf(30, [flat('magnetic-antenna-factor', -17)]);
    const electric = levelOf(30, [flat('antenna-factor', -17 + 20 * Math.log10(376.730313))]);
    expect(electric - magnetic).toBeCloseTo(51.52, 2);
  });

  test('a clamp without loss, factor −17 dB, shows the power of the voltage in 50 ohm (definition)', () => {
    // 1000 uV in 50 ohm: (1e-3)²/50 = 20 nW, 43.01 dBpW.
    expect(levelOf(60, [flat('clamp-factor', -10 * Math.log10(50))])).toBeCloseTo(43.0103, 4);
  });

  test('losses and gains go along with every transducer and change no unit', () => {
    for (const quantity of FACTOR_QUANTITIES.filter((one) => levelUnitAfter(one) !== null)) {
      const terms = [flat(quantity, 3), flat('loss', 1.5), flat('gain', 20)];
      expect(levelUnitOf('dBm', terms)).toBe(levelUnitAfter(quantity));
      expect(levelOf(50, terms)).toBeCloseTo(50 + signOf(quantity) * 3 + 1.5 - 20, 12);
    }
  });

  test('two transducers at one frequency would count something twice', () => {
    expect(() => levelUnitOf('dBuV', [flat('transfer-impedance', 1), flat('antenna-factor', 1)])).toThrow(
      /Two transducers at one frequency/,
    );
    expect(() => levelUnitOf('dBuV', [flat('amn-voltage-division', 1), flat('aan-voltage-division', 1)])).toThrow(
      RangeError,
    );
    expect(() => levelUnitOf('dBuA', [flat('transfer-impedance', 14)])).toThrow(/counted twice/);
  });
});
