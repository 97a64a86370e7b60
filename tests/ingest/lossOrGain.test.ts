import { utf8 } from '@fixtures/shapes/build';
import type { FactorQuantity } from '@/emc/kinds';
import { factorColumns, readFactorTable, settleFactor } from '@/ingest/factorTable';
import { factorUnitIn } from '@/ingest/factorUnits';
import { contradiction, signOf } from '@/ingest/lossOrGain';
import { recognise } from '@/ingest/recognise';

const table = (heading: string, figures: readonly number[] = [1, 2, 3]) =>
  utf8([`Frequency (MHz);${heading}`, ...figures.map((db, i) => `${(i + 1) * 10};${db}`), ''].join('\n'));
const columnOf = (heading: string, figures?: readonly number[]) => {
  const bytes = table(heading, figures);
  const recognition = recognise(bytes);
  expect(recognition).toMatchObject({ kind: 'factor-table', refusal: null });
  return factorColumns(bytes, recognition)[0]!;
};

/* Headings as certificates print them (common practice). */
describe('what a table is, by its heading and unit', () => {
  test.each<[string, FactorQuantity, string]>([
    ['AMN voltage division factor (dB)', 'amn-voltage-division', 'dB'],
    ['LISN factor [dB]', 'amn-voltage-division', 'dB'],
    ['LISN insertion loss (dB)', 'amn-voltage-division', 'dB'],
    ['ISN voltage division factor (dB)', 'aan-voltage-division', 'dB'],
    ['AAN VDF (dB)', 'aan-voltage-division', 'dB'],
    ['Transient limiter (dB)', 'loss', 'dB'],
    ['Limiter attenuation (dB)', 'loss', 'dB'],
    ['Zt (dBohm)', 'transfer-impedance', 'dBΩ'],
    ['Transfer impedance (dBΩ)', 'transfer-impedance', 'dBΩ'],
    ['Transfer impedance [dB Ohm]', 'transfer-impedance', 'dBΩ'],
    ['Transfer impedance (dB)', 'transfer-impedance', 'dB'],
    ['Magnetic antenna factor dB(S/m)', 'magnetic-antenna-factor', 'dB(S/m)'],
    ['AF magnetic [dBS/m]', 'magnetic-antenna-factor', 'dB(S/m)'],
    ['Loop factor (dB/Ωm)', 'magnetic-antenna-factor', 'dB(S/m)'],
    ['Loop factor (dB(1/Ωm))', 'magnetic-antenna-factor', 'dB(S/m)'],
    ['Loop antenna factor (dB/m)', 'antenna-factor', 'dB/m'],
    ['Clamp factor dB(pW/µV)', 'clamp-factor', 'dB(pW/µV)'],
    ['CF (dB(pW/uV))', 'clamp-factor', 'dB(pW/µV)'],
    ['Absorbing clamp factor (dB)', 'clamp-factor', 'dB'],
    ['AF (dB/m)', 'antenna-factor', 'dB/m'],
    ['Cable loss (dB)', 'loss', 'dB'],
    ['Preamplifier gain (dB)', 'gain', 'dB'],
  ])('%s: %s', (heading, quantity, unit) => {
    const column = columnOf(heading);
    expect(column).toMatchObject({ said: { quantity, negate: false }, unit });
    expect(settleFactor(column)!.valueDb).toEqual([1, 2, 3]);
  });

  test.each<[string, FactorQuantity[], RegExp]>([
    ['Voltage division factor (dB)', ['amn-voltage-division', 'aan-voltage-division'], /an AMN or to an AAN/],
    ['Magnetic antenna factor (dB/m)', ['magnetic-antenna-factor', 'antenna-factor'], /51\.5 dB more/],
    ['Loop antenna factor (dB)', ['magnetic-antenna-factor', 'antenna-factor'], /51\.5 dB more/],
    ['Absorbing clamp insertion loss (dB)', ['clamp-factor', 'loss'], /17 dB more/],
    ['Current probe factor (dB)', ['transfer-impedance', 'loss', 'gain'], /subtracted/],
  ])('%s is asked about', (heading, among, asked) => {
    const bytes = table(heading);
    const recognition = recognise(bytes);
    expect(recognition.questions).toMatchObject([{ key: 'lossOrGain', text: expect.stringMatching(asked) }]);
    expect(columnOf(heading).said).toEqual({ quantity: null, negate: false, among });
    expect(() => readFactorTable(bytes, recognition)).toThrow(/Say which before it is read/);
    for (const quantity of among) {
      expect(readFactorTable(bytes, recognition, { quantity })[0]).toMatchObject({ quantity, valueDb: [1, 2, 3] });
      expect(contradiction(columnOf(heading), quantity)).toBeNull();
    }
  });
});

describe('signs', () => {
  test('a voltage division written as a ratio below one is turned over, as a loss is', () => {
    expect(settleFactor(columnOf('AMN voltage division (dB)', [-0.1, -0.2, 0]))).toEqual({
      quantity: 'amn-voltage-division',
      negated: true,
      valueDb: [0.1, 0.2, 0],
    });
    const asked = columnOf('Voltage division factor (dB)', [-9.5, -9.6, -9.8]);
    expect(settleFactor(asked, { quantity: 'aan-voltage-division' })!.valueDb).toEqual([9.5, 9.6, 9.8]);
  });

  test('a transfer impedance, a magnetic factor and a clamp factor below zero stay as they are', () => {
    for (const heading of ['Zt (dBΩ)', 'Magnetic factor dB(S/m)', 'Clamp factor dB(pW/µV)', 'AF (dB/m)']) {
      expect(settleFactor(columnOf(heading, [-17, -16, -3]))).toMatchObject({
        negated: false,
        valueDb: [-17, -16, -3],
      });
    }
  });

  test('a transfer admittance in dBS is the transfer impedance turned over: Y = 1/Z (definition)', () => {
    const column = columnOf('Transfer admittance (dBS)', [-14, -13, -12]);
    expect(column.unit).toBe('dBΩ');
    expect(settleFactor(column)).toMatchObject({ quantity: 'transfer-impedance', valueDb: [14, 13, 12] });
  });
});

test('a stated unit and another quantity contradict each other; plain dB is what is said of it', () => {
  const said = signOf('AF', 'dB/m', [1]);
  expect(contradiction({ said, unit: 'dB/m' }, 'loss')).toBe('an antenna factor');
  expect(contradiction({ said, unit: 'dB/m' }, 'antenna-factor')).toBeNull();
  expect(contradiction({ said, unit: 'dB(S/m)' }, 'antenna-factor')).toBe('a magnetic antenna factor');
  expect(contradiction({ said, unit: 'dBΩ' }, 'gain')).toBe('a transfer impedance');
  expect(contradiction({ said, unit: 'dB(pW/µV)' }, 'loss')).toBe('a clamp factor');
  expect(contradiction({ said, unit: 'dB' }, 'clamp-factor')).toBeNull();
});

test.each([
  ['Loss (dB)', 'dB'],
  ['AF dB(1/m)', 'dB/m'],
  ['S21 dB', 'dB'],
  ['dB S21', 'dB'],
  ['Gain dB, 50 ohm', 'dB'],
  ['Peak (dBµV)', null],
  ['Level (dBpW)', null],
  ['Field (dBµA/m)', null],
])('%s is in %s', (heading, unit) => {
  expect(factorUnitIn(heading)).toBe(unit);
});
