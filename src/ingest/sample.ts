import { afterLineEnd, type CleanBytes } from './bytes';

export interface Line {
  /** 1-based; 0 where the sample does not know it. */
  line: number;
  text: string;
  /** Byte offset of the line and of the line after it. */
  from: number;
  next: number;
}

/** Longer lines are no rows of a sweep; time rows of 65,536 columns still fit. */
export const LONGEST_LINE = 1 << 20;

export function lineEndFrom(bytes: Uint8Array, from: number): number {
  let at = from;
  while (at < bytes.length && bytes[at] !== 10 && bytes[at] !== 13) at++;
  return at;
}

const decoder = new TextDecoder('utf-8', { ignoreBOM: true });

export function textOf(bytes: Uint8Array, from: number, to: number): string {
  return decoder.decode(bytes.subarray(from, to));
}

/** Up to `most` lines from a line start on, within `bytesAtMost`. */
export function linesFrom(
  { bytes }: CleanBytes,
  from: number,
  firstLine: number,
  most: number,
  bytesAtMost = 4 * LONGEST_LINE,
): Line[] {
  const lines: Line[] = [];
  let at = from;
  for (let line = firstLine; lines.length < most && at < bytes.length && at - from < bytesAtMost; line++) {
    const end = lineEndFrom(bytes, at);
    const next = end < bytes.length ? afterLineEnd(bytes, end) : end;
    lines.push({ line, text: end - at > LONGEST_LINE ? '' : textOf(bytes, at, end), from: at, next });
    at = next;
  }
  return lines;
}

/** Enough lines to tell the shape: all of a small file, stretches of a large one. Each stretch is one run of neighbours. */
export function sampleLines(clean: CleanBytes): Line[] {
  const head = linesFrom(clean, 0, 1, 700);
  const read = head.at(-1)?.next ?? 0;
  if (read >= clean.bytes.length) return head;
  const sample = head.slice(0, 400);
  for (const share of [0.25, 0.5, 0.75, 0.98]) {
    const from = lineEndFrom(clean.bytes, Math.max(read, Math.floor(clean.bytes.length * share)));
    if (from < clean.bytes.length)
      sample.push(...linesFrom(clean, afterLineEnd(clean.bytes, from), 0, 80, LONGEST_LINE));
  }
  return sample;
}
