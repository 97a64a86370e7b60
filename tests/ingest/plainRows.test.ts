import fc from 'fast-check';
import { runThrough } from '@/ingest/bytes';
import { prepareSteps } from '@/ingest/prepare';
import { scanSteps, type Scan } from '@/ingest/scan';
import { ScannedFile } from '@/ingest/scannedFile';

const digits = (most: number) => fc.stringMatching(new RegExp(`^[0-9]{1,${most}}$`));
/** Written numbers of any length around the mark, some with a sign or an exponent. */
const written = fc
  .tuple(
    fc.constantFrom('', '', '', '-', '+'),
    digits(12),
    fc.option(digits(14)),
    fc.option(fc.integer({ min: -30, max: 30 })),
  )
  .map(([sign, whole, part, power]) => sign + whole + (part ? `.${part}` : '') + (power === null ? '' : `e${power}`));
/** What a frequency in MHz looks like: at most 15 digits in all. */
const plain = fc.tuple(digits(9), fc.option(digits(6))).map(([whole, part]) => whole + (part ? `.${part}` : ''));

const rowsOf = (cell: fc.Arbitrary<string>) => fc.array(fc.tuple(cell, cell, cell), { minLength: 3, maxLength: 40 });
const textOf = (rows: string[][], end: string) => `f,a,b${end}${rows.map((row) => row.join(',')).join(end)}${end}`;
const bytesOf = (text: string) => new TextEncoder().encode(text);

function scanned(bytes: Uint8Array, shifts?: number[]): Scan {
  const { clean, template } = runThrough(prepareSteps(bytes));
  return runThrough(scanSteps(clean, template!, shifts));
}

/** Bits, so that 0 and -0 differ. */
const bits = (values: Float64Array, rows: number) => [...new BigUint64Array(values.slice(0, rows).buffer)];

test('a number read from the bytes has the bits that Number() gives it, whichever reader took its row', () => {
  fc.assert(
    fc.property(rowsOf(fc.oneof(written, plain)), fc.constantFrom('\n', '\r\n', '\r'), (rows, end) => {
      const { data, rows: count } = scanned(bytesOf(textOf(rows, end)));
      expect(count).toBe(rows.length);
      for (const [column, values] of data.entries()) {
        const expected = Float64Array.from(rows, (row) => Number(row[column]));
        expect(bits(values, count)).toEqual(bits(expected, count));
      }
    }),
  );
});

test('a frequency column moved to hertz after the scan has the bits of one that was moved while it was scanned', () => {
  fc.assert(
    fc.property(rowsOf(fc.oneof(plain, plain, plain, written)), fc.constantFrom(3, 6, 9), (rows, shift) => {
      const bytes = bytesOf(textOf(rows, '\n'));
      const file = new ScannedFile(bytes);
      runThrough(file.scan());
      const moved = runThrough(file.scan([shift]));
      const afresh = scanned(bytes, [shift]);
      for (const column of [0, 1, 2]) {
        expect(bits(moved.data[column]!, moved.rows)).toEqual(bits(afresh.data[column]!, afresh.rows));
      }
    }),
  );
});

test('what was scanned is handed out again, and moved without another pass where its digits allow it', () => {
  const file = new ScannedFile(bytesOf('f (MHz),a\n30.075,33.4\n30.1,33.5\n30.125,33.6\n'));
  const first = runThrough(file.scan());
  expect(runThrough(file.scan())).toEqual(first);
  const moved = runThrough(file.scan([6]));
  expect([...moved.data[0]!.subarray(0, 3)]).toEqual([30_075_000, 30_100_000, 30_125_000]);
  expect(moved.data[1]).toBe(first.data[1]);
});
