import { Op } from 'sequelize';
import { SweepSegment } from './sweepSegment';
import { unpackAxis, unpackLevels } from './tracePacking';
import { TraceSegment } from './traceSegment';
import type { Segment } from './traceSegments';

/** Writes segments of a sweep, the first of them with number `firstSeq`; call it once per transaction of a few. */
export async function writeSegments(sweepId: number, segments: readonly Segment[], firstSeq: number): Promise<void> {
  for (const [i, { even, axis, traces, ...range }] of segments.entries()) {
    const seq = firstSeq + i;
    await SweepSegment.create({
      sweepId,
      seq,
      ...range,
      startHz: even?.startHz ?? null,
      stepHz: even?.stepHz ?? null,
      packing: axis?.packing ?? 0,
      axis: axis && Buffer.from(axis.bytes.buffer),
    });
    for (const { index, lowLevel, highLevel, levels } of traces) {
      const { packing, bytes } = levels;
      const row = { sweepId, traceIndex: index, seq, lowLevel, highLevel, packing, levels: Buffer.from(bytes.buffer) };
      await TraceSegment.create(row);
    }
  }
}

export interface StoredPiece {
  firstIndex: number;
  frequencyHz: Float64Array;
  levels: Map<number, Float32Array>;
}

/** Segments that touch a range of frequency, in file order; the whole sweep without one. */
export async function readPieces(sweepId: number, range?: { fromHz: number; toHz: number }): Promise<StoredPiece[]> {
  const touching = range && { highHz: { [Op.gte]: range.fromHz }, lowHz: { [Op.lte]: range.toHz } };
  const segments = await SweepSegment.findAll({ where: { sweepId, ...touching }, order: [['seq', 'ASC']] });
  const rows = await TraceSegment.findAll({ where: { sweepId, seq: segments.map((segment) => segment.seq) } });
  return segments.map((segment) => ({
    firstIndex: segment.firstIndex,
    frequencyHz: axisOf(segment),
    levels: new Map(
      rows
        .filter((row) => row.seq === segment.seq)
        .map(({ traceIndex, packing, levels }) => [traceIndex, unpackLevels({ packing, bytes: levels })]),
    ),
  }));
}

/** The axis of a sweep in file order, each piece unpacked when it is asked for. */
export async function readAxis(sweepId: number): Promise<(() => Float64Array)[]> {
  const segments = await SweepSegment.findAll({ where: { sweepId }, order: [['seq', 'ASC']] });
  return segments.map((segment) => () => axisOf(segment));
}

/** The highest reading of each trace as it was read, by trace index; a trace without any reading is not there. */
export async function highestReadings(sweepId: number): Promise<Map<number, number>> {
  const rows = await TraceSegment.findAll({ where: { sweepId }, attributes: ['traceIndex', 'seq', 'highLevel'] });
  const highest = new Map<number, number>();
  for (const { traceIndex, highLevel } of rows) {
    if (highLevel !== null) highest.set(traceIndex, Math.max(highLevel, highest.get(traceIndex) ?? -Infinity));
  }
  return highest;
}

function axisOf({ points, startHz, stepHz, packing, axis }: SweepSegment): Float64Array {
  if (axis) return unpackAxis({ packing, bytes: axis });
  return Float64Array.from({ length: points }, (_, i) => startHz! + i * stepHz!);
}
