import fc from 'fast-check';
import { sweepShapes } from '@fixtures/shapes/sweepShapes';
import { oddShapes } from '@fixtures/shapes/oddShapes';
import { IngestError } from '@/ingest/ingestError';
import { readSweep } from '@/ingest/read';
import { recognise } from '@/ingest/recognise';
import type { Answers, Recognition } from '@/ingest/types';
import { recognitionView } from '@/schemas/sweepFile';

const all = [...sweepShapes, ...oddShapes];
const shapeOf = (name: string) => all.find((shape) => shape.name === name)!;
const bytesOf = (lines: string[], end = '\n') => new TextEncoder().encode(lines.join(end) + end);

function answersFor(recognition: Recognition, more: Partial<Answers> = {}): Answers {
  return {
    frequencyUnit: recognition.frequency.unit ?? recognition.frequency.proposedUnit,
    sweepIndex: 0,
    traces: recognition.traces.map(({ index, unit }) => ({ index, use: true, unit: unit ?? 'dBuV' })),
    ...more,
  };
}

describe('a file that breaks off', () => {
  it('offers what stands before the broken row, and where the sweep was meant to end', () => {
    const { partial, broken } = recognise(shapeOf('truncated-mid-row.csv').bytes);
    expect(partial).toMatchObject({ line: 44, points: 40, readToHz: 325_500, declaredPoints: 60 });
    expect(broken!.lines.map(({ line }) => line)).toEqual([41, 42, 43, 44, 45, 46]);
    expect(broken!.lines[3]!.text).toBe('330000,0;41,0');
    expect(broken!.lines.slice(4).map(({ text }) => text)).toEqual([null, null]);
    expect(broken).toMatchObject({ missing: expect.stringMatching(/ is missing$/), after: 13 });
  });

  it('a number that is cut is not read, and the dashed box stands behind it', () => {
    const { bytes } = shapeOf('truncated-inside-number.csv');
    const recognition = recognise(bytes);
    expect(recognition.partial).toMatchObject({ points: 40 });
    expect(recognition.frequency.points).toBe(40);
    expect(recognition.broken!.missing).toBe('the rest of this number is missing');
    expect(readSweep(bytes, recognition, answersFor(recognition, { partial: true })).frequencyHz).toHaveLength(40);
  });

  it('a row broken in the middle: what comes after it is not read', () => {
    const { bytes } = shapeOf('broken-row.csv');
    const recognition = recognise(bytes);
    expect(recognition.partial).toMatchObject({ line: 22, points: 20 });
    expect(recognition.broken).toMatchObject({ missing: 'a number belongs here', after: '240000;4x.1'.length });
    expect(recognition.broken!.lines[4]!.text).toMatch(/^\d/);
    const read = readSweep(bytes, recognition, answersFor(recognition, { partial: true }));
    expect(read.frequencyHz).toHaveLength(20);
  });

  it('what is asked of a whole file is asked of it too', () => {
    const rows = Array.from({ length: 30 }, (_, i) => `${150_000 + i * 4500};${30 + (i % 7)}.10`);
    const recognition = recognise(bytesOf([...rows, '285000;']));
    expect(recognition.kind).toBe('refused');
    const asked = ['frequencyUnit', 'levelUnit', 'detector', 'rbwHz'];
    expect(recognition.questions.map(({ key }) => key)).toEqual(asked);
  });

  it('it is read in part only where that is said, and a whole file never is', () => {
    const cut = shapeOf('truncated-mid-row.csv').bytes;
    expect(() => readSweep(cut, recognise(cut), answersFor(recognise(cut)))).toThrow(IngestError);
    const whole = shapeOf('semicolon-decimal-comma.csv').bytes;
    const recognition = recognise(whole);
    expect(() => readSweep(whole, recognition, answersFor(recognition, { partial: true }))).toThrow(/is whole/);
    // The answer says partial, but the file at hand is another, whole one.
    const lost = { ...recognition, partial: recognise(cut).partial, refusal: recognise(cut).refusal };
    expect(() => readSweep(whole, lost, answersFor(lost, { partial: true }))).toThrow(/not the one/);
  });

  it('filler in what was read is left out as ever', () => {
    const rows = Array.from({ length: 30 }, (_, i) => `${150_000 + i * 4500};${30 + (i % 7)}.10;-200.00`);
    const recognition = recognise(bytesOf(['Frequency [Hz];Peak [dBuV];Average [dBuV]', ...rows, '285000;31']));
    expect(recognition.partial).toMatchObject({ points: 30 });
    expect(recognition.traces.map(({ blank }) => blank)).toEqual([false, true]);
  });

  it('of a handful of rows nothing is kept: they do not tell frequencies from levels', () => {
    const rows = Array.from({ length: 9 }, (_, i) => `${30 + i},${31 + ((i * 7) % 5) / 10}`);
    expect(recognise(bytesOf([...rows, '39'])).partial).toBeNull();
    expect(recognise(bytesOf([...rows, '39,31.4', '40'])).partial).toMatchObject({ points: 10 });
  });

  it.each(['comma-twice.csv', 'time-axis.csv', 'levels-alone.txt', 'prose.txt'])('%s holds nothing to keep', (name) => {
    const recognition = recognise(shapeOf(name).bytes);
    expect([recognition.kind, recognition.partial]).toEqual(['refused', null]);
  });
});

test('cut after any byte, a file is whole or refused or read to a prefix of its points, never to anything else', () => {
  const names = ['semicolon-decimal-comma.csv', 'tab.txt', 'headerless-mhz.csv', 'four-traces-two-filler.csv'];
  const wholes = names.map((name) => {
    const { bytes } = shapeOf(name);
    const recognition = recognise(bytes);
    return { bytes, read: readSweep(bytes, recognition, answersFor(recognition)) };
  });
  let partials = 0;
  fc.assert(
    fc.property(fc.constantFrom(...wholes), fc.nat(), ({ bytes, read }, at) => {
      const cut = bytes.slice(0, at % bytes.length);
      const recognition = recognise(cut);
      recognitionView.parse(recognition);
      expect(recognition.partial === null || recognition.kind === 'refused').toBe(true);
      if (recognition.partial === null) return;
      partials++;
      const part = readSweep(cut, recognition, answersFor(recognition, { partial: true }));
      const { points, readToHz } = recognition.partial;
      expect(part.frequencyHz).toHaveLength(points);
      expect(part.frequencyHz.at(-1)).toBe(readToHz);
      expect([...part.frequencyHz]).toEqual([...read.frequencyHz.slice(0, points)]);
      for (const { index, values } of part.traces) {
        const whole = read.traces.find((trace) => trace.index === index)!;
        expect([...values]).toEqual([...whole.values.slice(0, points)]);
      }
    }),
    { numRuns: 400 },
  );
  expect(partials).toBeGreaterThan(100);
});

describe('finals in a few rows beside a sweep', () => {
  const heading = 'Frequency [MHz];Peak [dBuV];QP final [dBuV]';
  const rows = (count: number, finals: readonly number[], ragged: boolean) =>
    Array.from({ length: count }, (_, i) => {
      const row = `${(30 + i * 0.05).toFixed(3)};${(30 + (i % 13) / 10).toFixed(2)}`;
      return finals.includes(i) ? `${row};38.12` : `${row}${ragged ? '' : ';'}`;
    });

  it.each([
    ['one of 200 rows', 200, [120], false],
    ['three of 60 rows, ragged', 60, [5, 20, 41], true],
    ['two of 9000 rows, where no sample sees them', 9000, [4000, 7001], false],
    ['the same, ragged', 9000, [4000, 7001], true],
  ])('%s: the sweep is read and the finals are named', (_name, count, finals, ragged) => {
    const bytes = bytesOf([heading, ...rows(count, finals, ragged)]);
    const recognition = recognise(bytes);
    expect(recognition).toMatchObject({ refusal: null, traces: [{ name: 'Peak' }] });
    const text = `Column 3, QP final [dBuV], has levels in ${finals.length} of ${count} rows; it is not read.`;
    expect(recognition.remarks).toContainEqual({ text, line: 1 });
    expect(readSweep(bytes, recognition).frequencyHz).toHaveLength(count);
  });

  it('a column that only its heading fills is unused, and a row that breaks beside it still stops the file', () => {
    const unused = recognise(bytesOf([heading, ...rows(60, [], false)]));
    expect(unused).toMatchObject({ refusal: null });
    expect(unused.columns[2]).toMatchObject({ role: 'blank', evidence: 'empty in every row' });
    const broken = [...rows(30, [], false), '31.500;', ...rows(60, [], false).slice(31)];
    expect(recognise(bytesOf([heading, ...broken])).refusal?.line).toBe(32);
    const cells = [...rows(30, [], false), '31.500;30.2;4x.1', ...rows(60, [], false).slice(31)];
    expect(recognise(bytesOf([heading, ...cells])).refusal?.line).toBe(32);
  });
});

describe('the shape of a file', () => {
  const file = (more: { rbw?: string; level?: string; heading?: string; date?: string; rows?: number }) => {
    const {
      rbw = '120',
      level = '33.10',
      heading = 'Frequency [MHz];Peak [dBuV]',
      date = '17.11.2026',
      rows = 40,
    } = more;
    return bytesOf([
      `Trace export;${date}`,
      `RBW;${rbw};kHz`,
      heading,
      ...Array.from(
        { length: rows },
        (_, i) => `${(30 + i * 0.05).toFixed(3)};${i === 3 ? level : (30 + (i % 7)).toFixed(2)}`,
      ),
    ]);
  };
  const shape = (bytes: Uint8Array) => recognise(bytes).shape;

  it('is the same for every file of one export, whatever its values', () => {
    const first = shape(file({}));
    expect(first).toMatch(/^[0-9a-f]{64}$/);
    expect(shape(file({ rbw: '9', level: '99.99', date: '1.1.2027', rows: 900 }))).toBe(first);
  });

  it('is another with another delimiter, decimal mark, heading, unit, column or preamble key', () => {
    const text = new TextDecoder().decode(file({}));
    const others = [
      file({ heading: 'Frequency [MHz];Average [dBuV]' }),
      file({ heading: 'Frequency [MHz];Peak [dBm]' }),
      new TextEncoder().encode(text.replaceAll(';', '\t')),
      new TextEncoder().encode(text.replaceAll('.', ',')),
      new TextEncoder().encode(text.replace('RBW;', 'VBW;')),
      new TextEncoder().encode(text.replace(/^(\d.*)$/gm, '$1;1.$1').replace(/;1\.\d+\./g, ';1.')),
    ];
    expect(new Set([shape(file({})), ...others.map(shape)]).size).toBe(others.length + 1);
  });

  it('a file that broke off has the shape of the whole one', () => {
    const whole = file({});
    expect(recognise(whole.slice(0, -4)).kind).toBe('refused');
    expect(shape(whole.slice(0, -4))).toBe(shape(whole));
  });

  it('what is no table has none', () => expect(shape(new TextEncoder().encode('no table\nat all\n'))).toBeNull());
});

describe('several sweeps in one file', () => {
  const rows = (from: number) =>
    Array.from({ length: 30 }, (_, i) => `${150_000 + (from + i) * 4500};${(30 + ((i * 7) % 11) / 10).toFixed(2)}`);
  const heading = 'Frequency [Hz];Level [dBuV]';

  it('are named, with how they lie', () => {
    const said = (lines: string[]) => recognise(bytesOf(lines)).remarks.map(({ text }) => text);
    expect(said([heading, ...rows(0), heading, ...rows(0)])).toContain(
      'The file holds 2 sweeps under one another. Each is kept as a run of its own.',
    );
    expect(said([heading, ...rows(0), 'Second range', heading, ...rows(30)])).toContain(
      'The file holds 2 sweeps, each from where the one before ends. Each is kept as a run of its own.',
    );
  });

  it('the chosen one is described by its own preamble', () => {
    const bytes = bytesOf([
      'Detector;Peak',
      'RBW;9;kHz',
      heading,
      ...rows(0),
      'Detector;Average',
      'RBW;120;kHz',
      heading,
      ...rows(0),
    ]);
    expect(recognise(bytes)).toMatchObject({ traces: [{ detector: null }], settings: { rbwHz: null } });
    expect(recognise(bytes, 'x', 0)).toMatchObject({ traces: [{ detector: 'peak' }], settings: { rbwHz: 9e3 } });
    expect(recognise(bytes, 'x', 1)).toMatchObject({ traces: [{ detector: 'average' }], settings: { rbwHz: 120e3 } });
  });
});
