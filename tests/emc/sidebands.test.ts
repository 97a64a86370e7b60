import type { SeenEmission } from '@/emc/clockHarmonics';
import { findSidebands, type SwitchingConverter } from '@/emc/sidebands';

const at = (frequencyHz: number, levelDb: number, bandwidthHz = 9e3): SeenEmission => ({
  frequencyHz,
  bandwidthHz,
  levelDb,
  marginDb: null,
});
const converter: SwitchingConverter = { name: 'buck', frequencyHz: 400e3, tolerancePpm: 1_000 };
const carrier = at(100e6, 60);

describe('sidebands of a switching converter: carrier ± n·fsw (amplitude modulation, common practice)', () => {
  test('both sides of a higher carrier are found, with their order and each other as mirror', () => {
    const found = findSidebands([at(99.6e6, 40), carrier, at(100.4e6, 41), at(100.8e6, 20)], [converter], 3);
    expect(found[0]).toEqual([
      { converter: 'buck', carrier: 1, order: -1, offsetHz: 0, mirrored: true },
      { converter: 'buck', carrier: 2, order: -2, offsetHz: 0, mirrored: false },
    ]);
    expect(found[1]).toEqual([]);
    expect(found[2]![0]).toEqual({ converter: 'buck', carrier: 1, order: 1, offsetHz: 0, mirrored: true });
    // The second order has no mirror; from 100.4 MHz it is a first order without one either.
    expect(found[3]!.map(({ carrier: of, order, mirrored }) => [of, order, mirrored])).toEqual([
      [0, 3, false],
      [1, 2, false],
      [2, 1, false],
    ]);
  });

  test('half of both bandwidths and n times the tolerance are allowed, no more', () => {
    const orderAt = (hz: number) => findSidebands([carrier, at(hz, 40)], [converter], 3)[1]!.map(({ order }) => order);
    expect(orderAt(100.4e6 + 9_399)).toEqual([1]);
    expect(orderAt(100.4e6 + 9_401)).toEqual([]);
    expect(orderAt(99.2e6 - 9_799)).toEqual([-2]);
    expect(orderAt(99.2e6 - 9_801)).toEqual([]);
    expect(orderAt(101.2e6)).toEqual([3]);
    expect(orderAt(101.6e6)).toEqual([]);
  });

  test('a lower or equal emission is no carrier, and no mirror where it is higher than the carrier', () => {
    expect(findSidebands([at(100e6, 40), at(100.4e6, 40)], [converter], 1)).toEqual([[], []]);
    const [, side] = findSidebands([carrier, at(100.4e6, 40), at(99.6e6, 70)], [converter], 1);
    expect(side).toMatchObject([{ carrier: 0, order: 1, mirrored: false }]);
  });

  test('bandwidths that do not tell the switching frequency apart match nothing', () => {
    expect(findSidebands([at(100e6, 60, 120e3), at(100.4e6, 40, 120e3)], [converter], 1)).toEqual([[], []]);
    expect(findSidebands([at(100e6, 60, 40e3), at(100.4e6, 40, 40e3)], [converter], 1)[1]).toHaveLength(1);
  });

  test('what cannot be is refused by name', () => {
    expect(() => findSidebands([carrier], [converter], 0)).toThrow('0 is no order');
    expect(() => findSidebands([at(0, 1)], [], 1)).toThrow('Frequency 0 Hz');
    expect(() => findSidebands([at(1, 1, NaN)], [], 1)).toThrow('Bandwidth NaN Hz');
    const wrong = (more: Partial<SwitchingConverter>) => () =>
      findSidebands([carrier, at(1e6, 1)], [{ ...converter, ...more }], 1);
    expect(wrong({ frequencyHz: -1 })).toThrow('Switching frequency -1 Hz');
    expect(wrong({ tolerancePpm: -1 })).toThrow('buck: -1 ppm');
  });
});
