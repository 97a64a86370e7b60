import { factorShapes } from '@fixtures/shapes/factorShapes';
import { readFactorTable, type FactorChoice } from '@/ingest/factorTable';
import { IngestError } from '@/ingest/ingestError';
import { recognise } from '@/ingest/recognise';

const shapeOf = (name: string) => factorShapes.find((shape) => shape.name === name)!;
const recognised = (name: string) => recognise(shapeOf(name).bytes, name);
const read = (name: string, choice?: FactorChoice) => readFactorTable(shapeOf(name).bytes, recognised(name), choice);

describe('tables of corrections (own files)', () => {
  test.each(factorShapes.map(({ name }) => name))('%s is recognised as a table of corrections', (name) => {
    expect(recognised(name)).toMatchObject({ kind: 'factor-table', refusal: null });
  });

  it('a loss stays a loss; frequencies come in hertz', () => {
    const { traces } = shapeOf('factor-cable-loss.csv');
    const [table] = read('factor-cable-loss.csv');
    expect(table).toMatchObject({ name: 'Loss (dB)', quantity: 'loss', unit: 'dB', unitStated: true });
    expect(table!.valueDb).toEqual(traces[0]);
    expect(table!.frequencyHz.slice(0, 2)).toEqual([30e6, 50e6]);
  });

  it('a negative difference is a loss, turned over; its phase is no factor', () => {
    const [table, ...more] = read('factor-cable-negative.csv');
    expect(more).toEqual([]);
    expect(table).toMatchObject({ quantity: 'loss' });
    expect(table!.valueDb).toEqual(shapeOf('factor-cable-loss.csv').traces[0]);
  });

  it('antenna factors by polarisation are two tables in dB/m', () => {
    const tables = read('factor-antenna-two-polarisations.csv');
    expect(tables.map(({ name, quantity, unit }) => [name, quantity, unit])).toEqual([
      ['AF horizontal [dB/m]', 'antenna-factor', 'dB/m'],
      ['AF vertical [dB/m]', 'antenna-factor', 'dB/m'],
    ]);
    expect(tables[0]!.valueDb).toEqual(shapeOf('factor-antenna-two-polarisations.csv').traces[0]);
  });

  it('asks whether an unclear sign is loss or gain, and does not read without an answer', () => {
    expect(recognised('factor-sign-unclear.csv').questions).toMatchObject([{ key: 'lossOrGain' }]);
    expect(() => read('factor-sign-unclear.csv')).toThrow(IngestError);
    expect(read('factor-sign-unclear.csv', { lossOrGain: 'gain' })[0]).toMatchObject({ quantity: 'gain' });
    expect(read('factor-sign-unclear.csv', { quantity: 'antenna-factor' })[0]).toMatchObject({
      quantity: 'antenna-factor',
      unit: 'dB',
    });
  });

  it('stacked tables stay apart', () => {
    const recognition = recognised('factor-stacked.csv');
    expect(recognition.sweeps.map(({ name }) => name)).toEqual(['low', 'high']);
    expect(recognition.questions.map(({ key }) => key)).toEqual(['sweepIndex', 'frequencyUnit', 'lossOrGain']);
    const tables = read('factor-stacked.csv', { frequencyUnit: 'Hz', lossOrGain: 'gain' });
    expect(tables).toMatchObject([
      { name: 'low', frequencyHz: [10_000, 50_000, 200_000], valueDb: [12.2, 7.6, -0.4] },
      { name: 'high', frequencyHz: [20_000, 60_000, 900_000], valueDb: [3.5, 2.6, 1.4] },
    ]);
  });

  test.each(['factor-two-port-db.s2p', 'factor-two-port-ma.s2p', 'factor-two-port-ri.s2p'])(
    '%s: the loss is minus 20·log10|S21|, in whatever unit and form',
    (name) => {
      const [table] = read(name);
      expect(table).toMatchObject({ name: 'S21', quantity: 'loss', unit: 'dB' });
      const truth = shapeOf(name).traces[0]!;
      table!.valueDb.forEach((value, i) => expect(value).toBeCloseTo(-truth[i]!, 7));
      expect(table!.frequencyHz[0]).toBe(50e6);
      expect(table!.frequencyHz.at(-1)).toBe(2.05e9);
    },
  );

  it('frequencies that fall are turned round, ones that jump are refused', () => {
    const bytes = (text: string) => new TextEncoder().encode(text);
    const falling = bytes('MHz,Loss (dB)\n300,3\n200,2\n100,1\n');
    expect(readFactorTable(falling, recognise(falling))[0]).toMatchObject({
      frequencyHz: [100e6, 200e6, 300e6],
      valueDb: [1, 2, 3],
    });
    const jumping = bytes('Frequency (MHz),Loss (dB)\n100,1\n300,3\n200,2\n400,4\n');
    expect(() => readFactorTable(jumping, recognise(jumping))).toThrow('200000000 Hz follows 300000000 Hz');
  });
});
