import { SweepSegment } from './sweepSegment';
import { TraceSegment } from './traceSegment';
import { Op } from 'sequelize';

/** 32768 points: an axis row is 256 KiB and a level row 128 KiB, both below the 512 KiB of a blob row. */
export const SEGMENT_POINTS = 32768;

/** Float arrays are kept little-endian, which every platform this runs on is. */
const bytesOf = (array: Float64Array | Float32Array): Buffer =>
  Buffer.from(array.buffer, array.byteOffset, array.byteLength);

function floats64(bytes: Buffer): Float64Array {
  return new Float64Array(bytes.buffer.slice(bytes.byteOffset, bytes.byteOffset + bytes.byteLength));
}
function floats32(bytes: Buffer): Float32Array {
  return new Float32Array(bytes.buffer.slice(bytes.byteOffset, bytes.byteOffset + bytes.byteLength));
}

/** Start and step when every index reproduces its frequency exactly, else null. */
export function evenAxis(frequencyHz: Float64Array): { startHz: number; stepHz: number } | null {
  if (frequencyHz.length < 2) return null;
  const startHz = frequencyHz[0]!;
  const stepHz = frequencyHz[1]! - startHz;
  for (let i = 0; i < frequencyHz.length; i++) if (frequencyHz[i] !== startHz + i * stepHz) return null;
  return { startHz, stepHz };
}

/** Lowest and highest finite value; null when there is none. */
function extremes(values: Float64Array | Float32Array): [number, number] | [null, null] {
  let low = Infinity;
  let high = -Infinity;
  for (const value of values) {
    if (!Number.isFinite(value)) continue;
    if (value < low) low = value;
    if (value > high) high = value;
  }
  return low <= high ? [low, high] : [null, null];
}

/** Writes the axis once and the levels of each trace, in file order, segment by segment. */
export async function writeTraces(
  sweepId: number,
  frequencyHz: Float64Array,
  traces: { index: number; levels: Float32Array }[],
): Promise<void> {
  for (let seq = 0, at = 0; at < frequencyHz.length; seq++, at += SEGMENT_POINTS) {
    const axis = frequencyHz.subarray(at, at + SEGMENT_POINTS);
    const [lowHz, highHz] = extremes(axis);
    const even = evenAxis(axis);
    await SweepSegment.create({
      sweepId,
      seq,
      firstIndex: at,
      points: axis.length,
      lowHz: lowHz ?? 0,
      highHz: highHz ?? 0,
      startHz: even?.startHz ?? null,
      stepHz: even?.stepHz ?? null,
      axis: even ? null : bytesOf(axis),
    });
    for (const { index, levels } of traces) {
      const part = levels.subarray(at, at + SEGMENT_POINTS);
      const [lowLevel, highLevel] = extremes(part);
      await TraceSegment.create({ sweepId, traceIndex: index, seq, lowLevel, highLevel, levels: bytesOf(part) });
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
    frequencyHz: segment.axis ? floats64(segment.axis) : evenPoints(segment),
    levels: new Map(rows.filter((row) => row.seq === segment.seq).map((row) => [row.traceIndex, floats32(row.levels)])),
  }));
}

function evenPoints({ points, startHz, stepHz }: SweepSegment): Float64Array {
  return Float64Array.from({ length: points }, (_, i) => startHz! + i * stepHz!);
}
