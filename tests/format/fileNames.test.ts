import { formatFileName } from '@/format/fileNames';

test.each([
  ['ld40_m2_h_100.csv', 'ld40_m2_h_100.csv'],
  ['Messung µ Ω 1.csv', 'Messung µ Ω 1.csv'],
  // a right-to-left override would show this one as `sweep_exe.csv`
  ['sweep_\u202evsc.exe', 'sweep_·vsc.exe'],
  ['a\u0000b\u001b[31m.csv', 'a·b·[31m.csv'],
  ['zero\u200bwidth.csv', 'zero·width.csv'],
  ['line\u2028end.csv', 'line·end.csv'],
  ['<img src=x>.csv', '<img src=x>.csv'],
])('%j is shown as %j', (name, shown) => expect(formatFileName(name)).toBe(shown));

test('a long name is cut in its middle and keeps its end', () => {
  const shown = formatFileName(`${'long_'.repeat(60)}m2_h_100.csv`);
  expect([...shown]).toHaveLength(64);
  expect(shown).toMatch(/^long_long_.*….*m2_h_100\.csv$/);
  expect([...formatFileName('😀'.repeat(100))]).toHaveLength(64);
});
