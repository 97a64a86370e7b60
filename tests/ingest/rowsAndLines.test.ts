import { decode } from '@/ingest/bytes';
import { readSweep } from '@/ingest/read';
import { recognise } from '@/ingest/recognise';

const bytes = (lines: string[], end = '\n') => new TextEncoder().encode(lines.join(end) + end);
const heading = 'Frequency [Hz];Peak [dBuV]';
const row = (i: number) => `${150_000 + i * 4500};${(30 + ((i * 7) % 11) / 10).toFixed(2)}`;
const rows = (from: number, to: number) => Array.from({ length: to - from }, (_, i) => row(from + i));
const count = (file: Uint8Array) => readSweep(file, recognise(file)).frequencyHz.length;

describe('lines between rows', () => {
  it('blank lines and remarks of the exporter do not end a sweep', () => {
    const file = bytes([heading, ...rows(0, 20), '', ...rows(20, 30), '# second page', ...rows(30, 60)]);
    expect(recognise(file)).toMatchObject({ refusal: null, sweeps: [{}] });
    expect(count(file)).toBe(60);
  });

  it('a remark between two sweeps parts them, since the frequencies begin again', () => {
    const file = bytes([heading, ...rows(0, 40), '# again', ...rows(0, 40)]);
    expect(recognise(file).sweeps).toHaveLength(2);
  });

  it('sweeps under one another without a word between them', () => {
    const file = bytes([heading, ...rows(0, 30), ...rows(0, 30), ...rows(0, 30)]);
    const recognition = recognise(file);
    expect(recognition.sweeps).toHaveLength(3);
    expect(recognition.frequency).toMatchObject({ points: 30, ascending: true, duplicates: 0 });
    expect(readSweep(file, recognition, { sweepIndex: 2 }).frequencyHz).toHaveLength(30);
  });

  it('headed pieces are offered apart, even where the second goes on from the first', () => {
    const file = bytes([heading, ...rows(0, 30), 'Second range', heading, ...rows(30, 60)]);
    expect(recognise(file).sweeps).toHaveLength(2);
  });

  it.each([
    ['####', 22],
    ['240000;', 22],
    ['240000', 22],
    ['240000;31.0;9', 22],
    ['240000;31.0x', 22],
    ['24', 22],
  ])('“%s” in the middle stops the file at its line', (broken, line) => {
    const recognition = recognise(bytes([heading, ...rows(0, 20), broken, ...rows(21, 60)]));
    expect(recognition.refusal).toMatchObject({ line });
    expect(recognition.refusal!.message).toMatch(/20 points were read before it up to 0\.2355 MHz/);
  });

  it('a broken row among the first three counts too, and blank lines do not shift the line', () => {
    expect(recognise(bytes([heading, ...rows(0, 2), '159000;3;1', ...rows(3, 60)])).refusal?.line).toBe(4);
    expect(recognise(bytes([heading, '', ...rows(0, 30), '', '', '285000', ...rows(31, 60)])).refusal?.line).toBe(35);
  });

  it('a footer and a marker table are named and not read', () => {
    const file = bytes([
      'Marker;1;2;3',
      '1;150000;31;0',
      '2;160000;32;0',
      '',
      heading,
      ...rows(0, 60),
      'End of record',
    ]);
    const recognition = recognise(file);
    expect(recognition.refusal).toBeNull();
    expect(recognition.remarks).toMatchObject([{ text: expect.stringMatching(/after the last row/), line: 66 }]);
    expect(count(file)).toBe(60);
  });
});

describe('the end of a file', () => {
  it('cut inside the last number where the declared count shows it', () => {
    const file = bytes([`Points;60`, heading, ...rows(0, 12)]).slice(0, -2);
    expect(recognise(file).refusal).toMatchObject({ line: 14, expected: '2 columns and 60 points; 11 read' });
  });

  it('no line end after a whole last row is no reason to stop', () => {
    const file = bytes(['Points;60', heading, ...rows(0, 60)]).slice(0, -1);
    expect(recognise(file).refusal).toBeNull();
    expect(count(file)).toBe(60);
  });

  it('cut rows of hops and of moments', () => {
    const hop = (i: number) =>
      `2026-11-17, 10:00:01, ${80e6 + i * 1e6}, ${81e6 + i * 1e6}, 1000000, 1, -${20 + (i % 3)}.5`;
    const hops = Array.from({ length: 20 }, (_, i) => hop(i));
    expect(recognise(bytes(hops)).layout).toBe('hop-rows');
    expect(recognise(bytes([...hops, '2026-11-17, 10:00:01, 100000000, 1010'])).refusal?.line).toBe(21);
    const moments = ['MHz', ',1,2,3,4,5,6', '10:00:00,5,4,6,5,4,6', '10:00:01,5,4,6,5,4,7', '10:00:02,5,4,6'];
    expect(recognise(bytes(moments)).refusal?.line).toBe(5);
  });
});

describe('what the lines before the rows say', () => {
  it('lines about defaults count for nothing', () => {
    const { settings } = recognise(bytes(['Default RBW;120;kHz', 'RBW default;120;kHz', heading, ...rows(0, 20)]));
    expect(settings.rbwHz).toBeNull();
  });

  it('the nearest of two statements counts, four thousand lines in', () => {
    const noise = Array.from({ length: 5000 }, (_, i) => `note ${i}`);
    const recognition = recognise(
      bytes(['RBW;9;kHz', 'Detector;QP', ...noise, 'RBW;120;kHz', 'Detector;Peak', ...rows(0, 20)]),
    );
    expect(recognition.settings.rbwHz).toBe(120_000);
    expect(recognition.traces[0]!.detector).toBe('peak');
    expect(recognition.firstDataLine).toBe(5005);
  });

  it.each([
    ['RBW;120;kHz', 120_000],
    ['RBW [kHz];9', 9000],
    ['RBW: 120 kHz', 120_000],
    ['Res BW = 1 MHz', 1_000_000],
    ['IF bandwidth;200 Hz', 200],
    ['RBW;120000', 120_000],
    ['RBW;9', null],
    ['Bandwidth;9;kHz', 9000],
    ['Bandwidth;40;MHz', null],
    ['Input Bandwidth;9;kHz', null],
    ['VBW/RBW;1.00', null],
  ])('%s is an RBW of %s Hz', (line, rbwHz) => {
    expect(recognise(bytes([line, heading, ...rows(0, 20)])).settings.rbwHz).toBe(rbwHz);
  });

  it('a unit that contradicts the declared span is asked for', () => {
    const lines = ['Start;150000;Hz', 'Stop;235500;Hz', 'Frequency [MHz];Peak [dBuV]', ...rows(0, 20)];
    const recognition = recognise(bytes(lines));
    expect(recognition.frequency.unit).toBeNull();
    expect(recognition.questions).toMatchObject([{ key: 'frequencyUnit', proposal: 'Hz' }, {}]);
    expect(recognition.remarks[0]!.text).toContain('only Hz agrees');
  });

  it.each([
    ['Span;0;Hz', /a span of zero/],
    ['X Axis Units;ms', /an axis in ms/],
  ])('%s: the axis is not frequency', (line, found) => {
    expect(recognise(bytes([line, ...rows(0, 20)])).refusal?.found).toMatch(found);
  });

  it.each([
    ['Values corrected for antenna factor ANT-02, cable CBL-07', ['antenna factor', 'cable loss']],
    ['Ext Att;10;dB', ['external attenuation 10 dB']],
    ['External gain;30', ['preamplifier 30 dB']],
    ['Ref level offset;10.2;dB', ['level offset 10.2 dB']],
    ['Preamplifier gain: compensated', ['preamplifier']],
    ['Transducer;none', []],
    ['Values not corrected for limiter', []],
    ['Ext Att;0.0;dB', []],
    ['Preamplifier;ON', []],
    ['Default transducer;ANT', []],
  ])('%s: already in the values %j', (line, what) => {
    const recognition = recognise(bytes([line, heading, ...rows(0, 20)]));
    expect(recognition.correctedFor.map((one) => one.what)).toEqual(what);
  });
});

describe('columns with holes', () => {
  it('a column that is often empty is no trace; a single hole in a full one stops the file', () => {
    const sparse = rows(0, 40).map((text, i) => `${text};${i % 4 === 0 ? '28.1' : ''}`);
    const recognition = recognise(bytes([`${heading};QP [dBuV]`, ...sparse]));
    expect(recognition).toMatchObject({ refusal: null, traces: [{ name: 'Peak' }] });
    expect(recognition.columns[2]).toMatchObject({ role: 'other', evidence: 'empty in some rows' });
    const holed = rows(0, 40).map((text, i) => `${text};${i === 17 ? '' : '28.1'}`);
    expect(recognise(bytes([`${heading};QP [dBuV]`, ...holed])).refusal?.line).toBe(19);
  });
});

it('frequencies that fall are kept in the order of the file', () => {
  const file = bytes([heading, ...rows(0, 30).reverse()]);
  const recognition = recognise(file);
  expect(recognition.frequency).toMatchObject({ ascending: false, evenStep: true, firstHz: 280_500, lastHz: 150_000 });
  expect(readSweep(file, recognition).frequencyHz[0]).toBe(280_500);
});

it('overlapping pieces: every row is kept, frequencies that come twice are counted', () => {
  const file = bytes([heading, ...rows(0, 30), ...rows(25, 60)]);
  const recognition = recognise(file);
  expect(recognition.frequency).toMatchObject({ points: 65, duplicates: 5, ascending: false, evenStep: false });
  expect(recognition.sweeps).toHaveLength(1);
  expect(Array.from(readSweep(file, recognition).frequencyHz.slice(29, 31))).toEqual([280_500, 262_500]);
});

it('a column of steady steps beside the frequencies is no level', () => {
  const file = bytes(rows(0, 30).map((text, i) => `${(i * 0.25).toFixed(2)};${text}`));
  const recognition = recognise(file);
  expect(recognition.frequency.column).toBe(1);
  expect(recognition.columns.map(({ role }) => role)).toEqual(['other', 'frequency', 'level']);
});

it('decoded text reads as the bytes do', () => {
  const file = Uint8Array.from(bytes([heading.replace('u', '\xb5'), ...rows(0, 30)], '\r\n'));
  const recognition = recognise(file);
  expect(readSweep(decode(file).text, recognition)).toEqual(readSweep(file, recognition));
});
