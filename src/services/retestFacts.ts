import type { Port } from '@/emc/kinds';
import { positionOf } from '@/emc/retests';
import type { Judgement } from '@/emc/retestStatus';
import { severity } from '@/emc/verdict';
import type { Retest } from '@/models/retest';
import type { LoadedReading } from './retestRuns';

export const FACTS = [
  'kind',
  'reason',
  'lineKey',
  'lineRevisionId',
  'position',
  'positions',
  'waitsAt',
  'fromHz',
  'toHz',
  'spacingHz',
  'frequencyHz',
  'level',
  'limit',
  'marginDb',
  'uncertaintyDb',
  'verdict',
  'because',
  'heightM',
  'azimuthDeg',
  'sweepId',
  'finalId',
  'originId',
] as const;
/** What of a retest is read off its runs; a person's acts are no part of it. */
export type RetestFacts = Pick<Retest, (typeof FACTS)[number]>;

/** The facts a row holds. */
export function factsOf(row: Retest): RetestFacts {
  return Object.fromEntries(FACTS.map((name) => [name, row[name]])) as RetestFacts;
}

/** Of a prescan to be repeated nothing is read. */
export const NOTHING_READ = Object.fromEntries(FACTS.map((name) => [name, null])) as unknown as RetestFacts;

/**
 * The worst reading of any position, one that is under only where none is worse. Null where a position has not been
 * measured in this state and nothing read in it is open: then what was carried is still the last that is known.
 */
export function shownReading({ stands }: Judgement<LoadedReading>): LoadedReading | null {
  const readings = stands.flatMap(({ reading }) => reading ?? []).sort(worse);
  const open = readings.find(({ verdict }) => verdict !== 'under');
  if (open || stands.some(({ standing }) => standing === 'silent')) return open ?? null;
  return readings[0] ?? null;
}

const worse = (a: LoadedReading, b: LoadedReading) =>
  severity(a.verdict) - severity(b.verdict) || a.marginDb - b.marginDb;

export function readingFacts(port: Port, reading: LoadedReading) {
  const { line, run, frequencyHz, level, limit, marginDb, uncertaintyDb, verdict, because } = reading;
  const { heightM, azimuthDeg } = run;
  return {
    lineKey: line.lineKey,
    lineRevisionId: line.id,
    position: positionOf(port, run),
    ...{ frequencyHz, level, limit, marginDb, uncertaintyDb, verdict, because, heightM, azimuthDeg },
    sweepId: run.id,
  };
}
