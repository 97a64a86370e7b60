import { readFileSync } from 'node:fs';
import { join } from 'node:path';
import { factorShapes } from '@fixtures/shapes/factorShapes';
import { oddShapes } from '@fixtures/shapes/oddShapes';
import { sweepShapes } from '@fixtures/shapes/sweepShapes';
import { IngestError } from '@/ingest/ingestError';
import { shifted } from '@/ingest/numbers';
import { readSweep } from '@/ingest/read';
import { recognise } from '@/ingest/recognise';
import type { Answers, Recognition } from '@/ingest/types';
import { TO_HZ } from '@/ingest/units';

const all = [...sweepShapes, ...oddShapes, ...factorShapes];
const shapeOf = (name: string) => all.find((shape) => shape.name === name)!;
const recognised = (name: string) => recognise(shapeOf(name).bytes, name);
const keys = ({ questions }: Recognition) => questions.map(({ key }) => key);
const detectors = ({ traces }: Recognition) => traces.map(({ detector }) => detector);

/** Answers that take every trace as it stands, filler included. */
function takeAll(recognition: Recognition, more: Partial<Answers> = {}): Answers {
  return {
    frequencyUnit: recognition.frequency.unit ?? recognition.frequency.proposedUnit,
    traces: recognition.traces.map(({ index, unit }) => ({ index, use: true, unit: unit ?? 'dBuV' })),
    ...more,
  };
}

describe('own files by fixtures/shapes/make.ts', () => {
  test.each(all.map(({ name, bytes }) => [name, bytes] as const))('%s is what its script makes', (name, bytes) => {
    expect(Buffer.compare(readFileSync(join(__dirname, '../../fixtures/shapes', name)), bytes)).toBe(0);
  });
});

const whole = all.filter(({ name, frequencies }) => frequencies.length > 0 && !name.startsWith('factor-'));
const inRows = ['hop-rows-two-sweeps.csv', 'time-rows-offset-columns.csv', 'sweeps-with-own-preambles.csv'];

describe('every point of every sweep reads back exactly', () => {
  test.each(whole.map((shape) => [shape.name, shape] as const))('%s', (name, shape) => {
    const recognition = recognise(shape.bytes, name);
    expect(recognition.refusal).toBeNull();
    const unit = recognition.frequency.unit ?? recognition.frequency.proposedUnit;
    const several = inRows.includes(name);
    expect(recognition.traces).toHaveLength(several ? 1 : shape.traces.length);
    for (const [i, expected] of shape.traces.entries()) {
      const answers = takeAll(recognition, { sweepIndex: several ? i : 0, centreHz: 0 });
      const read = readSweep(shape.bytes, recognition, answers);
      expect([...read.frequencyHz]).toEqual(shape.frequencies.map((value) => shifted(String(value), TO_HZ[unit])));
      expect([...read.traces[several ? 0 : i]!.values]).toEqual(expected);
    }
  });
});

describe('byte level', () => {
  test.each([
    ['semicolon-decimal-comma.csv', 'utf-8', 'CRLF'],
    ['utf16le-mark.txt', 'utf-16le with BOM', 'CRLF'],
    ['utf16be-mark.txt', 'utf-16be with BOM', 'CRLF'],
    ['utf16le-no-mark.txt', 'utf-16le', 'CRLF'],
    ['utf8-mark.csv', 'utf-8 with BOM', 'CRLF'],
    ['latin1-micro.csv', 'windows-1252', 'CRLF'],
    ['carriage-returns.csv', 'utf-8', 'CR'],
    ['mixed-line-ends.csv', 'utf-8', 'mixed: 61 CRLF, 6 LF'],
    ['nul-padded-marker-block.csv', 'ascii with NUL bytes (198)', 'CRLF'],
  ])('%s is %s with %s', (name, encoding, lineEnds) => {
    expect(recognised(name)).toMatchObject({ encoding, lineEnds });
  });

  test.each(['latin1-micro.csv', 'greek-mu.csv', 'utf8-mark.csv', 'utf16le-mark.txt', 'carriage-returns.csv'])(
    '%s: the micro of dBµV is understood',
    (name) => expect(recognised(name).traces.map(({ unit }) => unit)).toEqual(['dBuV', 'dBuV']),
  );
});

describe('delimiter, decimal mark and thousands', () => {
  test.each([
    ['semicolon-decimal-comma.csv', ';', ',', null],
    ['tab-decimal-comma.txt', 'tab', ',', null],
    ['tab.txt', 'tab', '.', null],
    ['thousands-thin-space.csv', ';', ',', ' '],
    ['thousands-narrow-no-break-space.csv', ';', ',', ' '],
    ['thousands-apostrophe.csv', ';', '.', "'"],
    ['thousands-dot-decimal-comma.csv', ';', ',', '.'],
    ['padded-columns.txt', 'space', '.', null],
    ['quoted-decimal-comma.csv', ',', ',', null],
    ['announced-pipe.csv', '|', '.', null],
  ])('%s: %s, decimal %s, thousands %s', (name, delimiter, decimalMark, thousandsMark) => {
    expect(recognised(name)).toMatchObject({ delimiter, decimalMark, thousandsMark, kind: 'sweep' });
  });
});

describe('frequency column and unit', () => {
  it('is found by heading, by agreement and by step, wherever it stands', () => {
    expect(recognised('frequency-second.csv').frequency).toMatchObject({ column: 1, unit: 'MHz' });
    const between = recognised('frequency-between-levels.csv');
    expect(between.frequency).toMatchObject({ column: 1, unit: 'Hz' });
    expect(between.columns[1]!.evidence).toContain('agrees with the declared start and stop');
  });

  it('takes units from a line of their own under the headings', () => {
    const recognition = recognised('units-on-their-own-line.txt');
    expect(recognition).toMatchObject({ headerLine: 1, preambleLines: 0, firstDataLine: 3 });
    expect(recognition.frequency.unit).toBe('MHz');
    expect(recognition.traces).toMatchObject([{ name: 'Peak', unit: 'dBuV', detector: 'peak' }]);
  });

  it('asks for the centre of offsets, and refuses to read without it', () => {
    const { bytes } = shapeOf('time-rows-offset-columns.csv');
    const recognition = recognise(bytes);
    expect(recognition).toMatchObject({ layout: 'time-rows', frequency: { offset: true, unit: 'kHz', points: 41 } });
    expect(keys(recognition)).toEqual(expect.arrayContaining(['sweepIndex', 'centreHz', 'levelUnit']));
    const { centreHz: _, ...without } = takeAll(recognition, { sweepIndex: 1 });
    expect(() => readSweep(bytes, recognition, without)).toThrow(IngestError);
    const read = readSweep(bytes, recognition, { ...without, centreHz: 100e6 });
    expect([read.frequencyHz[0], read.frequencyHz[40]]).toEqual([99.5e6, 100.5e6]);
  });
});

describe('traces, detectors and settings', () => {
  it('peak and average of one file', () => {
    const recognition = recognised('semicolon-decimal-comma.csv');
    expect(detectors(recognition)).toEqual(['peak', 'average']);
    expect(recognition.settings).toMatchObject({
      rbwHz: 9000,
      sweepTimeS: 1.25,
      attenuationDb: 10,
      declaredPoints: 60,
    });
    expect(keys(recognition)).toEqual([]);
  });

  it('leaves filler out, and an averaged trace mode leaves no detector', () => {
    const recognition = recognised('four-traces-two-filler.csv');
    expect(recognition.traces.map(({ blank }) => blank)).toEqual([false, false, true, true]);
    expect(recognition.columns.map(({ role }) => role)).toEqual(['frequency', 'level', 'level', 'blank', 'blank']);
    expect(detectors(recognition).slice(0, 2)).toEqual(['peak', 'unknown']);
    const read = readSweep(shapeOf('four-traces-two-filler.csv').bytes, recognition);
    expect(read.traces.map(({ name }) => name)).toEqual(['T1', 'T2']);
  });

  it('Normal is no single detector, a log average is not the linear one', () => {
    const recognition = recognised('normal-detector.csv');
    expect(detectors(recognition)).toEqual(['unknown', 'log-average']);
    expect(recognition.questions).toMatchObject([{ key: 'detector', traceIndex: 0, proposal: 'unknown' }]);
  });

  it('a unit named as default counts for nothing', () => {
    expect(recognised('nul-padded-marker-block.csv').traces).toMatchObject([{ unit: 'dBuV', name: 'Curve1(VIEW)' }]);
  });

  it('small positive figures are a linear quantity, never taken as decibels', () => {
    const recognition = recognised('linear-two-traces.csv');
    expect(recognition.traces.map(({ linear, unit }) => [linear, unit])).toEqual([
      [true, null],
      [true, null],
    ]);
  });
});

describe('columns that are no levels', () => {
  it('levels in some rows only, as finals beside a sweep, are named and not read', () => {
    const rows = Array.from({ length: 200 }, (_, i) => {
      const final = i % 5 === 3 ? '18.2' : '';
      return `${(30 + i * 0.06).toFixed(2)},${(20 + (i % 7) * 1.3).toFixed(1)},${final},${final && '1.5'}`;
    });
    const heading = 'Frequency [MHz],PK [dBµV],QP [dBµV],Height';
    const recognition = recognise(Buffer.from([heading, ...rows].join('\n')));
    expect(recognition.remarks).toEqual([
      { text: 'Column 3, QP [dBµV], has levels in 40 of 200 rows; it is not read.', line: 1 },
    ]);
    expect(recognition.columns.map(({ role }) => role)).toEqual(['frequency', 'level', 'other', 'other']);
    expect(recognition.traces).toHaveLength(1);
  });

  it('corrections, limits and margins beside the levels', () => {
    const recognition = recognised('level-and-correction-columns.csv');
    expect(recognition.columns.map(({ role }) => role)).toEqual(['frequency', 'level', 'other', 'other', 'other']);
    expect(recognition.remarks).toMatchObject([{ text: expect.stringContaining('“Corr. [dB]”'), line: 2 }]);
  });

  it('frequencies written again for each trace', () => {
    const recognition = recognised('frequencies-repeated-per-trace.csv');
    expect(recognition.columns.map(({ role }) => role)).toEqual(['frequency', 'level', 'other', 'level']);
    expect(detectors(recognition)).toEqual(['peak', 'average']);
  });
});

describe('what is already in the values', () => {
  test.each([
    ['limiter-already-in.csv', 'limiter 10 dB', 2],
    ['antenna-already-in.csv', 'transducer factor ANT horizontal 3 m', 2],
  ])('%s: %s', (name, what, line) => {
    const recognition = recognised(name);
    expect(recognition.correctedFor).toMatchObject([{ what, line }]);
    expect(keys(recognition)).toEqual(['alreadyCorrected']);
  });

  it('a correction that is switched off is none', () => {
    expect(recognised('correction-switched-off.csv')).toMatchObject({ correctedFor: [], questions: [] });
    expect(recognised('normal-detector.csv').correctedFor).toEqual([]);
  });
});

describe('several sweeps in one file', () => {
  it('hop rows: one sweep per return to the first hop; the repeated bin is left out', () => {
    const recognition = recognised('hop-rows-two-sweeps.csv');
    expect(recognition).toMatchObject({ layout: 'hop-rows', sweeps: [{ startedAt: '2026-11-17 10:00:01' }, {}] });
    expect(recognition.columns.map(({ role }) => role).slice(2)).toEqual([
      'frequency',
      'other',
      'other',
      'other',
      'level',
      'blank',
    ]);
    const { sweepIndex: _, ...without } = takeAll(recognition);
    expect(() => readSweep(shapeOf('hop-rows-two-sweeps.csv').bytes, recognition, without)).toThrow('2 sweeps');
  });

  it('sweeps with a preamble each: what differs is open until one is chosen, and then it is that one’s own', () => {
    const { bytes } = shapeOf('sweeps-with-own-preambles.csv');
    const recognition = recognise(bytes);
    expect(recognition.sweeps).toHaveLength(2);
    expect(detectors(recognition)).toEqual([null]);
    expect(detectors(recognise(bytes, undefined, 0))).toEqual(['peak']);
    expect(detectors(recognise(bytes, undefined, 1))).toEqual(['average']);
    const unsaid = readSweep(bytes, recognise(bytes, undefined, 1), { sweepIndex: 1 });
    expect(unsaid.traces).toMatchObject([{ detector: 'average' }]);
  });
});

describe('what several preambles say differently', () => {
  const sweep = (lines: string[], startHz: number) => [
    ...lines,
    ...Array.from({ length: 40 }, (_, i) => `${startHz + i * 4500};${(30 + (i % 5) * 1.7).toFixed(2)};`),
  ];
  const common = ['x-Unit;Hz;', 'y-Unit;dBuV;', 'Detector;MAX PEAK;'];
  const fileOf = (first: string[], second: string[]) =>
    Buffer.from([...sweep([...common, ...first], 150e3), ...sweep([...common, ...second], 150e3)].join('\n'));

  it('a bandwidth that differs is nobody’s and is asked for, until a sweep is chosen', () => {
    const bytes = fileOf(['RBW;9;kHz;', 'VBW;30;kHz;'], ['RBW;200;Hz;', 'VBW;30;kHz;']);
    const recognition = recognise(bytes);
    expect(recognition.sweeps).toHaveLength(2);
    expect(recognition.settings).toMatchObject({ rbwHz: null, vbwHz: 30e3 });
    expect(keys(recognition)).toEqual(['sweepIndex', 'rbwHz']);
    expect(recognition.questions[1]!.text).toMatch(/state different resolution bandwidths/);
    expect(recognise(bytes, undefined, 0).settings.rbwHz).toBe(9e3);
    expect(recognise(bytes, undefined, 1).settings.rbwHz).toBe(200);
    expect(recognise(fileOf(['RBW;9;kHz;'], ['RBW;9;kHz;'])).settings.rbwHz).toBe(9e3);
  });

  it('what any of them holds already is named', () => {
    const recognition = recognise(fileOf(['RBW;9;kHz;', 'Ext Att;10;dB;'], ['RBW;9;kHz;', 'Transducer;cable 4;']));
    expect(recognition.correctedFor.map(({ what }) => what)).toEqual([
      'external attenuation 10 dB',
      'transducer factor cable 4',
    ]);
    expect(keys(recognition)).toEqual(['sweepIndex', 'alreadyCorrected']);
  });
});

describe('refusals say where, what and the next step', () => {
  test.each([
    [
      'truncated-mid-row.csv',
      44,
      /^Line 44 has 2 columns; the lines before it have 3\. The file ends there\. 40 points were read before it up to 0\.3255 MHz; 60 are declared\./,
    ],
    ['truncated-inside-number.csv', 43, /^Line 43 breaks off inside .* The file ends there\. 40 points were read/],
    ['broken-row.csv', 22, /^Line 22 is not a row of numbers: “240000;4x\.1;22\.00”\. 20 points were read/],
    ['time-axis.csv', 2, /column 1 is time .*Export the trace over frequency\.$/],
    ['time-axis-by-unit-line.csv', 1, /an axis in s/],
    ['comma-twice.csv', 1, /the comma is both decimal mark and separator/],
    ['two-frequency-axes.csv', 1, /columns 1 and 3 are both frequencies, and they differ/],
    ['levels-alone.txt', 2, /levels without frequencies/],
    ['prose.txt', null, /No two lines hold a frequency and a level/],
  ])('%s at line %s', (name, line, message) => {
    const recognition = recognised(name);
    expect(recognition.kind).toBe('refused');
    expect(recognition.refusal!.line).toBe(line);
    expect(recognition.refusal!.message).toMatch(message);
    expect(() => readSweep(shapeOf(name).bytes, recognition, takeAll(recognition))).toThrow(IngestError);
  });

  it('a truncated file still shows what was read: declared 60, read 40', () => {
    const recognition = recognised('truncated-mid-row.csv');
    expect(recognition.refusal).toMatchObject({ found: '2 columns', expected: '3 columns and 60 points; 40 read' });
    expect(recognition.frequency).toMatchObject({ points: 40, firstHz: 150_000, lastHz: 325_500 });
    expect(recognition.preview.at(-1)).toMatchObject({ line: 44, role: 'row', text: '330000,0;41,0' });
  });

  it('a declared count that differs is a remark and stops nothing', () => {
    const recognition = recognised('declared-count-differs.csv');
    expect(recognition.refusal).toBeNull();
    expect(recognition.remarks).toEqual([{ text: 'The file declares 100 points; 60 were read.', line: 2 }]);
  });

  it('a file other than the one recognised is not read', () => {
    const recognition = recognised('semicolon-decimal-comma.csv');
    expect(() => readSweep(shapeOf('tab.txt').bytes, recognition)).toThrow(/not the one that was recognised/);
  });

  it.each([
    ['{\n "rows": [\n  [30, 40],\n  [31, 41]\n ]\n}\n'],
    ['[\n {"f": 30, "l": 40},\n {"f": 31, "l": 41}\n]\n'],
    ['<table>\n<tr><td>30</td><td>40</td></tr>\n<tr><td>31</td><td>41</td></tr>\n</table>\n'],
  ])('JSON and markup: %j', (text) => {
    expect(recognise(new TextEncoder().encode(text)).refusal?.found).toBe('JSON or markup');
  });

  it('an empty and a binary file', () => {
    expect(recognise(new Uint8Array()).refusal?.message).toBe('The file is empty. Export the trace again.');
    expect(recognise(Uint8Array.from({ length: 400 }, (_, i) => (i * 7) % 32)).refusal?.found).toBe('binary data');
  });
});
