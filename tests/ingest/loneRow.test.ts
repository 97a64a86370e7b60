import { readSweep } from '@/ingest/read';
import { recognise } from '@/ingest/recognise';

/* A list of finals may hold one: then its headings alone say what it is. */

const file = (...lines: string[]) => new TextEncoder().encode(`${lines.join('\n')}\n`);
const HEAD = 'Frequency (MHz);Quasi-peak (dBµV);Average (dBµV);Height m;Azimuth deg;Remark';

test('one row under headings that name frequency and level with their units is read', () => {
  const bytes = file('# RBW: 120000 Hz', HEAD, '144.018;47;40.5;1.2;75;T-26-001');
  const recognition = recognise(bytes);
  expect(recognition).toMatchObject({
    kind: 'sweep',
    refusal: null,
    headerLine: 2,
    frequency: { unit: 'MHz', points: 1, firstHz: 144_018_000, lastHz: 144_018_000 },
    settings: { rbwHz: 120e3 },
    questions: [],
  });
  expect(recognition.traces.map(({ unit, detector, min }) => [unit, detector, min])).toEqual([
    ['dBuV', 'quasi-peak', 47],
    ['dBuV', 'average', 40.5],
  ]);
  const { frequencyHz, traces } = readSweep(bytes, recognition);
  expect([...frequencyHz]).toEqual([144_018_000]);
  expect(traces.map(({ values }) => [...values])).toEqual([[47], [40.5]]);
});

test('a level that is the figure of its frequency is a level, and a comma a decimal mark', () => {
  const { traces, decimalMark } = recognise(file('Frequency (MHz);Level (dBµV)', '30,5;30,5'));
  expect(decimalMark).toBe(',');
  expect(traces.map(({ min }) => min)).toEqual([30.5]);
});

test.each([
  ['no unit of the frequency', ['Frequency;Level (dBµV)', '144.018;47']],
  ['no unit of the level', ['Frequency (MHz);Level', '144.018;47']],
  ['no headings', ['144.018;47']],
  ['a cell more than headings', ['Frequency (MHz);Level (dBµV)', '144.018;47;3']],
  ['a line after the row', ['Frequency (MHz);Level (dBµV)', '144.018;47', 'end of list']],
])('with %s it is refused as before', (_, lines) => {
  expect(recognise(file(...lines)).refusal?.message).toMatch(/^No two lines hold a frequency and a level/);
});

test('several rows at one frequency are a sweep over time and stay refused', () => {
  const { kind } = recognise(file('Frequency (MHz);Level (dBµV)', '144;47', '144;48', '144;47.5'));
  expect(kind).toBe('refused');
});
