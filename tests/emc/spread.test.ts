import { spreadOf } from '@/emc/spread';

const sample = (sampleId: string, ...levels: (number | null)[]) => ({ sampleId, levels });

test('per frequency: how many, mean, deviation and the highest with its sample', () => {
  const spread = spreadOf([30e6, 40e6], [sample('S-1', 30, 22), sample('S-2', 34, 21), sample('S-3', 32, 20)]);
  expect(spread).toEqual([
    { frequencyHz: 30e6, n: 3, mean: 32, deviation: 2, worst: { sampleId: 'S-2', level: 34 } },
    { frequencyHz: 40e6, n: 3, mean: 21, deviation: 1, worst: { sampleId: 'S-1', level: 22 } },
  ]);
});

test('an absent level is left out, and what nobody has is null', () => {
  const spread = spreadOf([1, 2, 3], [sample('S-1', -5, null, null), sample('S-2', -9, -7, null)]);
  expect(spread[0]).toMatchObject({ n: 2, mean: -7, worst: { sampleId: 'S-1', level: -5 } });
  expect(spread[1]).toEqual({ frequencyHz: 2, n: 1, mean: -7, deviation: null, worst: { sampleId: 'S-2', level: -7 } });
  expect(spread[2]).toEqual({ frequencyHz: 3, n: 0, mean: null, deviation: null, worst: null });
});

test('of equal levels the first sample is named', () => {
  expect(spreadOf([1], [sample('S-2', 4), sample('S-1', 4)])[0]!.worst).toEqual({ sampleId: 'S-2', level: 4 });
});

test('a sample with too many or too few levels, one twice, and a level that is none are refused by name', () => {
  expect(() => spreadOf([1, 2], [sample('S-1', 4)])).toThrow('S-1 has 1 levels for 2');
  expect(() => spreadOf([1], [sample('S-1', 4, 5)])).toThrow(RangeError);
  expect(() => spreadOf([1], [sample('S-1', 4), sample('S-1', 5)])).toThrow('S-1 is there twice');
  expect(() => spreadOf([1], [sample('S-1', NaN)])).toThrow('NaN');
});

test('without samples every frequency says so', () => {
  expect(spreadOf([1], [])).toEqual([{ frequencyHz: 1, n: 0, mean: null, deviation: null, worst: null }]);
});
