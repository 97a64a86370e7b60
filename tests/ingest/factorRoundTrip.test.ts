import { existsSync, readdirSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import fc from 'fast-check';
import * as demo from '@fixtures/demo/tables';
import type { DemoTable } from '@fixtures/demo/types';
import { latin1, utf16, utf8, utf8WithMark } from '@fixtures/shapes/build';
import { FACTOR_QUANTITIES, type FactorQuantity } from '@/emc/kinds';
import { factorColumns, readFactorTable, settleFactor, type ReadFactorTable } from '@/ingest/factorTable';
import { IngestError } from '@/ingest/ingestError';
import { recognise } from '@/ingest/recognise';
import { factorTableText, type WrittenFactorTable } from '@/ingest/tableText';
import { shifted } from '@/ingest/numbers';
import { TO_HZ, type FrequencyUnit } from '@/ingest/units';

/* What is downloaded of a table can be uploaded again and is the same, bit for bit. */

const read = (bytes: Uint8Array, quantity?: FactorQuantity): ReadFactorTable[] =>
  readFactorTable(bytes, recognise(bytes), quantity && { quantity });
const about = { name: 'ANT-02 vertical, table 4', polarisation: 'vertical', distanceM: 3, source: 'certificate 12' };

const quantity = fc.constantFrom(...FACTOR_QUANTITIES);
/** Losses, gains and voltage divisions as an upload can enter them hold positive figures; any other quantity either. */
const isPositive = (of: FactorQuantity) => of === 'loss' || of === 'gain' || of.endsWith('voltage-division');
const rows = (of: FactorQuantity) =>
  fc
    .uniqueArray(
      fc.oneof(fc.integer({ min: 9_000, max: 40_000_000_000 }), fc.double({ min: 9e3, max: 4e10, noNaN: true })),
      {
        minLength: 2,
        maxLength: 40,
      },
    )
    .chain((hz) =>
      fc
        .array(fc.double({ min: isPositive(of) ? 1e-9 : -30, max: 80, noNaN: true }), {
          minLength: hz.length,
          maxLength: hz.length,
        })
        .map((db) => ({ frequencyHz: hz.sort((a, b) => a - b), valueDb: db.map((value) => value + 0) })),
    );
const anyTable = quantity.chain((of) =>
  fc
    .record({
      name: fc.string({ unit: 'binary', maxLength: 60 }),
      source: fc.string({ unit: 'binary', maxLength: 60 }),
      polarisation: fc.constantFrom(null, 'horizontal', 'vertical'),
      distanceM: fc.constantFrom(null, 3, 10, 0.8),
      numbers: rows(of),
    })
    .map(({ numbers, ...described }): WrittenFactorTable => ({ ...described, ...numbers, quantity: of })),
);

test('a table of any quantity, rows and words is the same when it is uploaded again (property)', () => {
  fc.assert(
    fc.property(anyTable, (table) => {
      const [again, ...more] = read(utf8(factorTableText(table)));
      expect(more).toEqual([]);
      expect(again).toMatchObject({ quantity: table.quantity });
      expect(again!.frequencyHz).toEqual(table.frequencyHz);
      expect(again!.valueDb).toEqual(table.valueDb);
    }),
    { numRuns: 400 },
  );
});

const demoTables = (Object.values(demo) as unknown[])
  .filter((value): value is DemoTable[] => Array.isArray(value))
  .flat();
test.each(demoTables.map((table) => [table.name, table] as const))('the demo lab’s %s', (_name, table) => {
  const frequencyHz = table.rows.map(([hz]) => hz);
  const valueDb = table.rows.map(([, db]) => db);
  const of = table.quantity;
  const [again] = read(utf8(factorTableText({ ...about, ...table, quantity: of, frequencyHz, valueDb })));
  expect(again).toMatchObject({ quantity: of, frequencyHz, valueDb });
});

const encoders = { utf8, latin1, utf8WithMark, utf16: (text: string) => utf16(text, 'le', true) };
test('written with any delimiter, decimal mark, frequency unit, encoding and line end, it reads the same numbers (property)', () => {
  const style = fc.record({
    marks: fc.constantFrom([';', ','], [';', '.'], ['\t', ','], ['\t', '.'], [',', '.'], ['|', ',']),
    unit: fc.constantFrom<FrequencyUnit>('Hz', 'kHz', 'MHz', 'GHz'),
    encoding: fc.constantFrom(...(Object.keys(encoders) as (keyof typeof encoders)[])),
    end: fc.constantFrom('\n', '\r\n', '\r'),
    falling: fc.boolean(),
    decimals: fc.integer({ min: 1, max: 6 }),
  });
  const table = fc.record({
    hz: fc.uniqueArray(fc.integer({ min: 9_000, max: 40_000_000_000 }), { minLength: 4, maxLength: 40 }),
    db: fc.array(fc.integer({ min: 1, max: 80_000_000 }), { minLength: 40, maxLength: 40 }),
  });
  fc.assert(
    fc.property(table, style, ({ hz, db }, { marks, unit, encoding, end, falling, decimals }) => {
      const [between, mark] = marks as [string, string];
      const frequencies = [...hz].sort((a, b) => a - b);
      const figures = frequencies.map((_, i) => (db[i]! / 1e6).toFixed(decimals));
      const shift = TO_HZ[unit];
      const moved = frequencies.map((f) => {
        const digits = String(f).padStart(shift + 1, '0');
        return shift === 0 ? digits : `${digits.slice(0, -shift)}.${digits.slice(-shift)}`;
      });
      const lines = moved.map((f, i) => [f, figures[i]!].map((text) => text.replace('.', mark)).join(between));
      const text = [`Frequency (${unit})${between}Loss (dB)`, ...(falling ? lines.reverse() : lines), ''].join(end);
      const [again] = read(encoders[encoding](text));
      expect(again!.frequencyHz).toEqual(moved.map((f) => shifted(f, shift)));
      expect(again!.valueDb).toEqual(figures.map(Number));
    }),
    { numRuns: 400 },
  );
});

describe('what is refused, with its line', () => {
  test.each([
    ['a frequency twice', 'Frequency (MHz);Loss (dB)\n30;1\n100;2\n100;2\n300;3\n', 4, '100000000 Hz twice'],
    [
      'frequencies that jump',
      'Frequency (MHz);Loss (dB)\n30;1\n300;2\n200;2\n400;3\n',
      4,
      '200000000 Hz after 300000000 Hz',
    ],
    ['a transfer impedance in ohm', 'Frequency (MHz);Zt (ohm)\n30;1\n100;2\n300;3\n', 1, 'a transfer impedance in ohm'],
    ['levels', 'Frequency (MHz);Peak (dBuV)\n30;1\n100;2\n300;3\n', 1, 'dbuv'],
    ['a row that breaks off', 'Frequency (MHz);Loss (dB)\n30;1\n100;2\n200\n300;3\n400;4\n', 4, '1 column'],
  ])('%s', (_what, text, line, found) => {
    const bytes = utf8(text);
    let refused: unknown;
    try {
      factorColumns(bytes, recognise(bytes));
    } catch (error) {
      refused = error;
    }
    expect(refused).toBeInstanceOf(IngestError);
    expect(refused).toMatchObject({ line, found });
  });
});

test('a gain that is negative throughout is a loss; said to be a gain, it stays one', () => {
  const bytes = utf8('Frequency (MHz);Gain (dB)\n30;-1\n100;-2\n300;0\n');
  const [column] = factorColumns(bytes, recognise(bytes));
  expect(settleFactor(column!)).toEqual({ quantity: 'loss', negated: true, valueDb: [1, 2, 0] });
  expect(settleFactor(column!, { quantity: 'gain' })).toEqual({
    quantity: 'gain',
    negated: false,
    valueDb: [-1, -2, 0],
  });
});

/* Files that others wrote; they are not part of this repository. */
const folder = join(__dirname, '../../../shared/sweeps');
const shared = existsSync(folder) ? readdirSync(folder).filter((name) => name.startsWith('factor-')) : [];
(shared.length > 0 ? test.each(shared) : test.skip.each(['no ../shared/sweeps here']))(
  '%s: what is read of it, written and read again, is the same',
  (name) => {
    const bytes = readFileSync(join(folder, name));
    const recognition = recognise(bytes);
    const unit = recognition.frequency.unit ?? recognition.frequency.proposedUnit;
    const tables = readFactorTable(bytes, recognition, { frequencyUnit: unit, lossOrGain: 'gain' });
    expect(tables.length).toBeGreaterThan(0);
    for (const { quantity: of, frequencyHz, valueDb } of tables) {
      const [again] = read(utf8(factorTableText({ ...about, quantity: of, frequencyHz, valueDb })), of);
      expect(again).toMatchObject({ quantity: of, frequencyHz, valueDb });
    }
  },
);
