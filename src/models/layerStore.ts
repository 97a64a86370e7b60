import type { Columns } from '@/emc/types';
import { EvaluationLayer } from './evaluationLayer';

/** A layer as bytes: frequencies (8 each), then four runs of Float32, then one byte of `hasMargin` per column. */
function pack(columns: Columns): Buffer {
  const { frequencyHz, levelMin, levelMax, marginMin, marginMax, hasMargin } = columns;
  const parts = [frequencyHz, levelMin, levelMax, marginMin, marginMax, hasMargin];
  return Buffer.concat(parts.map((part) => Buffer.from(part.buffer, part.byteOffset, part.byteLength)));
}

function unpack(count: number, bytes: Buffer): Columns {
  let at = bytes.byteOffset;
  const take = (size: number) => bytes.buffer.slice(at, (at += size * count));
  const frequencyHz = new Float64Array(take(8));
  const [levelMin, levelMax, marginMin, marginMax] = [0, 1, 2, 3].map(() => new Float32Array(take(4))) as [
    Float32Array,
    Float32Array,
    Float32Array,
    Float32Array,
  ];
  return { frequencyHz, levelMin, levelMax, marginMin, marginMax, hasMargin: new Uint8Array(take(1)) };
}

export async function writeLayers(evaluationId: number, layers: { index: number; layer: Columns }[]): Promise<void> {
  for (const { index, layer } of layers) {
    const columns = layer.frequencyHz.length;
    await EvaluationLayer.create({ evaluationId, traceIndex: index, columns, layer: pack(layer) });
  }
}

/** The whole-range layers of an evaluation by trace index. */
export async function readLayers(evaluationId: number): Promise<{ index: number; layer: Columns }[]> {
  const rows = await EvaluationLayer.findAll({ where: { evaluationId }, order: [['traceIndex', 'ASC']] });
  return rows.map((row) => ({ index: row.traceIndex, layer: unpack(row.columns, row.layer) }));
}
