import {
  climateText,
  photoText,
  setupsText,
  setupSummary,
  strayedText,
  supplyText,
  unsaidText,
  type SetupPartName,
} from '@/format/setup';

const ALL: SetupPartName[] = [
  'mode',
  'supply',
  'cables',
  'ancillary',
  'temperature',
  'humidity',
  'deviations',
  'stayed',
  'photograph',
];

test.each([
  [[], null],
  [['humidity'], 'Not said: relative humidity.'],
  [['temperature', 'humidity', 'photograph'], 'Not said: temperature, relative humidity and a photograph.'],
  [ALL, 'Nothing is recorded of the set-up.'],
] as [SetupPartName[], string | null][])('%j unsaid: %s', (unsaid, text) => expect(unsaidText(unsaid)).toBe(text));

test('an EUT that did not stay is one sentence, whatever was typed', () => {
  expect(strayedText(null)).toBeNull();
  expect(strayedText('restarted at 144 MHz ')).toBe('The EUT did not stay in its mode: restarted at 144 MHz.');
  expect(strayedText('It restarted.')).toBe('The EUT did not stay in its mode: It restarted.');
});

test.each([
  [
    { supplyKind: 'ac', supplyV: 230, supplyFrequencyHz: 50, supplySource: 'mains through the AMN' },
    '230 V AC, 50 Hz, mains through the AMN',
  ],
  [{ supplyKind: 'dc', supplyV: 13.5, supplyFrequencyHz: null, supplySource: 'battery' }, '13.5 V DC, battery'],
  [{ supplyKind: null, supplyV: 5, supplyFrequencyHz: null, supplySource: null }, '5 V'],
  [{ supplyKind: 'ac', supplyV: null, supplyFrequencyHz: null, supplySource: null }, 'AC'],
  [{ supplyKind: null, supplyV: null, supplyFrequencyHz: null, supplySource: null }, null],
] as [Parameters<typeof supplyText>[0], string | null][])('supply %j is %s', (supply, text) =>
  expect(supplyText(supply)).toBe(text),
);

test('temperature and humidity keep one decimal at most and a real minus', () => {
  expect(climateText({ temperatureC: -5.25, humidityPct: 45 })).toBe('−5.3 °C, 45 % relative humidity');
  expect(climateText({ temperatureC: null, humidityPct: null })).toBeNull();
});

test('the line it folds to says first that the EUT did not stay, then what nobody has said', () => {
  expect(setupSummary({ revision: 1, eutStayed: 'no', unsaid: ALL })).toBe('the EUT did not stay in its mode');
  expect(setupSummary({ revision: null, eutStayed: null, unsaid: ALL })).toBe('nothing recorded');
  expect(setupSummary({ revision: 1, eutStayed: 'yes', unsaid: ['photograph'] })).toBe('not said: a photograph');
  expect(setupSummary({ revision: 1, eutStayed: 'yes', unsaid: [] })).toBe('recorded');
});

test('a picture without a caption has a name all the same', () => {
  expect([photoText('the table'), photoText('')]).toEqual(['The table', 'Photograph of the set-up, without a caption']);
});

test('a port says of its runs what their set-ups leave unsaid, and first which EUT did not stay', () => {
  const run = (number: string, unsaid: SetupPartName[], whatHappened: string | null = null) => ({
    number,
    setup: { eutStayed: whatHappened === null ? null : ('no' as const), whatHappened, unsaid },
  });
  const runs = [run('R-1', ALL), run('R-2', ['humidity'], 'it restarted'), run('R-3', ALL), run('R-4', [])];
  expect(setupsText(runs)).toEqual([
    { text: 'R-2: The EUT did not stay in its mode: it restarted.', remark: true },
    { text: 'Set-up of R-1 and R-3: nothing is recorded.', remark: false },
    { text: 'Set-up of R-2: not said: relative humidity.', remark: false },
  ]);
});
