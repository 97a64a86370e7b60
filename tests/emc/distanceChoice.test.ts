import { lineForDistance } from '@/emc/distanceChoice';
import { limitAt } from '@/emc/limitLine';
import { lineOf, publishedLine } from './given';

const classB = () => [publishedLine('cispr32-b-re-10m'), publishedLine('cispr32-b-re-3m')];
const at = (distanceM: number | null, more = {}) =>
  lineOf([[30, 1000, 40, 40]], {
    id: `${distanceM}`,
    name: `line at ${distanceM} m`,
    distanceM,
    unit: 'dBuV/m',
    ...more,
  });

describe('the line for a measured distance', () => {
  test('a limit tabulated at the measured distance is taken as printed: 40 at 3 m, 30 at 10 m (CISPR 32:2015 class B)', () => {
    for (const [measuredM, id, limit] of [
      [3, 'cispr32-b-re-3m', 40],
      [10, 'cispr32-b-re-10m', 30],
    ] as const) {
      const choice = lineForDistance(classB(), measuredM);
      if (choice.because !== 'at-measured-distance') throw new Error(choice.because);
      expect(choice.line.id).toBe(id);
      expect(limitAt(choice.line, 100e6)).toBe(limit);
    }
  });

  test('otherwise the smallest correction: 5 m goes to 3 m, 6 m to 10 m', () => {
    expect(lineForDistance(classB(), 5)).toMatchObject({ because: 'nearest-distance', fromM: 5, toM: 3 });
    expect(lineForDistance(classB(), 6)).toMatchObject({ because: 'nearest-distance', fromM: 6, toM: 10 });
    expect(lineForDistance(classB().reverse(), 1)).toMatchObject({ fromM: 1, toM: 3 });
    expect(lineForDistance(classB(), 30)).toMatchObject({ fromM: 30, toM: 10 });
  });

  test('of two equally near the closer one, whatever the order', () => {
    const lines = [at(8), at(2)];
    expect(lineForDistance(lines, 4)).toMatchObject({ toM: 2 });
    expect(lineForDistance([...lines].reverse(), 4)).toMatchObject({ toM: 2 });
  });

  test('a millimetre per metre is the same distance, a centimetre is another', () => {
    expect(lineForDistance([at(3)], 3.003).because).toBe('at-measured-distance');
    expect(lineForDistance([at(3)], 3.01).because).toBe('nearest-distance');
  });

  test('lines without a distance are none of them', () => {
    expect(lineForDistance([], 3)).toEqual({ because: 'nothing-tabulated' });
    expect(lineForDistance([at(null)], 3)).toEqual({ because: 'nothing-tabulated' });
    expect(lineForDistance([at(null), at(10)], 3)).toMatchObject({ toM: 10 });
  });

  test('the list that was given keeps its order', () => {
    const lines = classB();
    lineForDistance(lines, 3);
    expect(lines.map((line) => line.distanceM)).toEqual([10, 3]);
  });

  test('another detector, another unit, two at one distance and no distance are refused', () => {
    expect(() => lineForDistance([at(3), at(10, { detector: 'average' })], 3)).toThrow(/not one requirement/);
    expect(() => lineForDistance([at(3), at(10, { unit: 'dBuA/m' })], 3)).toThrow(/not one requirement/);
    expect(() => lineForDistance([at(3), at(3)], 3)).toThrow('line at 3 m and line at 3 m both stand at 3 m.');
    expect(() => lineForDistance([at(3)], 0)).toThrow(new RangeError('Distance 0 m is not above zero.'));
    expect(() => lineForDistance([at(-3)], 3)).toThrow(new RangeError('Distance -3 m is not above zero.'));
  });
});
