import fc from 'fast-check';
import Papa from 'papaparse';
import { frequencyListFile, type Listed } from '@/format/frequencyList';

const item = (more: Partial<Listed> = {}): Listed => ({
  number: 'T-26-014',
  reason: 'needs-final',
  status: 'waiting',
  statusReason: 'needs a final in R-26-031',
  sample: { code: 'S-047', serial: 'P2-0193' },
  state: { label: 'M2' },
  port: 'enclosure',
  position: 'horizontal',
  waitsAt: ['horizontal', 'vertical'],
  line: { detector: 'quasi-peak', bandwidthHz: 120e3, unit: 'dBuV/m' },
  kind: 'peak',
  frequencyHz: 144_018_375,
  fromHz: 144_018_375,
  toHz: 144_018_375,
  level: 46.24,
  limit: 40,
  marginDb: -6.24,
  heightM: 2.1,
  azimuthDeg: 48,
  run: { number: 'R-26-031' },
  because: null,
  ...more,
});
const parsed = (text: string) => Papa.parse<string[]>(text, { delimiter: ',', newline: '\r\n', skipEmptyLines: true });

test('one row names the columns with their units, then one row per emission', () => {
  const { text, name } = frequencyListFile([item()], 'csv');
  expect(name).toBe('frequency-list.csv');
  const { data } = parsed(text);
  expect(data).toHaveLength(2);
  expect(Object.fromEntries(data[0]!.map((column, i) => [column, data[1]![i]]))).toEqual({
    Ref: 'T-26-014',
    Sample: 'S-047',
    Serial: 'P2-0193',
    State: 'M2',
    Port: 'enclosure',
    'Measure in': 'horizontal and vertical',
    'Frequency (MHz)': '144.018375',
    'From (MHz)': '',
    'To (MHz)': '',
    Detector: 'quasi-peak',
    'RBW (kHz)': '120',
    Limit: '40.0',
    'Last level': '46.2',
    Unit: 'dBuV/m',
    'Margin (dB)': '6.2 over',
    'Worst in': 'horizontal',
    'Height (m)': '2.10',
    'Azimuth (deg)': '48',
    Reason: 'needs a final',
    Status: 'waiting',
    Why: 'needs a final in R-26-031',
    Run: 'R-26-031',
  });
});

test('a stretch of floor names its ends, and 200 Hz is 0.2 kHz', () => {
  const line = { detector: 'average', bandwidthHz: 200, unit: 'dBuV' } as const;
  const { data } = parsed(frequencyListFile([item({ kind: 'floor', fromHz: 40e6, toHz: 50.5e6, line })], 'csv').text);
  expect(data[1]!.slice(7, 11)).toEqual(['40.000000', '50.500000', 'average', '0.2']);
});

test('without a figure a cell is empty, and a negative level is a number', () => {
  const { data } = parsed(frequencyListFile([item({ heightM: null, azimuthDeg: null, level: -3.21 })], 'csv').text);
  expect([data[1]![12], data[1]![16], data[1]![17]]).toEqual(['-3.2', '', '']);
});

test.each(['=1+1', '+1', '-1', '@SUM(A1)', '\t=1', '\r=1', '  =1', '\uff1dA1'])(
  'what somebody typed as %j is text to a spreadsheet (OWASP, CSV injection)',
  (typed) => {
    const { data } = parsed(frequencyListFile([item({ statusReason: typed })], 'csv').text);
    expect(data[1]![20]).toBe(`'${typed}`);
  },
);

test('whatever is typed, a row stays a row, reads back the same, and begins no formula (RFC 4180, section 2)', () => {
  const typed = fc.oneof(
    fc.string({ unit: 'binary' }),
    fc.string({ unit: fc.constantFrom('=', '-', '"', ',', '\r', '\n', ' ', 'a') }),
  );
  fc.assert(
    fc.property(fc.array(fc.tuple(typed, typed), { maxLength: 5 }), (list) => {
      const items = list.map(([serial, statusReason]) => item({ statusReason, sample: { code: 'S-1', serial } }));
      const { text } = frequencyListFile(items, 'csv');
      const rows = readRfc4180(text);
      expect(rows).toHaveLength(items.length + 1);
      rows.slice(1).forEach((row, i) => {
        expect(row).toHaveLength(22);
        expect([row[2]!.replace(/^'/, ''), row[20]!.replace(/^'/, '')]).toEqual(
          [items[i]!.sample.serial, items[i]!.statusReason].map((one) => one.replace(/^'/, '')),
        );
        for (const cell of [row[2]!, row[20]!]) expect(cell).not.toMatch(/^\s*[=+@-]/);
      });
    }),
  );
});

/** A reader of its own, straight from the grammar of RFC 4180, so that no library's leniency is tested. */
function readRfc4180(text: string): string[][] {
  const rows: string[][] = [];
  let at = 0;
  while (at < text.length) {
    const row: string[] = [];
    for (;;) {
      const field = /^(?:"((?:[^"]|"")*)"|([^",\r\n]*))(,|\r\n)/.exec(text.slice(at));
      if (!field) throw new Error(`no field at ${at}: ${JSON.stringify(text.slice(at, at + 20))}`);
      row.push(field[1] === undefined ? field[2]! : field[1].replaceAll('""', '"'));
      at += field[0].length;
      if (field[3] === '\r\n') break;
    }
    rows.push(row);
  }
  return rows;
}

test('the plain list lines its columns up, in the trade’s units', () => {
  const { text, type } = frequencyListFile([item(), item({ number: 'T-26-002', frequencyHz: 36_006_000 })], 'txt');
  const [head, one, other, rest] = text.split('\r\n');
  expect(rest).toBe('');
  expect(type).toBe('text/plain; charset=utf-8');
  expect(head!.indexOf('Detector')).toBe(one!.indexOf('quasi-peak'));
  expect(other).toContain(' 36.006000  ');
  expect(other!.indexOf('36.006000') + 9).toBe(head!.indexOf('(MHz)') + 5);
  expect(one).toContain('dBµV/m');
});
