import fc from 'fast-check';
import { latin1, utf16, utf8, utf8WithMark } from '@fixtures/shapes/build';
import { shifted } from '@/ingest/numbers';
import { readSweep } from '@/ingest/read';
import { recognise } from '@/ingest/recognise';
import type { Recognition } from '@/ingest/types';
import { TO_HZ } from '@/ingest/units';

/* Any table of numbers, in any supported shape, reads back exactly as the Float64 that Number() makes of its text. */

const unit = fc.constantFrom('Hz' as const, 'kHz' as const, 'MHz' as const, 'GHz' as const);
const marks = fc.constantFrom(
  [';', '.'],
  [';', ','],
  ['\t', '.'],
  ['\t', ','],
  [',', '.'],
  [' ', '.'],
  [' ', ','],
  ['|', '.'],
);
const encoders: Record<string, (text: string) => Uint8Array> = {
  utf8,
  utf8WithMark,
  latin1,
  utf16le: (text) => utf16(text, 'le', true),
  utf16be: (text) => utf16(text, 'be', true),
  utf16leUnmarked: (text) => utf16(text, 'le', false),
  utf16beUnmarked: (text) => utf16(text, 'be', false),
};
/** How a level is written: fixed decimals, shortest form, or an exponent. */
const writers: Record<string, (value: number) => string> = {
  fixed: (value) => value.toFixed(2),
  long: (value) => value.toFixed(16),
  shortest: String,
  exponent: (value) => `${value < 0 ? '' : '+'}${value.toExponential(11)}`,
};

const table = fc.record({
  points: fc.integer({ min: 12, max: 40 }),
  start: fc.constantFrom('30', '0.15', '150', '150000', '30000000', '1388.8'),
  step: fc.constantFrom('0.075', '4.5', '500', '250000', '0.000001'),
  levels: fc.array(fc.double({ min: -160, max: 160, noNaN: true }), { minLength: 120, maxLength: 120 }),
  traces: fc.integer({ min: 1, max: 3 }),
  writer: fc.constantFrom(...Object.keys(writers)),
  unit,
  marks,
  place: fc.integer({ min: 0, max: 3 }),
  headings: fc.boolean(),
  preamble: fc.integer({ min: 0, max: 3 }),
  trailing: fc.boolean(),
  encoding: fc.constantFrom(...Object.keys(encoders)),
  lineEnd: fc.constantFrom('\n', '\r\n', '\r'),
});

type Table = typeof table extends fc.Arbitrary<infer T> ? T : never;

/** Frequencies in exact decimals: start plus i steps, in millionths. */
function frequencyTexts({ start, step, points }: Table): string[] {
  const millionths = (text: string) => BigInt(Math.round(Number(text) * 1e6));
  return Array.from({ length: points }, (_, i) => {
    const sum = millionths(start) + BigInt(i) * millionths(step);
    return `${sum / 1_000_000n}.${String(sum % 1_000_000n).padStart(6, '0')}`;
  });
}

function write(t: Table) {
  const [between, decimal] = t.marks as [string, '.' | ','];
  const frequencies = frequencyTexts(t);
  const columns = Array.from({ length: t.traces }, (_, c) =>
    frequencies.map((_, i) => writers[t.writer]!(t.levels[(i * t.traces + c) % t.levels.length]!)),
  );
  const at = Math.min(t.place, t.traces);
  const place = <T>(own: T, others: T[]) => [...others.slice(0, at), own, ...others.slice(at)];
  const localised = (text: string) => (decimal === ',' ? text.replace('.', ',') : text);
  const end = t.trailing && between !== ' ' ? between : '';
  const preamble = ['Bench scan', `Detector${between}Peak`, `RBW${between}9000${between}Hz`].slice(0, t.preamble);
  const headings =
    place(
      `Frequency[${t.unit}]`,
      columns.map((_, c) => `Level${c + 1}[dBµV]`),
    ).join(between) + end;
  const rows = frequencies.map(
    (f, i) =>
      place(
        f,
        columns.map((column) => column[i]!),
      )
        .map(localised)
        .join(between) + end,
  );
  const text = [...preamble, ...(t.headings ? [headings] : []), ...rows].join(t.lineEnd) + t.lineEnd;
  return { bytes: encoders[t.encoding]!(text), frequencies, columns };
}

const answersFor = (recognition: Recognition, frequencyUnit: Table['unit']) => ({
  frequencyUnit,
  centreHz: 0,
  sweepIndex: 0,
  traces: recognition.traces.map(({ index }) => ({ index, use: true, unit: 'dBuV' as const })),
});

it('pairs and several traces: delimiter × decimal mark × unit × order × preamble × encoding × line ends', () => {
  fc.assert(
    fc.property(table, (t) => {
      const { bytes, frequencies, columns } = write(t);
      const recognition = recognise(bytes);
      expect(recognition.refusal).toBeNull();
      expect(recognition.layout).toBe('pairs');
      if (t.headings) expect(recognition.frequency.unit).toBe(t.unit);
      else expect(recognition.questions.map(({ key }) => key)).toContain('frequencyUnit');
      const read = readSweep(bytes, recognition, answersFor(recognition, t.unit));
      expect(Array.from(read.frequencyHz)).toEqual(frequencies.map((text) => shifted(text, TO_HZ[t.unit])));
      expect(read.traces).toHaveLength(columns.length);
      for (const [c, column] of columns.entries()) {
        const values = read.traces[c]!.values;
        expect(column.every((text, i) => Object.is(values[i], Number(text)))).toBe(true);
      }
    }),
    { numRuns: 400 },
  );
});

it('a level with two decimals before a frequency, parted by a space, is no grouped number', () => {
  const rows = Array.from({ length: 12 }, (_, i) => `0,00 ${(150 + i * 0.075).toFixed(6).replace('.', ',')}`);
  const recognition = recognise(utf8(`${rows.join('\n')}\n`));
  expect(recognition).toMatchObject({ delimiter: 'space', decimalMark: ',', thousandsMark: null });
});

it('thousands in groups by any gap', () => {
  const gaps = fc.constantFrom(
    ['.', ','],
    [' ', ','],
    ['\u2009', ','],
    ['\u202f', ','],
    ["'", '.'],
    ['\u2019', '.'],
    [',', '.'],
  );
  fc.assert(
    fc.property(
      gaps,
      fc.array(fc.double({ min: -160, max: 160, noNaN: true }), { minLength: 20, maxLength: 20 }),
      ([gap, mark], levels) => {
        const frequencies = levels.map((_, i) => (30_000_000 + i * 75_000.5).toFixed(1));
        const rows = levels.map((level, i) => {
          const [whole, rest] = frequencies[i]!.split('.') as [string, string];
          return `${whole.replace(/\B(?=(\d{3})+$)/g, gap!)}${mark}${rest};${level.toFixed(2).replace('.', mark!)}`;
        });
        const bytes = utf8(['Frequency [Hz];Peak [dBuV]', ...rows, ''].join('\n'));
        const recognition = recognise(bytes);
        const read = readSweep(bytes, recognition, answersFor(recognition, 'Hz'));
        expect(Array.from(read.frequencyHz)).toEqual(frequencies.map(Number));
        expect(levels.every((level, i) => Object.is(read.traces[0]!.values[i], Number(level.toFixed(2))))).toBe(true);
      },
    ),
    { numRuns: 100 },
  );
});

const level = fc.double({ min: -160, max: 160, noNaN: true });

it('time rows by frequency columns', () => {
  const shape = fc.record({
    rows: fc.integer({ min: 2, max: 6 }),
    columns: fc.integer({ min: 6, max: 60 }),
    levels: fc.array(level, { minLength: 360, maxLength: 360 }),
    between: fc.constantFrom(',', ';', '\t'),
  });
  fc.assert(
    fc.property(shape, ({ rows, columns, levels, between }) => {
      const at = (row: number, i: number) => (levels[row * columns + i]! + (i % 3)).toString();
      const heading = ['', ...Array.from({ length: columns }, (_, i) => (30 + i * 0.5).toFixed(3))].join(between);
      const body = Array.from({ length: rows }, (_, row) =>
        [`10:00:0${row}`, ...Array.from({ length: columns }, (_, i) => at(row, i))].join(between),
      );
      const bytes = utf8(['MHz', heading, ...body, ''].join('\r\n'));
      const recognition = recognise(bytes);
      expect(recognition).toMatchObject({ layout: 'time-rows', refusal: null });
      for (let row = 0; row < rows; row++) {
        const read = readSweep(bytes, recognition, { ...answersFor(recognition, 'MHz'), sweepIndex: row });
        expect(Array.from(read.frequencyHz)).toEqual(Array.from({ length: columns }, (_, i) => 30e6 + i * 5e5));
        expect(Array.from(read.traces[0]!.values)).toEqual(
          Array.from({ length: columns }, (_, i) => Number(at(row, i))),
        );
      }
    }),
    { numRuns: 100 },
  );
});

it('rows of hops with several bins each', () => {
  const shape = fc.record({
    bins: fc.integer({ min: 1, max: 8 }),
    hops: fc.integer({ min: 4, max: 20 }),
    sweeps: fc.integer({ min: 1, max: 3 }),
    repeated: fc.boolean(),
    levels: fc.array(level, { minLength: 480, maxLength: 480 }),
  });
  fc.assert(
    fc.property(shape, ({ bins, hops, sweeps, repeated, levels }) => {
      const of = (sweep: number, hop: number, bin: number) => levels[(sweep * hops + hop) * bins + bin]!.toFixed(2);
      const rows: string[] = [];
      for (let sweep = 0; sweep < sweeps; sweep++) {
        for (let hop = 0; hop < hops; hop++) {
          const values = Array.from({ length: bins }, (_, bin) => of(sweep, hop, bin));
          if (repeated) values.push(values.at(-1)!);
          const low = 80_000_000 + hop * bins * 1000;
          rows.push(['2026-11-17', `10:00:0${sweep}`, low, low + bins * 1000, '1000.00', 20, ...values].join(', '));
        }
      }
      const bytes = utf8(`${rows.join('\n')}\n`);
      const recognition = recognise(bytes);
      expect(recognition).toMatchObject({ layout: 'hop-rows', refusal: null });
      expect(recognition.sweeps).toHaveLength(sweeps);
      for (let sweep = 0; sweep < sweeps; sweep++) {
        const read = readSweep(bytes, recognition, { ...answersFor(recognition, 'Hz'), sweepIndex: sweep });
        const flat = Array.from({ length: hops * bins }, (_, i) => Number(of(sweep, Math.floor(i / bins), i % bins)));
        expect(Array.from(read.traces[0]!.values)).toEqual(flat);
        expect(Array.from(read.frequencyHz)).toEqual(flat.map((_, i) => 80_000_000 + i * 1000));
      }
    }),
    { numRuns: 100 },
  );
});
