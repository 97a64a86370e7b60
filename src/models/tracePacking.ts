import { deflateRawSync, inflateRawSync } from 'node:zlib';

/** How the bytes of a segment were written. Rows of before there was a choice are `plain`. */
export const PACKING = { plain: 0, decimals: 1 } as const;

export interface PackedValues {
  packing: number;
  /** With a memory of its own, so that it can be handed from thread to thread. */
  bytes: Uint8Array<ArrayBuffer>;
}

/** Powers of ten that Float64 holds exactly. */
const POWERS = Float64Array.from({ length: 10 }, (_, n) => 10 ** n);
const LARGEST_WHOLE = 2 ** 50;
const INT32 = 2 ** 31;

/** Float arrays are kept little-endian, which every platform this runs on is. */
const bytesOf = (array: Float64Array | Float32Array) => new Uint8Array(array.slice().buffer);

/**
 * An axis in few bytes. Frequencies were written as decimals, so they are whole numbers over one power of ten, and
 * the change of their steps is small; it is kept only where every one of them comes back with the same bits.
 */
export function packAxis(frequencyHz: Float64Array): PackedValues {
  for (let decimals = 0; decimals < POWERS.length; decimals++) {
    const changes = stepChanges(frequencyHz, POWERS[decimals]!);
    if (changes) return { packing: PACKING.decimals, bytes: packed(decimals, changes) };
  }
  return { packing: PACKING.plain, bytes: bytesOf(frequencyHz) };
}

/** Second differences of the whole numbers, the first value as two of them; null when one does not come back. */
function stepChanges(values: Float64Array, power: number): Int32Array | null {
  const changes = new Int32Array(values.length + 1);
  let before = 0;
  let step = 0;
  for (let i = 0; i < values.length; i++) {
    const whole = Math.round(values[i]! * power);
    if (!(Math.abs(whole) < LARGEST_WHOLE) || !same(whole / power, values[i]!)) return null;
    if (i === 0) {
      changes[0] = Math.floor(whole / INT32);
      changes[1] = whole % INT32;
      if (changes[0]! * INT32 + changes[1]! !== whole) return null;
    } else {
      const change = whole - before - step;
      if (!(change >= -INT32 && change < INT32)) return null;
      changes[i + 1] = change;
      step = whole - before;
    }
    before = whole;
  }
  return changes;
}

/** Levels in few bytes: whole numbers over a power of ten, rounded to Float32 as they were, where all come back. */
export function packLevels(levels: Float32Array): PackedValues {
  for (let decimals = 0; decimals < POWERS.length; decimals++) {
    const whole = wholeLevels(levels, POWERS[decimals]!);
    if (whole) return { packing: PACKING.decimals, bytes: packed(decimals, whole) };
  }
  return { packing: PACKING.plain, bytes: bytesOf(levels) };
}

function wholeLevels(levels: Float32Array, power: number): Int32Array | null {
  const whole = new Int32Array(levels.length);
  for (let i = 0; i < levels.length; i++) {
    const value = Math.round(levels[i]! * power);
    if (!(value >= -INT32 && value < INT32) || !same(Math.fround(value / power), levels[i]!)) return null;
    whole[i] = value;
  }
  return whole;
}

/** 0 and -0 are different bits. */
function same(a: number, b: number): boolean {
  return a === b && (a !== 0 || 1 / a === 1 / b);
}

/** Byte planes of the zigzag of each value (small numbers of either sign have empty upper planes), deflated. */
function packed(decimals: number, values: Int32Array): Uint8Array<ArrayBuffer> {
  const n = values.length;
  const planes = new Uint8Array(4 * n);
  for (let i = 0; i < n; i++) {
    const value = values[i]!;
    const zigzag = (value << 1) ^ (value >> 31);
    planes[i] = zigzag;
    planes[n + i] = zigzag >>> 8;
    planes[2 * n + i] = zigzag >>> 16;
    planes[3 * n + i] = zigzag >>> 24;
  }
  const deflated = deflateRawSync(planes, { level: 1 });
  const bytes = new Uint8Array(1 + deflated.length);
  bytes[0] = decimals;
  bytes.set(deflated, 1);
  return bytes;
}

function unpacked(bytes: Uint8Array): { power: number; values: Int32Array } {
  const planes = inflateRawSync(bytes.subarray(1));
  const n = planes.length >> 2;
  const values = new Int32Array(n);
  for (let i = 0; i < n; i++) {
    const zigzag = planes[i]! | (planes[n + i]! << 8) | (planes[2 * n + i]! << 16) | (planes[3 * n + i]! << 24);
    values[i] = (zigzag >>> 1) ^ -(zigzag & 1);
  }
  return { power: POWERS[bytes[0]!]!, values };
}

/** @throws {RangeError} on a packing this build does not know */
export function unpackAxis({ packing, bytes }: { packing: number; bytes: Uint8Array }): Float64Array {
  if (packing === PACKING.plain) return new Float64Array(own(bytes));
  if (packing !== PACKING.decimals) throw new RangeError(`Packing ${packing} of an axis is not known.`);
  const { power, values } = unpacked(bytes);
  const frequencyHz = new Float64Array(values.length - 1);
  let whole = values[0]! * INT32 + values[1]!;
  let step = 0;
  for (let i = 0; i < frequencyHz.length; i++) {
    if (i > 0) whole += step += values[i + 1]!;
    frequencyHz[i] = whole / power;
  }
  return frequencyHz;
}

/** @throws {RangeError} on a packing this build does not know */
export function unpackLevels({ packing, bytes }: { packing: number; bytes: Uint8Array }): Float32Array {
  if (packing === PACKING.plain) return new Float32Array(own(bytes));
  if (packing !== PACKING.decimals) throw new RangeError(`Packing ${packing} of levels is not known.`);
  const { power, values } = unpacked(bytes);
  const levels = new Float32Array(values.length);
  for (let i = 0; i < levels.length; i++) levels[i] = values[i]! / power;
  return levels;
}

/** The driver's buffers are views of larger ones, at any offset. */
function own(bytes: Uint8Array): ArrayBuffer {
  return new Uint8Array(bytes).buffer;
}
