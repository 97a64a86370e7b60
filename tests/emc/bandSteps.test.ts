import { stepCollector } from '@/emc/bandSteps';
import { bandParts } from '@/emc/cisprBands';

const swept = (startHz: number, stepHz: number, points: number) =>
  Float64Array.from({ length: points }, (_, i) => startHz + i * stepHz);
const steps = (parts: { fromHz: number; toHz: number }[], bandwidthHz: number, ...pieces: Float64Array[]) => {
  const collector = stepCollector(parts, bandwidthHz);
  for (const piece of pieces) collector.add(piece);
  return collector.finish();
};

describe('largest step per band', () => {
  test('a sweep in two settings that repeats 30 MHz has each band its own', () => {
    const low = swept(150e3, 4.5e3, 6634);
    const high = swept(30e6, 60e3, 4501);
    expect(steps(bandParts(150e3, 300e6), 9e3, low, high)).toEqual([4.5e3, 60e3]);
  });
  test('the pieces a sweep is stored in leave no step out, and add none', () => {
    const whole = swept(30e6, 50e3, 5000);
    const pieces = [whole.slice(0, 17), whole.slice(17, 18), whole.slice(18, 2000), whole.slice(2000)];
    const [part] = bandParts(30e6, 279.95e6);
    expect(steps([part!], 120e3, ...pieces)).toEqual(steps([part!], 120e3, whole));
    expect(steps([part!], 120e3, ...pieces)).toEqual([50e3]);
  });
  test('a wider step between two pieces counts', () => {
    const [part] = bandParts(30e6, 200e6);
    expect(steps([part!], 120e3, swept(30e6, 50e3, 100), swept(30e6 + 99 * 50e3 + 110e3, 50e3, 100))[0]).toBeCloseTo(
      110e3,
      3,
    );
  });
  test('neither a hole nor the way back to the start of a second pass is a step', () => {
    const [part] = bandParts(30e6, 200e6);
    expect(steps([part!], 120e3, swept(30e6, 50e3, 200), swept(80e6, 50e3, 200))).toEqual([50e3]);
    expect(steps([part!], 120e3, swept(30e6, 50e3, 200), swept(30e6, 50e3, 200))).toEqual([50e3]);
  });
  test('a falling axis has the steps of the rising one', () => {
    const [part] = bandParts(30e6, 40e6);
    expect(steps([part!], 120e3, swept(30e6, 50e3, 200).reverse())).toEqual([50e3]);
  });
  test('between spot readings nothing was swept', () => {
    const [part] = bandParts(30e6, 40e6);
    expect(steps([part!], 120e3, Float64Array.of(31e6, 33e6, 38e6))).toEqual([null]);
  });
});
