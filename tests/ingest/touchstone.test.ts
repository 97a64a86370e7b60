import fc from 'fast-check';
import { settleFactor } from '@/ingest/factorTable';
import { IngestError } from '@/ingest/ingestError';
import { portsByName, readTouchstone } from '@/ingest/touchstone';
import { touchstoneColumn, touchstoneQuestions } from '@/ingest/touchstoneColumn';
import { TouchstoneError } from '@/ingest/touchstoneWords';

const DATA = '100 0.1 10 0.5 -90 0.5 -90 0.2 5\n200 0.1 11 0.25 -180 0.25 -180 0.2 6\n';
const two = (text: string) => readTouchstone(text, 2);

function refusal(text: string, ports: 1 | 2 = 2): TouchstoneError {
  try {
    readTouchstone(text, ports);
  } catch (error) {
    if (error instanceof TouchstoneError) return error;
    throw error;
  }
  throw new Error('was read');
}

describe('network-parameter files (Touchstone file format specification, revision 1.1; own samples)', () => {
  test.each([
    ['Hz', 100, 200],
    ['kHz', 100e3, 200e3],
    ['MHz', 100e6, 200e6],
    ['GHz', 100e9, 200e9],
  ])('frequencies in %s come in hertz', (unit, ...hz) => {
    expect(two(`# ${unit} S MA R 50\n${DATA}`).frequencyHz).toEqual(hz);
    expect(two(`# ${unit.toUpperCase()} S MA R 50\n${DATA}`).frequencyHz).toEqual(hz);
  });

  test('a written decimal moves exactly', () => {
    expect(two('# MHz\n30.075 1 0 1 0 1 0 1 0').frequencyHz).toEqual([30_075_000]);
    expect(two('# GHz\n2.05e-1 1 0 1 0 1 0 1 0').frequencyHz).toEqual([205_000_000]);
  });

  test('the second pair is S21 in magnitude and angle; the first S11', () => {
    const { s11, s21 } = two(`# MHz S MA R 50\n${DATA}`);
    expect(s21!.magnitudeDb[0]).toBeCloseTo(-6.0206, 4);
    expect(s21!.magnitudeDb[1]).toBeCloseTo(-12.0412, 4);
    expect(s21!.phaseDeg).toEqual([-90, -180]);
    expect(s11.magnitudeDb[0]).toBeCloseTo(-20, 12);
    expect(s11.phaseDeg).toEqual([10, 11]);
  });

  test('decibels stand as they are; real and imaginary part are turned into magnitude and angle', () => {
    const { s21 } = two('# S DB MHz\n1 -20 0 -3.25 45 -3 0 -20 0');
    expect(s21).toEqual({ magnitudeDb: [-3.25], phaseDeg: [45] });
    const ri = two('# S RI MHz\n1 0 0 -0.3 0.4 0 0 0 0').s21!;
    expect(ri.magnitudeDb[0]).toBeCloseTo(20 * Math.log10(0.5), 12);
    expect(ri.phaseDeg[0]).toBeCloseTo(126.8699, 4);
  });

  test('one network in three formats reads the same (property)', () => {
    const part = fc.double({ min: -1, max: 1, noNaN: true }).filter((value) => Math.abs(value) > 1e-6);
    fc.assert(
      fc.property(part, part, (real, imaginary) => {
        const magnitude = Math.hypot(real, imaginary);
        const angle = (Math.atan2(imaginary, real) * 180) / Math.PI;
        const of = (format: string, a: number, b: number) => two(`# ${format}\n1 1 0 ${a} ${b} 1 0 1 0`).s21!;
        const ri = of('RI', real, imaginary);
        for (const other of [of('MA', magnitude, angle), of('DB', 20 * Math.log10(magnitude), angle)]) {
          expect(other.magnitudeDb[0]).toBeCloseTo(ri.magnitudeDb[0]!, 9);
          expect(other.phaseDeg[0]).toBeCloseTo(ri.phaseDeg[0]!, 9);
        }
      }),
    );
  });

  test('# alone is GHz S MA R 50, and words come in any order and case', () => {
    const plain = two(`#\n${DATA}`);
    expect(plain).toEqual(two(`# r 50 ma s ghz\n${DATA}`));
    expect(plain).toMatchObject({ frequencyHz: [100e9, 200e9], referenceOhm: 50, ports: 2 });
    expect(two(`#MHz S MA R 75\n${DATA}`)).toMatchObject({ frequencyHz: [100e6, 200e6], referenceOhm: 75 });
  });

  test('comments, empty lines, any line end and a later option line change nothing', () => {
    const plain = two(`# MHz S MA R 50\n${DATA}`);
    const [first, second] = DATA.trimEnd().split('\n');
    const text = `\ufeff! cable 7\n\n  # MHz S MA R 50 ! as measured\n${first} ! low\n!\n# Hz S RI\n\t${second}`;
    for (const end of ['\n', '\r\n', '\r']) expect(two(text.replaceAll('\n', end))).toEqual(plain);
  });

  test('a row may be wrapped over lines', () => {
    const wrapped = DATA.replaceAll(' 0.5 -90 0.2', '\n  0.5 -90\n0.2');
    expect(wrapped.split('\n')).toHaveLength(5);
    expect(two(`# MHz\n${wrapped}`)).toEqual(two(`# MHz\n${DATA}`));
  });

  test('a one-port file has S11 and no S21, and is no table of corrections', () => {
    const file = readTouchstone('# MHz S DB R 50\n1 -20 5\n2 -18 6', 1);
    expect(file).toMatchObject({ ports: 1, s11: { magnitudeDb: [-20, -18], phaseDeg: [5, 6] }, s21: null });
    expect(() => touchstoneColumn(file)).toThrow('a one-port file. Only S21');
  });

  test('noise parameters after the data are left out', () => {
    expect(two(`# MHz\n${DATA}! noise\n100 1.2 0.3 40 0.4\n150 1.3 0.3 41 0.4\n`)).toEqual(two(`# MHz\n${DATA}`));
    // It may begin at the very frequency at which the data end.
    expect(two(`# MHz\n${DATA}200 1.2 0.3 40 0.4\n`)).toEqual(two(`# MHz\n${DATA}`));
    // Nine such rows are as many numbers as five rows of data.
    const noise = Array.from({ length: 9 }, (_, i) => `${100 + i} 1 0.3 40 0.4\n`).join('');
    expect(two(`# MHz\n${DATA}${noise}`)).toEqual(two(`# MHz\n${DATA}`));
  });

  test('a magnitude of zero has no decibels', () => {
    const file = two('# MHz\n1 0 0 0 0 1 0 1 0');
    expect(file.s11.magnitudeDb).toEqual([null]);
    expect(() => touchstoneColumn(file)).toThrow('S21 is zero at 1000000 Hz');
    expect(two('# MHz RI\n1 0 0 0 0 1 0 1 0').s21!.magnitudeDb).toEqual([null]);
  });

  test.each([
    ['no option line at all', '! only words\n', null, null, 'no option line'],
    ['numbers before the option line', `! a\n${DATA}# MHz\n`, 2, 1, 'numbers without an option line'],
    ['no rows', '# MHz\n! none\n', null, null, 'no rows of numbers'],
    ['a word that is no option', '# MHz S XX R 50\n', 1, 9, '“XX” is no option'],
    ['other parameters', '# MHz Z MA R 50\n', 1, 7, 'Z parameters'],
    ['R without a figure', '# MHz S MA R\n', 1, 12, 'R without a resistance'],
    ['R of nothing', '# MHz S MA R 0\n', 1, 14, 'R without a resistance'],
    ['R of a word', '# MHz S MA R ohm\n', 1, 14, '“ohm” is no number'],
    ['version 2', '[Version] 2.0\n# GHz\n', 1, 1, 'version 2'],
    ['a decimal comma', '# MHz\n1 0,1 0 1 0 1 0 1 0\n', 2, 3, '“0,1” is no number'],
    ['a word among numbers', '# MHz\n1 1 0 1 0 1 0 1 0\n2 1 0  x 0 1 0 1 0\n', 3, 8, '“x” is no number'],
    ['a number that is none', '# MHz\n1 1 0 1 0 NaN 0 1 0\n', 2, 11, '“NaN” is no number'],
    ['a row that breaks off', `# MHz\n${DATA}300 1 0\n`, 4, 7, 'breaks off after 3 of 9 numbers'],
    ['a frequency that falls', '# MHz\n2 1 0 1 0 1 0 1 0\n 1 1 0 1 0 1 0 1 0\n', 3, 2, '1 does not rise'],
    ['a frequency that stands twice', '# MHz\n2 1 0 1 0 1 0 1 0\n2 1 0 1 0 1 0 1 0\n', 3, 1, '2 does not rise'],
    ['a frequency below zero', '# MHz\n-2 1 0 1 0 1 0 1 0\n', 2, 1, '-2 is no frequency'],
    ['a magnitude below zero', '# MHz\n2 1 0 -1 0 1 0 1 0\n', 2, 7, 'S21 of -1'],
    ['a broken word of noise', `# MHz\n${DATA}100 1.2 0.3 40 x\n`, 4, 16, '“x” is no number'],
  ] as [string, string, number | null, number | null, string][])(
    '%s is refused where it stands',
    (_, text, line, column, found) => {
      const error = refusal(text);
      expect(error).toBeInstanceOf(IngestError);
      expect([error.line, error.column]).toEqual([line, column]);
      expect(error.message).toContain(found);
      if (line !== null) expect(error.message).toMatch(new RegExp(`^Line ${line}, column ${column}: `));
      expect(error.expected).not.toBe('');
    },
  );

  test('a two-port file is not read as a one-port, nor the other way round', () => {
    expect(refusal(`# MHz\n${DATA}`, 1).message).toContain('does not rise');
    expect(refusal('# MHz\n1 0.1 10\n2 0.1 11\n').message).toContain('breaks off after 6 of 9');
  });

  test('whatever stands there is read or refused, never thrown otherwise (property)', () => {
    const piece = fc.constantFrom('#', 'MHz', 'S', 'DB', 'R', '50', '1', '2', '-3.5', '1e3', '!', '\n', 'x', '[', ',');
    fc.assert(
      fc.property(fc.array(piece, { maxLength: 40 }), fc.constantFrom<1 | 2>(1, 2), (pieces, ports) => {
        try {
          const file = readTouchstone(pieces.join(' '), ports);
          expect(file.s11.magnitudeDb).toHaveLength(file.frequencyHz.length);
        } catch (error) {
          expect(error).toBeInstanceOf(TouchstoneError);
        }
      }),
    );
  });

  test('the number of ports is in the ending of the name', () => {
    expect(['a.s2p', 'B.S1P', 'c.s4p', 's2p', 'd.s2p.csv'].map(portsByName)).toEqual([2, 1, null, null, null]);
  });
});

describe('S21 as a table of corrections', () => {
  const column = (db: number[]) =>
    touchstoneColumn(two(`# MHz S DB\n${db.map((value, i) => `${i + 1} -20 0 ${value} 0 -1 0 -20 0`).join('\n')}`));

  test('figures at or below zero are a loss, turned over, and nothing is asked', () => {
    const table = column([0, -1.5, -2]);
    expect(table).toMatchObject({ name: 'S21', frequencyHz: [1e6, 2e6, 3e6], writtenDb: [0, -1.5, -2], unit: 'dB' });
    expect(touchstoneQuestions(table)).toEqual([]);
    expect(settleFactor(table)).toEqual({ quantity: 'loss', negated: true, valueDb: [0, 1.5, 2] });
  });

  test.each([
    ['above', [20, 21]],
    ['partly above', [-1, 21]],
  ])('figures %s zero are asked for, and not settled without an answer', (said, db) => {
    const table = column(db);
    expect(touchstoneQuestions(table)).toMatchObject([{ key: 'lossOrGain', proposal: 'gain' }]);
    expect(touchstoneQuestions(table)[0]!.text).toContain(`“S21” is ${said} 0 dB`);
    expect(settleFactor(table)).toBeNull();
    expect(settleFactor(table, { lossOrGain: 'gain' })).toMatchObject({ quantity: 'gain', valueDb: db });
    expect(settleFactor(table, { lossOrGain: 'loss' })).toMatchObject({ quantity: 'loss', valueDb: db });
  });

  test('0 dB everywhere is the same either way and is not asked', () => {
    const table = column([0, 0]);
    expect(touchstoneQuestions(table)).toEqual([]);
    expect(settleFactor(table)!.valueDb).toEqual([0, 0]);
  });
});
