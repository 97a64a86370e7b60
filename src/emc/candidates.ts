import type { Purpose } from './kinds';
import { limitsInto, type PreparedLine } from './limitLine';
import type { PairPoints } from './pair';
import type { Found } from './search';
import { judgeSegment, type HungTrace } from './segment';
import type { Candidate, Trace } from './types';
import { readingVerdict, severity } from './verdict';

/** The list is filled up with the nearest others to this many; candidates not proven under are listed however many. */
export const LISTED_AT_LEAST = 12;

/** A candidate before it has its place in the list. */
export type Unranked = Omit<Candidate, 'rank'>;

/** The points found for one trace against one line, as candidates. Throws nothing: they were judged before. */
export function candidatesOf(
  found: Found,
  trace: Trace,
  hung: HungTrace,
  prepared: PreparedLine,
  pair: PairPoints,
  { purpose, partial }: { purpose: Purpose; partial?: boolean },
): { open: Unranked[]; others: Unranked[] } {
  const { line } = prepared;
  const peak = (point: number) => ({ kind: 'peak' as const, point, from: point, to: point });
  const floors = found.floors.map(({ from, to, worst }) => ({
    kind: 'floor' as const,
    point: worst,
    from,
    to: to - 1,
  }));
  const places = [...found.peaks.map(peak), ...floors, ...found.others.map(peak)];

  const frequencyHz = Float64Array.from(places, ({ point }) => trace.frequencyHz[point]!);
  const { level, logHz } = judgeSegment(
    hung,
    frequencyHz,
    Float32Array.from(places, ({ point }) => trace.reading[point]!),
  );
  const limit = new Float64Array(places.length);
  limitsInto(prepared, frequencyHz, logHz, limit, new Uint8Array(places.length));

  const listed = places.map(({ kind, point, from, to }, i): Unranked => {
    const edges = [trace.frequencyHz[from]!, trace.frequencyHz[to]!] as const;
    const facts = { marginDb: pair.marginDb[point]!, uncertaintyDb: pair.uncertaintyDb[point]! };
    const verdict = readingVerdict({
      ...facts,
      guard: { db: pair.guardDb[point]!, between: pair.between },
      detector: trace.detector,
      rbwHz: trace.rbwHz,
      vbwHz: trace.vbwHz,
      rbwShape: trace.rbwShape,
      lineDetector: line.detector,
      requiredBandwidthHz: line.bandwidthHz,
      purpose,
      partial,
    });
    return {
      kind,
      traceIndex: trace.index,
      lineId: line.id,
      frequencyHz: frequencyHz[i]!,
      fromHz: Math.min(...edges),
      toHz: Math.max(...edges),
      reading: trace.reading[point]!,
      level: level[i]!,
      limit: limit[i]!,
      ...facts,
      ...verdict,
    };
  });
  const open = found.peaks.length + found.floors.length;
  return { open: listed.slice(0, open), others: listed.slice(open) };
}

/**
 * The list as it is numbered: everything not proven under, filled up with the nearest others to 12 in total; worst
 * verdict first, then smallest margin, then by frequency, trace and line so that the order never depends on chance.
 * One frequency of a trace against one line is listed once, with the smallest of its margins; see `onePerPlace`.
 */
export function rankCandidates(open: readonly Unranked[], others: readonly Unranked[]): Candidate[] {
  const places = onePerPlace([
    ...open.map((candidate) => ({ candidate, isOpen: true })),
    ...others.map((candidate) => ({ candidate, isOpen: false })),
  ]);
  const listed = places.filter(({ isOpen }) => isOpen).map(({ candidate }) => candidate);
  const nearest = places.filter(({ isOpen }) => !isOpen).map(({ candidate }) => candidate);
  const fill = nearest.sort(worseFirst).slice(0, Math.max(0, LISTED_AT_LEAST - listed.length));
  return [...listed, ...fill].sort(worseFirst).map((candidate, i) => ({ rank: i + 1, ...candidate }));
}

/**
 * Two passes over one range, or joined pieces, can find the same frequency twice. It is one place: the smallest margin
 * governs, a stretch of floor stays a stretch, and stretches found at it are one.
 */
function onePerPlace(
  found: readonly { candidate: Unranked; isOpen: boolean }[],
): { candidate: Unranked; isOpen: boolean }[] {
  const places = new Map<string, { candidate: Unranked; isOpen: boolean }>();
  for (const one of found) {
    const { traceIndex, lineId, frequencyHz } = one.candidate;
    const key = `${traceIndex} ${frequencyHz} ${lineId}`;
    const before = places.get(key);
    if (!before) places.set(key, one);
    else
      places.set(key, { candidate: samePlace(before.candidate, one.candidate), isOpen: before.isOpen || one.isOpen });
  }
  return [...places.values()];
}

function samePlace(a: Unranked, b: Unranked): Unranked {
  const worst = b.marginDb < a.marginDb ? b : a;
  const kind = a.kind === 'floor' || b.kind === 'floor' ? 'floor' : 'peak';
  return { ...worst, kind, fromHz: Math.min(a.fromHz, b.fromHz), toHz: Math.max(a.toHz, b.toHz) };
}

function worseFirst(a: Unranked, b: Unranked): number {
  return (
    severity(a.verdict) - severity(b.verdict) ||
    a.marginDb - b.marginDb ||
    a.frequencyHz - b.frequencyHz ||
    a.traceIndex - b.traceIndex ||
    (a.lineId < b.lineId ? -1 : a.lineId > b.lineId ? 1 : 0)
  );
}
