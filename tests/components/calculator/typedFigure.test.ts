import { readFigure, type Range } from '@/components/calculator/typedFigure';

test.each([
  ['3.5', 3.5],
  ['3,5', 3.5],
  ['−41,2', -41.2],
  ['-41.2', -41.2],
  ['12 934', 12934],
  ['12\u202f934,5', 12934.5],
  [' +7 ', 7],
  ['.5', 0.5],
  ['0,', 0],
  ['1e2', 100],
])('%j is %d, with a comma or a point', (text, value) => {
  expect(readFigure(text, text.includes('934') ? 'above-zero' : 'level')).toEqual({ value });
});

test.each<[string, Range, RegExp]>([
  ['1.234,5', 'level', /^1\.234,5 has more than one decimal mark/],
  ['1,234,567', 'above-zero', /more than one decimal mark/],
  ['abc', 'level', /^abc is no figure\. Type digits, such as 3,5 or 3\.5\.$/],
  ['3 dB', 'level', /is no figure/],
  ['-', 'level', /is no figure/],
  ['501', 'level', /^501 is beyond 500 dB either way/],
  ['-501', 'level', /beyond 500 dB/],
  ['0', 'above-zero', /^0 is not above zero/],
  ['-3', 'above-zero', /^-3 is below zero/],
  ['1e13', 'above-zero', /not within/],
  ['1e-13', 'above-zero', /not within/],
  ['1e400', 'above-zero', /is no figure|not within/],
  ['-1', 'not-negative', /below zero/],
  ['1', 'reflection', /reflects everything/],
  ['0.9', 'vswr', /at least 1/],
  ['1.5', 'count', /no count/],
  ['0', 'count', /no count/],
])('%j as %s is refused with the reason', (text, range, reason) => {
  const read = readFigure(text, range);
  expect('problem' in read ? read.problem : read.value).toMatch(reason);
});

test.each<[string, Range]>([
  ['0', 'not-negative'],
  ['0', 'reflection'],
  ['0.99', 'reflection'],
  ['1', 'vswr'],
  ['1', 'count'],
  ['500', 'level'],
])('%j as %s is at the edge of what may be', (text, range) => {
  expect(readFigure(text, range)).toEqual({ value: Number(text) });
});
