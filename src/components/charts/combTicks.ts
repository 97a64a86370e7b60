import type { Span } from './scale';

export interface CombTick {
  n: number;
  hz: number;
  /** px */
  x: number;
  /** A candidate lies on this harmonic, within the tolerance. */
  near: boolean;
  numbered: boolean;
}

const MIN_TICK_PX = 1.5;
const MIN_NUMBER_PX = 16;

/** An emission belongs to a harmonic when it is within 0.05 % of it, or within half a step of the sweep. */
export function combToleranceHz(frequencyHz: number, stepHz: number | null): number {
  return Math.max(frequencyHz * 0.0005, (stepHz ?? 0) / 2);
}

/**
 * The harmonic a frequency lies on, or null. Where the harmonics are so dense that the tolerance would claim a quarter
 * of all frequencies, being near one says nothing and none is named.
 */
export function harmonicOf(frequencyHz: number, clockHz: number, toleranceHz: number): number | null {
  if (toleranceHz >= clockHz / 8) return null;
  const n = Math.round(frequencyHz / clockHz);
  return n >= 1 && Math.abs(frequencyHz - n * clockHz) <= toleranceHz ? n : null;
}

/**
 * Ticks at n × clock inside the span. Ticks that would fall on one another are thinned out; a harmonic with a candidate
 * is always kept. Numbers go to those, the worst candidate first, wherever 16 px are free.
 * @param candidatesHz candidate frequencies, worst first
 */
export function combTicks(
  clockHz: number,
  span: Span,
  x: (hz: number) => number,
  candidatesHz: readonly number[],
  stepHz: number | null,
): CombTick[] {
  if (!(clockHz > 0)) return [];
  const near = new Set<number>();
  for (const hz of candidatesHz) {
    const n = harmonicOf(hz, clockHz, combToleranceHz(hz, stepHz));
    if (n !== null) near.add(n);
  }
  const numbered = new Map<number, number>();
  for (const n of near) {
    const at = x(n * clockHz);
    if (n * clockHz < span.fromHz || n * clockHz > span.toHz) continue;
    if ([...numbered.values()].every((other) => Math.abs(other - at) >= MIN_NUMBER_PX)) numbered.set(n, at);
  }
  const ticks: CombTick[] = [];
  let drawnX = -Infinity;
  const last = Math.floor(span.toHz / clockHz);
  for (let n = Math.max(1, Math.ceil(span.fromHz / clockHz)); n <= last;) {
    const at = x(n * clockHz);
    if (near.has(n) || at - drawnX >= MIN_TICK_PX) {
      ticks.push({ n, hz: n * clockHz, x: at, near: near.has(n), numbered: numbered.has(n) });
      drawnX = at;
    }
    n = nextTick(n, at, clockHz, x, near);
  }
  return ticks;
}

/** Leaps over harmonics that share a pixel, so that a low clock over a wide span costs no more than its pixels. */
function nextTick(n: number, at: number, clockHz: number, x: (hz: number) => number, near: Set<number>): number {
  const gap = x((n + 1) * clockHz) - at;
  if (gap >= MIN_TICK_PX / 2) return n + 1;
  const leap = n + Math.max(1, Math.floor(MIN_TICK_PX / gap));
  let next = leap;
  for (const m of near) if (m > n && m < next) next = m;
  return next;
}
