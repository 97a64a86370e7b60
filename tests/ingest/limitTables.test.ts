import fc from 'fast-check';
import limits from '@fixtures/published/limits.json';
import { latin1, utf16, utf8, utf8WithMark } from '@fixtures/shapes/build';
import { limitAt, toLimitLine, toMicrovoltLine } from '@/emc/limitLine';
import type { LimitLine, LimitSegment } from '@/emc/types';
import { IngestError } from '@/ingest/ingestError';
import { betweenIsOpen, limitHoles, readLimitSegments, type LimitChoice } from '@/ingest/limitSegments';
import { recogniseLimitTable } from '@/ingest/limitTable';
import { statedQuantity } from '@/ingest/stated';
import { limitLineText } from '@/ingest/tableText';

const read = (text: string, choice?: LimitChoice) => readLimitSegments(recogniseLimitTable(utf8(text)), choice);
const refusalOf = (text: string, choice?: LimitChoice) => {
  try {
    read(text, choice);
  } catch (error) {
    if (error instanceof IngestError) return { line: error.line, found: error.found, message: error.message };
    throw error;
  }
  throw new Error('it was read');
};

const published: LimitLine[] = [
  ...limits.lines.map(toLimitLine),
  ...limits.microvoltLines.map((record) => toMicrovoltLine(record as Parameters<typeof toMicrovoltLine>[0])),
];
const written = (line: LimitLine) =>
  limitLineText({ ...line, key: line.id, document: 'a; "document"', class: 'B', port: 'p', source: 's', basis: 'b' });

/** As a person copies a table out of a standard: MHz, decimal comma, only the shapes it prints. */
function asCopied({ unit, segments }: LimitLine, decimal: ',' | '.'): string {
  const number = (value: number) => String(value).replace('.', decimal);
  const rows = segments.map(
    ({ startHz, stopHz, startLimit, stopLimit, over }) =>
      `${number(startHz / 1e6)};${number(stopHz / 1e6)};${number(startLimit)};${number(stopLimit)};${over === 'log-frequency' ? 'log' : 'linear'}`,
  );
  return [`Start (MHz);Stop (MHz);Limit start (${unit});Limit stop (${unit});Straight in`, ...rows, ''].join('\n');
}

describe('published limit lines, entered as CSV (fixtures/published/limits.json)', () => {
  test.each(published.map((line) => [line.id, line] as const))('%s reads back to the same segments', (_id, line) => {
    expect(read(written(line))).toEqual(line.segments);
    for (const decimal of [',', '.'] as const) expect(read(asCopied(line, decimal))).toEqual(line.segments);
    expect(recogniseLimitTable(utf8(written(line))).unit).toBe(line.unit);
  });

  test.each(limits.evaluationPoints.rows)(
    '$lineId as CSV is $limit $unit at $freqMHz MHz (its line, CISPR/FCC interpolation and band-edge rules)',
    (row) => {
      const line = published.find(({ id }) => id === row.lineId)!;
      const entered = { ...line, segments: read(asCopied(line, ',')) };
      const hz = Math.round(row.freqMHz * 1e6);
      expect(limitAt(entered, hz)).toBe(limitAt(line, hz));
      expect(limitAt(entered, hz)).toBeCloseTo(row.limit, 3);
    },
  );
});

const hertz = fc.integer({ min: 9_000, max: 40_000_000_000 });
const limit = fc.double({ min: -60, max: 140, noNaN: true }).map((value) => value + 0);
const over = fc.constantFrom('log-frequency' as const, 'linear-frequency' as const);
const segments = fc
  .uniqueArray(hertz, { minLength: 2, maxLength: 16 })
  .map((all) => all.sort((a, b) => a - b))
  .chain((edges) =>
    fc.array(fc.tuple(limit, limit, over), { minLength: edges.length - 1, maxLength: edges.length - 1 }).map((values) =>
      values.map(([startLimit, stopLimit, how], i): LimitSegment => {
        return { startHz: edges[i]!, stopHz: edges[i + 1]!, startLimit, stopLimit, over: how };
      }),
    ),
  );
const anyText = fc.string({ unit: 'binary', maxLength: 60 });
const encoders = { utf8, utf8WithMark, utf16le: (text: string) => utf16(text, 'le', true) };

describe('any limit line', () => {
  it('written and read again is the same, bit for bit, whatever its words are (property)', () => {
    const words = fc.record({ name: anyText, document: anyText, source: anyText, basis: anyText });
    fc.assert(
      fc.property(segments, words, fc.constantFrom(...Object.keys(encoders)), (own, described, encoding) => {
        const text = limitLineText({
          ...{ ...published[0]!, ...described, key: 'k', class: 'B', port: 'enclosure', distanceM: 3 },
          segments: own,
        });
        const table = recogniseLimitTable(encoders[encoding as keyof typeof encoders](text));
        expect(readLimitSegments(table)).toEqual(own);
        expect(table.stated.key?.value).toBe('k');
        expect(statedQuantity(table.stated.bandwidth!.value, 'Hz')).toBe(published[0]!.bandwidthHz);
      }),
      { numRuns: 300 },
    );
  });

  it('delimiter × decimal mark × unit of the frequencies: the same numbers (property)', () => {
    const style = fc.constantFrom([';', ','], [';', '.'], ['\t', ','], ['\t', '.'], [',', '.'], ['|', ',']);
    const unit = fc.constantFrom(['Hz', 0], ['kHz', 3], ['MHz', 6], ['GHz', 9]) as fc.Arbitrary<[string, number]>;
    const encoder = fc.constantFrom(utf8, latin1, utf8WithMark);
    fc.assert(
      fc.property(segments, style, unit, encoder, (own, [between, mark], [name, shift], encode) => {
        const moved = (hz: number) => {
          const digits = String(hz).padStart(shift + 1, '0');
          return shift === 0 ? digits : `${digits.slice(0, -shift)}.${digits.slice(-shift)}`;
        };
        const cells = own.map(({ startHz, stopHz, startLimit, stopLimit }) =>
          [moved(startHz), moved(stopHz), String(startLimit), String(stopLimit)]
            .map((text) => text.replace('.', mark!))
            .join(between),
        );
        const headings = [`Start ${name}`, `Stop ${name}`, 'Limit start dBµV', 'Limit stop dBµV'].join(between);
        const table = recogniseLimitTable(encode([headings, ...cells, ''].join('\r\n')));
        expect([table.frequencyUnit, table.unit]).toEqual([name, 'dBuV']);
        const plain = own.map((segment) => ({ ...segment, over: 'log-frequency' }));
        expect(readLimitSegments(table, { between: 'log-frequency' })).toEqual(plain);
      }),
      { numRuns: 300 },
    );
  });
});

describe('break points', () => {
  const stepped = 'Frequency (MHz);Limit (dBuV/m)\n30;40\n230;40\n230;47\n1000;47\n';
  const line = (own: LimitSegment[]): LimitLine => ({ ...published[0]!, segments: own });

  test('a repeated frequency is a step, and the lower limit governs on it (47 CFR 15.109(c))', () => {
    const own = line(read(stepped));
    expect([30, 229.9, 230, 230.1, 1000].map((megahertz) => limitAt(own, megahertz * 1e6))).toEqual([40, 40, 40, 47, 47]); // prettier-ignore
    expect(betweenIsOpen(recogniseLimitTable(utf8(stepped)))).toBe(false);
  });

  test('without a repeat it is asked whether the line slopes or each limit holds until the next', () => {
    const open = 'Frequency (MHz);Limit (dBuV)\n0.15;66\n0.5;56\n30;56\n';
    expect(betweenIsOpen(recogniseLimitTable(utf8(open)))).toBe(true);
    expect(refusalOf(open).found).toBe('no rule between two limits');
    expect(limitAt(line(read(open, { between: 'hold' })), 0.3e6)).toBe(66);
    expect(limitAt(line(read(open, { between: 'log-frequency' })), 0.3e6)).toBeCloseTo(60.2428, 3);
    expect(limitAt(line(read(`Straight in;linear frequency\n${open}`)), 0.325e6)).toBeCloseTo(61, 9);
  });

  test('falling frequencies are turned round; the limit may stand first where the headings say so', () => {
    const falling = 'Limit dBuV/m;Frequency MHz\n47;1000\n47;230\n40;230\n40;30\n';
    expect(read(falling)).toEqual(read(stepped));
  });
});

describe('what is refused, with its line', () => {
  test.each([
    ['a stop below its start', 'Start MHz;Stop MHz;Limit dBuV\n30;230;40\n1000;230;47\n', 3, '1000 to 230'],
    ['a broken row', 'Start MHz;Stop MHz;Limit dBuV\n30;230;40\n230;10\n1000;3000;47\n', 3, '2 numbers'],
    ['words among the rows', 'Start MHz;Stop MHz;Limit dBuV\n30;230;40\nsee note\n230;1000;47\n', 3, 'see note'],
    ['break points that jump', 'MHz;dBuV\n30;40\n300;40\n200;40\n400;47\n', 4, '200'],
    ['a frequency three times', 'MHz;dBuV\n30;40\n200;40\n200;42\n200;47\n400;47\n', 5, '200 three times'],
    ['one break point', 'MHz;dBuV\n30;40\n', 2, 'one frequency'],
    ['microvolts', 'Start MHz;Stop MHz;Limit (uV/m)\n30;88;100\n', 1, 'Limit (uV/m)'],
    ['another unit', 'Start MHz;Stop MHz;Limit (dBm)\n30;88;100\n', 1, 'dbm'],
    ['a comma that is both', 'Start MHz,Stop MHz,Limit dBuV\n30,230,40,5\n', 2, '30,230,40,5'],
    ['no frequency', 'MHz;dBuV\n0;40\n10;40\n', 2, '0'],
  ])('%s', (_what, text, line, found) => {
    expect(refusalOf(text)).toMatchObject({ line, found });
    expect(refusalOf(text).message).toContain(`Line ${line}`);
  });

  test('a file without any row, and frequencies without a unit', () => {
    expect(refusalOf('nothing here\n')).toMatchObject({ line: null, found: 'no row of numbers' });
    expect(refusalOf('30;230;40\n230;1000;47\n')).toMatchObject({ found: 'no frequency unit' });
    expect(recogniseLimitTable(utf8('30;230;40\n230;1000;47\n')).proposedFrequencyUnit).toBe('MHz');
  });

  test('any bytes are read or refused, never anything else (property)', () => {
    fc.assert(
      fc.property(fc.oneof(fc.uint8Array({ maxLength: 200 }), anyText.map(utf8)), (bytes) => {
        try {
          readLimitSegments(recogniseLimitTable(bytes), { frequencyUnit: 'MHz', between: 'hold' });
        } catch (error) {
          expect(error).toBeInstanceOf(IngestError);
        }
      }),
    );
  });
});

test('a hole and an overlap are named', () => {
  const own = read('Start MHz;Stop MHz;Limit dBuV\n30;88;40\n108;230;40\n200;1000;47\n');
  expect(limitHoles(own)).toEqual([
    { fromHz: 88e6, toHz: 108e6, kind: 'hole' },
    { fromHz: 200e6, toHz: 230e6, kind: 'overlap' },
  ]);
});
