import { FACTOR_QUANTITIES } from '@/emc/kinds';
import {
  differenceWords,
  formatDifference,
  QUANTITY_WORDS,
  quantityUnit,
  remarkWords,
  tableConditions,
} from '@/format/revisions';

const at = (largestDb: number) => differenceWords({ largestDb, atHz: 144e6 }, 'revision 1');

test('the largest difference in words, with its side and its frequency', () => {
  expect(at(0.6)).toBe('at most 0.6 dB higher than revision 1, at 144 MHz');
  expect(at(-1.25)).toBe('at most 1.3 dB lower than revision 1, at 144 MHz');
  expect(at(0)).toBe('the same as revision 1 at every frequency that both have');
  expect(at(-0.04)).toBe('less than 0.1 dB from revision 1 everywhere');
  expect(differenceWords(null, 'revision 1')).toBe('shares no frequency with revision 1');
  expect(formatDifference(0.01)).toBe('no different');
});

test.each([
  [
    'no-factor-above',
    { fromHz: 900e6, toHz: 1e9 },
    'From now on nothing above 900 MHz has a factor; the revision before reached 1 GHz.',
  ],
  ['jump', { fromHz: 50e6, toHz: 60e6, db: -4.2 }, 'Between 50 MHz and 60 MHz the loss steps by 4.2 dB.'],
  ['negated', {}, 'No figure in the file is above zero: read as a loss and turned over, since no loss is a gain.'],
])('%s', (kind, more, sentence) => {
  expect(remarkWords({ kind, fromHz: null, toHz: null, db: null, ...more }, 'loss')).toBe(sentence);
});

test('what a table was measured for', () => {
  expect(tableConditions('horizontal', 3)).toBe('horizontal, 3 m');
  expect(tableConditions(null, null)).toBe('');
});

test('each quantity is named and stands in its own unit', () => {
  expect(FACTOR_QUANTITIES.map((one) => `${QUANTITY_WORDS[one]}, ${quantityUnit(one)}`)).toEqual([
    'antenna factor, dB/m',
    'loss, dB',
    'gain, dB',
    'AMN voltage division factor, dB',
    'AAN voltage division factor, dB',
    'transfer impedance, dBΩ',
    'magnetic antenna factor, dB(S/m)',
    'absorbing clamp factor, dB(pW/µV)',
  ]);
  expect(quantityUnit(null)).toBe('dB');
});

test.each([
  ['unit-not-stated', 'transfer impedance', 'The file states no unit; the figures are read as dBΩ.'],
  ['unit-not-stated', 'factor', 'The file states no unit; the figures are read as dB.'],
  ['negated', 'transfer impedance', 'The file gives a transfer admittance; turned over, it is the transfer impedance.'],
  [
    'negated',
    'AMN voltage division factor',
    'No figure in the file is above zero: read as an AMN voltage division factor and turned over, since no loss is a gain.',
  ],
  ['mixed-signs', 'gain', 'Some figures are above zero and some below; a gain of less than nothing is the opposite.'],
])('%s of a %s', (kind, what, sentence) => {
  expect(remarkWords({ kind, fromHz: null, toHz: null, db: null }, what)).toBe(sentence);
});
