import fc from 'fast-check';
import { oddShapes } from '@fixtures/shapes/oddShapes';
import { sweepShapes } from '@fixtures/shapes/sweepShapes';
import { decode } from '@/ingest/bytes';
import { IngestError } from '@/ingest/ingestError';
import { readSweep } from '@/ingest/read';
import { recognise, recogniseSteps } from '@/ingest/recognise';
import { recognitionView } from '@/schemas/sweepFile';

/** Whatever comes in: an answer of the agreed shape, of bounded size, and never NaN or infinity in it. */
function survives(bytes: Uint8Array) {
  const recognition = recognise(bytes);
  const json = JSON.stringify(recognition);
  expect(json.length).toBeLessThan(600_000);
  // zod refuses NaN, infinities and unknown keys.
  recognitionView.parse(recognition);
  expect(recognition.kind === 'refused').toBe(recognition.refusal !== null);
  try {
    const read = readSweep(bytes, recognition, {
      frequencyUnit: 'Hz',
      centreHz: 0,
      sweepIndex: 0,
      traces: recognition.traces.map(({ index }) => ({ index, use: true, unit: 'dBuV' })),
    });
    expect(read.frequencyHz.every(Number.isFinite)).toBe(true);
    for (const { values } of read.traces) {
      expect(values).toHaveLength(read.frequencyHz.length);
      expect(values.every(Number.isFinite)).toBe(true);
    }
  } catch (error) {
    expect(error).toBeInstanceOf(IngestError);
  }
}

it('random bytes', () => {
  fc.assert(fc.property(fc.uint8Array({ maxLength: 3000 }), survives), { numRuns: 300 });
});

it('random text of digits, marks and line ends', () => {
  const letter = fc.constantFrom(
    ...'0123456789'.split(''),
    '.',
    ',',
    ';',
    '\t',
    ' ',
    '-',
    '+',
    'e',
    '"',
    '\n',
    '\n',
    '\r',
    '#',
    'Hz',
    'dBuV',
    'sep=',
  );
  fc.assert(
    fc.property(fc.array(letter, { maxLength: 600 }), (letters) =>
      survives(new TextEncoder().encode(letters.join(''))),
    ),
    { numRuns: 400 },
  );
});

it('good files with bytes put in, taken out and cut off', () => {
  const source = fc.constantFrom(...[...sweepShapes, ...oddShapes].map(({ bytes }) => bytes));
  const change = fc.record({
    at: fc.nat(6000),
    out: fc.nat(40),
    put: fc.uint8Array({ maxLength: 12 }),
    end: fc.nat(6000),
  });
  fc.assert(
    fc.property(source, change, (bytes, { at, out, put, end }) => {
      const from = at % bytes.length;
      const changed = [...bytes.subarray(0, from), ...put, ...bytes.subarray(from + out)];
      survives(Uint8Array.from(changed.slice(0, end % 3 === 0 ? end : changed.length)));
    }),
    { numRuns: 400 },
  );
});

describe('a megabyte of one thing is answered soon, in short steps', () => {
  const things = [
    '\r',
    '\n',
    '"',
    ',',
    ' ',
    '1',
    '\0',
    ';',
    '#',
    '1,2\n',
    '1,2\r',
    '"1","2"\n',
    '1;2\nx\n',
    '1 2 ',
    'a,1,2\n',
    '1,\n',
    '-',
    '0.',
    '9',
    '1e9,',
  ];
  test.each(things.map((thing) => [JSON.stringify(thing), thing]))('%s', (_, thing) => {
    const bytes = new TextEncoder().encode(thing.repeat(Math.ceil(1_000_000 / thing.length)));
    const start = process.cpuUsage();
    const recognition = recognise(bytes);
    const { user, system } = process.cpuUsage(start);
    recognitionView.parse(recognition);
    expect((user + system) / 1e6).toBeLessThan(5);
  });
});

it('a large file is recognised in many steps, so that a server can serve others meanwhile', () => {
  const rows = Array.from({ length: 120_000 }, (_, i) => `${30_000_000 + i * 75},${(30 + (i % 7)).toFixed(2)}`);
  let steps = 0;
  for (const _ of recogniseSteps(new TextEncoder().encode(rows.join('\n')))) steps++;
  expect(steps).toBeGreaterThan(10);
});

it('decode keeps the numbers of the lines', () => {
  fc.assert(
    fc.property(fc.array(fc.constantFrom('a\n', 'bc\r\n', 'd\r', '\n', 'µ;1\r\r\n'), { maxLength: 40 }), (lines) => {
      const whole = lines.join('').replace(/\r(?=\n)/g, '\r');
      const { text } = decode(new TextEncoder().encode(whole));
      expect(text).not.toContain('\r');
      expect(text.replace(/\n/g, '')).toBe(whole.replace(/[\r\n]/g, ''));
    }),
  );
  expect(decode(Uint8Array.from([0x64, 0x42, 0xb5, 0x56, 13, 10])).text).toBe('dBµV\n');
  expect(decode(Uint8Array.from([0x64, 0x42, 0xc2, 0xb5, 0x56])).text).toBe('dBµV');
  expect(decode(Uint8Array.from([0x31, 0, 0x2c, 0x32, 0, 13, 10]))).toMatchObject({ text: '1,2\n', nulBytes: 2 });
});
