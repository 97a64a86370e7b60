import fc from 'fast-check';
import { floorPieces } from '@/emc/floorPieces';

const RANGE = { fromHz: 30e6, toHz: 1e9, columns: 1024 };
const even = (count: number) =>
  Float64Array.from({ length: count }, (_, i) => RANGE.fromHz * (RANGE.toHz / RANGE.fromHz) ** ((i + 0.5) / count));
const layer = (frequencyHz: Float64Array, level: (i: number) => number, halfDb = 2) => ({
  frequencyHz,
  levelMin: Float32Array.from(frequencyHz, (_, i) => level(i) - halfDb),
  levelMax: Float32Array.from(frequencyHz, (_, i) => level(i) + halfDb),
});
const step = () => 60e3;

test('a flat floor is one level from end to end', () => {
  const pieces = floorPieces(
    layer(even(1024), () => 20),
    RANGE,
    step,
  );
  expect(new Set(pieces.map(({ level }) => level))).toEqual(new Set([20]));
  expect([pieces[0]!.startHz, pieces.at(-1)!.stopHz]).toEqual([30e6, 1e9]);
  for (let i = 1; i < pieces.length; i++) expect(pieces[i]!.startHz).toBe(pieces[i - 1]!.stopHz);
});

test('emissions in fewer than half of the columns are no floor', () => {
  const pieces = floorPieces(
    layer(even(1024), (i) => (i % 3 === 0 ? 60 : 20)),
    RANGE,
    step,
  );
  expect(Math.max(...pieces.map(({ level }) => level))).toBe(20);
});

test('what fills a stretch is floor there', () => {
  const pieces = floorPieces(
    layer(even(1024), (i) => (i >= 300 && i < 400 ? 45 : 20)),
    RANGE,
    step,
  );
  expect(pieces[350]!.level).toBe(45);
  expect(pieces[200]!.level).toBe(20);
});

test('a hole in the run has no floor', () => {
  const frequencyHz = even(1024).filter((hz) => hz < 100e6 || hz > 200e6);
  const pieces = floorPieces(
    layer(frequencyHz, () => 20),
    RANGE,
    step,
  );
  expect(pieces.filter(({ startHz, stopHz }) => startHz < 190e6 && stopHz > 110e6)).toEqual([]);
});

test('columns that stand apart because the step is wider than they are hang together', () => {
  const frequencyHz = Float64Array.from({ length: 40 }, (_, i) => 150e3 + i * 4.5e3);
  const range = { fromHz: 150e3, toHz: 30e6, columns: 1024 };
  const pieces = floorPieces(
    layer(frequencyHz, () => 6),
    range,
    () => 4.5e3,
  );
  for (let i = 1; i < pieces.length; i++) expect(pieces[i]!.startHz).toBe(pieces[i - 1]!.stopHz);
});

test('too few columns say nothing', () => {
  expect(
    floorPieces(
      layer(even(8), () => 20),
      RANGE,
      step,
    ),
  ).toEqual([]);
});

test('the floor never lies outside what was read', () => {
  fc.assert(
    fc.property(fc.array(fc.double({ min: -20, max: 80, noNaN: true }), { minLength: 9, maxLength: 80 }), (levels) => {
      const pieces = floorPieces(
        layer(even(levels.length), (i) => Math.fround(levels[i]!), 0),
        RANGE,
        () => 1e9,
      );
      const read = levels.map(Math.fround);
      return pieces.every(({ level }) => level >= Math.min(...read) - 1e-4 && level <= Math.max(...read) + 1e-4);
    }),
  );
});
