import fc from 'fast-check';
import { shifted, textNumberReader } from '@/ingest/numbers';
import { rowMatcher } from '@/ingest/rowMatcher';
import type { Template } from '@/ingest/template';

const template = (decimal: '.' | ','): Template => ({
  delimiter: ';',
  decimal,
  thousands: null,
  contents: ['number', 'number'],
  fileWidth: 2,
});

/** What the byte reader makes of one written number; null when it takes the row for none. */
function byBytes(text: string, decimal: '.' | ',' = '.', shift = 0): number | null {
  const bytes = new TextEncoder().encode(`${text};0\n`);
  const data = [new Float64Array(1), new Float64Array(1)];
  const next = rowMatcher(bytes, template(decimal), [shift]).one(0, data, 0);
  return next < 0 ? null : data[0]![0]!;
}

const digits = (most: number) => fc.stringMatching(new RegExp(`^\\d{1,${most}}$`));
const sign = fc.constantFrom('', '-', '+');
const exponent = fc.oneof(
  fc.constant(''),
  fc.integer({ min: -340, max: 340 }).map((e) => `e${e}`),
  fc.integer({ min: 0, max: 40 }).map((e) => `E+0${e}`),
);
/** Any decimal text: up to 25 digits before and after the mark, leading zeros, signs, exponents. */
const decimalText = fc.oneof(
  fc.tuple(sign, digits(25), digits(25), exponent).map(([s, a, b, e]) => `${s}${a}.${b}${e}`),
  fc.tuple(sign, digits(12), digits(12), exponent).map(([s, a, b, e]) => `${s}${a}.${b}${e}`),
  fc.tuple(sign, digits(25), exponent).map(([s, a, e]) => `${s}${a}${e}`),
  fc.tuple(sign, digits(20)).map(([s, b]) => `${s}.${b}`),
  fc.double({ noNaN: true, noDefaultInfinity: true }).map(String),
  fc
    .tuple(fc.double({ min: -1e4, max: 1e4, noNaN: true }), fc.integer({ min: 0, max: 20 }))
    .map(([x, n]) => x.toFixed(n)),
);

describe('the byte reader agrees with Number() bit for bit', () => {
  it('on any decimal text', () => {
    fc.assert(
      fc.property(decimalText, (text) => {
        const expected = Number(text);
        const found = byBytes(text);
        return Number.isFinite(expected) ? Object.is(found, expected) : found === null;
      }),
      { numRuns: 20_000 },
    );
  });

  it('on 16 to 22 digits, where the rounding has to be proved', () => {
    const text = fc.tuple(fc.stringMatching(/^[1-9]\d{15,21}$/), fc.integer({ min: 1, max: 21 }));
    fc.assert(
      fc.property(text, ([all, at]) => {
        const written = at < all.length ? `${all.slice(0, -at)}.${all.slice(-at)}` : all;
        return Object.is(byBytes(written), Number(written));
      }),
      { numRuns: 20_000 },
    );
  });

  it('half way between two neighbours, where ties go to even', () => {
    const odd = fc.bigInt({ min: 2n ** 53n, max: 2n ** 56n });
    fc.assert(
      fc.property(odd, fc.integer({ min: 1, max: 4 }), (whole, down) => {
        const text = (whole * 10n ** BigInt(down)).toString();
        const written = `${text.slice(0, -down)}.${text.slice(-down)}`;
        return Object.is(byBytes(written), Number(written));
      }),
      { numRuns: 5000 },
    );
  });

  it('with a decimal comma', () => {
    fc.assert(
      fc.property(decimalText, (text) => {
        const expected = Number(text);
        const found = byBytes(text.replace('.', ','), ',');
        return Number.isFinite(expected) ? Object.is(found, expected) : found === null;
      }),
      { numRuns: 5000 },
    );
  });

  it('moved by powers of ten to hertz: one rounding, of the decimal that is meant', () => {
    fc.assert(
      fc.property(decimalText, fc.constantFrom(3, 6, 9), (text, shift) => {
        const expected = shifted(text, shift);
        const found = byBytes(text, '.', shift);
        return Number.isFinite(expected) ? Object.is(found, expected) : found === null;
      }),
      { numRuns: 10_000 },
    );
    expect(byBytes('30.075', '.', 6)).toBe(30_075_000);
    expect(byBytes('0.1', '.', 9)).toBe(100_000_000);
  });

  it('refuses what is no decimal number', () => {
    for (const text of [
      '',
      '.',
      '-',
      '+',
      '1e',
      '1e+',
      '0x10',
      'Infinity',
      'NaN',
      '1_000',
      '1.2.3',
      '12a',
      '1 2',
      '1e999',
    ]) {
      expect([text, byBytes(text)]).toEqual([text, null]);
    }
  });
});

describe('the text reader for irregular rows agrees with the byte reader', () => {
  it('on any decimal text', () => {
    const read = textNumberReader({ decimal: '.', thousands: null });
    fc.assert(
      fc.property(decimalText, fc.constantFrom(0, 6), (text, shift) =>
        Object.is(read(text, shift), byBytes(text, '.', shift)),
      ),
      { numRuns: 5000 },
    );
  });

  test.each([
    ['1.234.567,89', ',', '.', 1234567.89],
    ['1 234 567,89', ',', ' ', 1234567.89],
    ['1\u2009234\u202f567,89', ',', ' ', 1234567.89],
    ["-1'234.5", '.', "'", -1234.5],
    ['1,234,567.89', '.', ',', 1234567.89],
    ['\u221212,5', ',', ' ', -12.5],
    ['1.23,4', ',', '.', null],
    ['12 34', '.', ' ', null],
    ['1,2345', '.', ',', null],
  ] as const)('%s with decimal %s and groups by “%s” is %s', (text, decimal, thousands, value) => {
    expect(textNumberReader({ decimal, thousands })(text)).toBe(value);
  });
});
