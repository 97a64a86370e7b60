import { differenceWords, formatDifference, remarkWords, tableConditions } from '@/format/revisions';

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
