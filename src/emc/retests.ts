import { apartHz, isOneEmission, peaksByFrequency, type Place, type Sighting } from './emissions';
import { without, type Interval } from './intervals';
import type { MainsLine, Polarisation, Port, Verdict } from './kinds';
import { heightMissing, leftOpen, type PortRun } from './port';
import type { CoverageGap } from './types';
import { severity } from './verdict';

export type RetestPosition = Polarisation | MainsLine | null;

/** A listed candidate of a run, with the bandwidth it was read in. */
export interface Reading extends Sighting {
  lineId: string;
  frequencyHz: number;
}

/** A run that speaks for its state. `lineId` means the stable key of a line here, whatever its revision. */
export interface RetestRun<R extends Reading = Reading> extends PortRun {
  id: number;
  readings: readonly R[];
  lines: readonly { id: string; name: string; asked: readonly Interval[] }[];
  /** Frequencies of a final made of single points, which cover no range; empty otherwise. */
  spotsHz: readonly number[];
}

/**
 * How an emission stands at one position, from worst to best. `waits`: somebody has to measure it. `silent`: nothing of
 * this state has looked there. `contradicted`: over in a prescan and not in a final. `one-height`: under, but an
 * antenna at one height proves nothing about the others.
 */
export const STANDINGS = ['waits', 'silent', 'contradicted', 'over', 'inconclusive', 'one-height', 'under'] as const;
export type Standing = (typeof STANDINGS)[number];

export interface Stands<R extends Reading = Reading> {
  standing: Standing;
  position: RetestPosition;
  /** The runs that made it so, oldest first. */
  runs: RetestRun<R>[];
  /** The reading that governs; null where every point is under and none is listed. */
  reading: R | null;
  /** The newest final that decided anything here; null where none did. */
  finalId: number | null;
}

/**
 * How an emission stands at one position over all runs of one state that speak for it.
 *
 * The rule follows the port's verdict (`@/emc/port`), emission by emission. One run over makes it over: no later
 * reading overrules it, only voiding the run that is wrong does. A final decides what a prescan of the same position
 * asked, against the same line, where it was tuned to the emission or covers its frequency without a gap; it never
 * settles a prescan that was over, and the prescan's own position only. Of several finals the worst governs. A run
 * kept in part decides and covers nothing, but what it shows over or open counts. Over is confirmed once a final shows
 * it and another run of the position asked for it too. Under needs what the port needs: another height, or a height
 * that was varied. An ambient run is without the sample and is not to be passed.
 */
export function standAt<R extends Reading>(
  port: Port,
  voices: readonly Voice<R>[],
  position: RetestPosition,
  place: Place,
): Stands<R> {
  const there = voices.filter(({ run }) => positionOf(port, run) === position);
  const said = there.flatMap((voice) => saidOf(voice, place));
  const by = (...verdicts: Verdict[]) => said.filter(({ verdict }) => verdicts.includes(verdict));
  const over = by('over');
  const asking = by('over', 'needs-final');
  const finals = said.filter(
    ({ run, verdict }) => run.purpose === 'final' && !run.partial && verdict !== 'needs-final',
  );
  const finalId = finals.reduce<number | null>((newest, { run }) => Math.max(newest ?? 0, run.id), null);
  const stands = (standing: Standing, from: Said<R>[]): Stands<R> => {
    const [worst] = from.filter(({ reading }) => reading).sort((a, b) => worse(a.reading!, b.reading!));
    const runs = from.map(({ run }) => run).sort((a, b) => a.id - b.id);
    return { standing, position, runs, reading: worst?.reading ?? null, finalId };
  };
  if (over.length > 0) {
    if (finals.length === 0) return stands('waits', over);
    if (!finals.some(({ verdict }) => verdict === 'over')) return stands('contradicted', [...over, ...finals]);
    return stands(asking.length > 1 ? 'over' : 'waits', over);
  }
  const inconclusive = finals.filter(({ verdict }) => verdict === 'inconclusive');
  if (inconclusive.length > 0) return stands('inconclusive', inconclusive);
  if (finals.length === 0 && asking.length > 0) return stands('waits', asking);
  const under = finals.length > 0 ? finals : by('under');
  if (under.length === 0) return stands('silent', []);
  const whole = there.map(({ run }) => run).filter(({ partial }) => !partial);
  return stands(heightMissing(port, position, whole).length > 0 ? 'one-height' : 'under', under);
}

/** Where a run was measured, as its port counts it. */
export function positionOf(port: Port, run: Pick<PortRun, 'polarisation' | 'line'>): RetestPosition {
  return port === 'enclosure' ? run.polarisation : port === 'ac-mains' ? run.line : null;
}

/**
 * The run that completed a repeated prescan of a position: together with those before it, it leaves nothing of any of
 * the lines open. Null while something is open. A run kept in part covers nothing.
 */
export function sweptBy(
  port: Port,
  runs: readonly RetestRun[],
  position: RetestPosition,
  lineIds: readonly string[],
): RetestRun | null {
  const there = runs.filter((run) => !run.partial && positionOf(port, run) === position).sort((a, b) => a.id - b.id);
  const covers = (some: readonly RetestRun[]) =>
    lineIds.every((lineId) => {
      const against = some.filter(({ lines }) => lines.some(({ id }) => id === lineId));
      return against.length > 0 && leftOpen(against, lineId).length === 0;
    });
  return there.find((_, i) => covers(there.slice(0, i + 1))) ?? null;
}

/** What one run can say about one line, ready to be asked at many places. */
export interface Voice<R extends Reading> {
  run: RetestRun<R>;
  lineId: string;
  asked: readonly Interval[];
  peaks: { near(place: Place): R[] };
  floors: readonly R[];
}

/** The runs that were compared with a line. `widths` names every bandwidth that will be asked with. */
export function voicesOf<R extends Reading>(
  runs: readonly RetestRun<R>[],
  lineId: string,
  widths: readonly Place[],
): Voice<R>[] {
  return runs.flatMap((run) => {
    const line = run.lines.find(({ id }) => id === lineId);
    if (!line) return [];
    const readings = run.readings.filter((reading) => reading.lineId === lineId);
    const peaks = readings.filter(({ kind }) => kind === 'peak');
    const floors = readings.filter(({ kind }) => kind === 'floor');
    return [{ run, lineId, asked: line.asked, peaks: peaksByFrequency([...widths, ...peaks], peaks), floors }];
  });
}

interface Said<R extends Reading> {
  run: RetestRun<R>;
  verdict: Verdict;
  reading: R | null;
}

const OPEN: readonly Verdict[] = ['over', 'needs-final', 'inconclusive'];

/** What a run says at a place: its worst open reading there, else under where it looked, else nothing. */
function saidOf<R extends Reading>(voice: Voice<R>, place: Place): Said<R>[] {
  const { run } = voice;
  const peaks = place.kind === 'peak' ? voice.peaks.near(place) : [];
  const floors = voice.floors.filter((floor) => apartHz(floor, place) === 0 || isOneEmission(floor, place));
  const [open] = [...peaks, ...floors].filter(({ verdict }) => OPEN.includes(verdict)).sort(worse);
  if (open) return [{ run, verdict: open.verdict, reading: open }];
  const [under = null] = peaks.filter(({ verdict }) => verdict === 'under').sort(worse);
  if ((under && isTuned(under.frequencyHz, under.bandwidthHz, place)) || covers(voice, place)) {
    return [{ run, verdict: 'under', reading: under }];
  }
  return [];
}

/** Further off than half the bandwidth, a filter reads the emission too low to show it under. */
function isTuned(frequencyHz: number, bandwidthHz: number, { fromHz, bandwidthHz: other }: Place): boolean {
  return Math.abs(frequencyHz - fromHz) <= Math.min(bandwidthHz, other) / 2;
}

/** Every point that is not proven under is listed; so where a run looked and lists nothing open, it is under. */
function covers<R extends Reading>({ run, lineId, asked }: Voice<R>, place: Place): boolean {
  if (run.partial || without([place], asked).length > 0 || !asked.some((range) => apart(range, place) === 0))
    return false;
  const gaps = run.gaps.filter((gap) => gap.lineId === lineId);
  if (!gaps.some((gap) => apart(gap, place) === 0)) return true;
  if (place.kind !== 'peak') return false;
  return run.spotsHz.some((spotHz) => isTuned(spotHz, place.bandwidthHz, place) && isJudgedSpot(gaps, spotHz));
}

/** Between two spots lies a gap, and beyond the first and the last no trace at all; a spot that lacks more was not judged. */
function isJudgedSpot(gaps: readonly CoverageGap[], spotHz: number): boolean {
  const there = gaps.filter(({ fromHz, toHz }) => fromHz <= spotHz && spotHz <= toHz);
  const isEnd = ({ because, fromHz, toHz }: CoverageGap) =>
    because === 'no-trace' && (fromHz === spotHz || toHz === spotHz);
  return there.some(({ because }) => because === 'gap') && there.every((gap) => gap.because === 'gap' || isEnd(gap));
}

function apart(a: Interval, b: Interval): number {
  return Math.max(0, b.fromHz - a.toHz, a.fromHz - b.toHz);
}

function worse(a: Reading, b: Reading): number {
  return severity(a.verdict) - severity(b.verdict) || a.marginDb - b.marginDb || a.frequencyHz - b.frequencyHz;
}
