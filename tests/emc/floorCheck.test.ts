import receiver from '@fixtures/published/receiver.json';
import fc from 'fast-check';
import { FLOOR_BELOW_LIMIT_DB, floorFinding, type FloorPiece } from '@/emc/floorCheck';
import { limitAt } from '@/emc/limitLine';
import { lineOf, publishedLine } from './given';

const piece = (startMhz: number, stopMhz: number, level: number): FloorPiece => ({
  startHz: startMhz * 1e6,
  stopHz: stopMhz * 1e6,
  level,
});
const flat = lineOf([
  [30, 230, 40, 40],
  [230, 1000, 47, 47],
]);
const mains = publishedLine('cispr32-b-ce-qp');

describe('noise floor against the limit', () => {
  test('it is asked to lie 6 dB below (CISPR 16-2-3, ANSI C63.4, CISPR 11; from memory)', () => {
    expect(FLOOR_BELOW_LIMIT_DB).toBe(receiver.noiseAndAmbient.db);
    const found = floorFinding(flat, [piece(30, 1000, 34)]);
    expect(found).toMatchObject({
      outcome: 'ok',
      fromHz: 30e6,
      toHz: 1e9,
      figures: { askedDb: 6, leastDistanceDb: 6, leastAtHz: 30e6, tooHigh: [], notKnown: [] },
    });
  });

  test('where it lies nearer, the range is named, up to the edge of the limit', () => {
    const found = floorFinding(flat, [piece(30, 1000, 34.01)]);
    expect(found.outcome).toBe('fails');
    expect(found.figures.tooHigh).toEqual([{ fromHz: 30e6, toHz: 230e6 }]);
    expect(found.figures.leastDistanceDb).toBeCloseTo(5.99, 9);
  });

  test('ranges follow the pieces and join where they touch', () => {
    const found = floorFinding(flat, [piece(30, 50, 0), piece(50, 80, 36), piece(80, 300, 39), piece(300, 1000, 42)]);
    expect(found.figures.tooHigh).toEqual([
      { fromHz: 50e6, toHz: 230e6 },
      { fromHz: 300e6, toHz: 1000e6 },
    ]);
    expect(found.figures.leastAtHz).toBe(80e6);
  });

  test('a sloping limit comes nearer at one frequency: 55 dBuV of floor under 66 to 56 dBuV from 61 dBuV on (class B mains)', () => {
    const found = floorFinding(mains, [piece(0.15, 0.5, 55), piece(0.5, 30, 40)]);
    const [range, ...others] = found.figures.tooHigh;
    expect(others).toEqual([]);
    // 61 dBuV at 0.273861 MHz is a published point of this line
    expect(range!.fromHz / 1e6).toBeCloseTo(0.273861, 6);
    expect(range!.toHz).toBe(500e3);
    expect(found.figures.leastDistanceDb).toBeCloseTo(1, 9);
    expect(found.figures.leastAtHz).toBe(500e3);
  });

  test('a piece that ends within a slope is held against the limit there: 60.2428 dBuV at 0.3 MHz (class B mains)', () => {
    const { leastDistanceDb, leastAtHz } = floorFinding(mains, [piece(0.2, 0.3, 50)]).figures;
    expect(leastDistanceDb).toBeCloseTo(10.2428, 4);
    expect(leastAtHz).toBe(300e3);
  });

  test('a rising limit and one straight in frequency are near below their crossing', () => {
    const rising = lineOf([[30, 300, 45, 55]]);
    const straight = { ...rising, segments: rising.segments.map((s) => ({ ...s, over: 'linear-frequency' as const })) };
    const floor = [piece(30, 300, 44)];
    const crossing = (line: typeof rising) => floorFinding(line, floor).figures.tooHigh;
    expect(crossing(rising)[0]!.fromHz).toBe(30e6);
    expect(crossing(rising)[0]!.toHz / 1e6).toBeCloseTo(30 * Math.sqrt(10), 6);
    expect(crossing(straight)).toEqual([{ fromHz: 30e6, toHz: 165e6 }]);
  });

  test('where no floor is stated it is unknown, unless it fails elsewhere', () => {
    const found = floorFinding(flat, [piece(30, 200, 10), piece(300, 900, 10)]);
    expect(found).toMatchObject({
      outcome: 'unknown',
      because: 'No floor is stated for a part of the line.',
      figures: {
        notKnown: [
          { fromHz: 200e6, toHz: 300e6 },
          { fromHz: 900e6, toHz: 1000e6 },
        ],
      },
    });
    expect(floorFinding(flat, [piece(30, 200, 39)])).toMatchObject({ outcome: 'fails', because: null });
    expect(floorFinding(flat, []).figures).toMatchObject({ leastDistanceDb: null, leastAtHz: null });
    expect(floorFinding(flat, []).outcome).toBe('unknown');
  });

  test('of overlapping pieces the higher floor governs, of overlapping segments the lower limit', () => {
    expect(floorFinding(flat, [piece(30, 1000, 10), piece(100, 150, 35)]).figures.tooHigh).toEqual([
      { fromHz: 100e6, toHz: 150e6 },
    ]);
    const overlapping = lineOf([
      [30, 300, 50, 50],
      [100, 150, 40, 40],
    ]);
    expect(floorFinding(overlapping, [piece(30, 300, 36)]).figures.tooHigh).toEqual([{ fromHz: 100e6, toHz: 150e6 }]);
  });

  test('inside a range the distance is below 6 dB and outside it is not (property, class B mains)', () => {
    const level = fc.double({ min: 30, max: 70, noNaN: true });
    const hertz = fc.double({ min: 150e3, max: 30e6, noNaN: true });
    fc.assert(
      fc.property(level, hertz, (floor, hz) => {
        const distanceDb = limitAt(mains, hz)! - floor;
        fc.pre(Math.abs(distanceDb - 6) > 1e-6 && ![500e3, 5e6].includes(hz));
        const { tooHigh, leastDistanceDb } = floorFinding(mains, [piece(0.15, 30, floor)]).figures;
        expect(tooHigh.some(({ fromHz, toHz }) => fromHz <= hz && hz <= toHz)).toBe(distanceDb < 6);
        expect(leastDistanceDb!).toBeLessThanOrEqual(distanceDb + 1e-9);
      }),
    );
  });

  test('a piece that is no range or no level is refused', () => {
    expect(() => floorFinding(flat, [piece(50, 50, 10)])).toThrow(/is no range/);
    expect(() => floorFinding(flat, [piece(30, 50, NaN)])).toThrow(/NaN from 30000000 Hz is no level/);
    expect(() => floorFinding({ ...flat, segments: [] }, [])).toThrow(RangeError);
  });
});
