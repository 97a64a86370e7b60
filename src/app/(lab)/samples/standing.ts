import { missingText } from '@/format/missing';
import type { Actor } from '@/auth/actor';
import { found } from '@/app/found';
import type { SweepView } from '@/schemas/sweep';
import { listSweeps, readSweep } from '@/services/sweeps';
import { latestOfEachPort, stateNumber, worstRun, type Port, type Run, type Verdict } from './worstRun';

/** How one port of one modification state stands: its verdict over all its runs, and the run that governs. */
export interface Standing {
  port: Port;
  state: string;
  verdict: Verdict;
  missing: string[];
  worst: SweepView['evaluation']['worst'];
  sweep: SweepView;
}

/** Beyond this a sample's older runs are left to the run list; `more` says that there are some. */
const PAGES = 5;

/** Every run of a sample, newest first. */
export async function runsOf(actor: Actor, sampleId: string): Promise<{ runs: Run[]; more: boolean }> {
  const runs: Run[] = [];
  let after: string | undefined;
  for (let page = 0; page < PAGES; page++) {
    const { items, next } = await found(listSweeps(actor, { sampleId, limit: 200, after }));
    runs.push(...items);
    if (next === null) return { runs, more: false };
    after = next;
  }
  return { runs, more: true };
}

/** Reads standings one after another, each once: a sheet's finding and its charts ask for the same ones. */
export function standingReader(actor: Actor) {
  const known = new Map<string, Promise<SweepView>>();
  return async function standingOf(runs: readonly Run[]): Promise<Standing | null> {
    const worst = worstRun(runs);
    if (!worst) return null;
    if (!known.has(worst.id)) known.set(worst.id, found(readSweep(actor, worst.id)));
    const sweep = await known.get(worst.id)!;
    const { verdict } = sweep.portVerdict;
    const missing = sweep.portVerdict.missing.map(missingText);
    return { port: sweep.port, state: sweep.state.label, verdict, missing, worst: sweep.evaluation.worst, sweep };
  };
}
export type StandingReader = ReturnType<typeof standingReader>;

/** One standing per measured port, in the newest state each was measured in. */
export async function latestStandings(read: StandingReader, runs: readonly Run[]): Promise<Standing[]> {
  const standings: Standing[] = [];
  for (const own of latestOfEachPort(runs)) {
    const standing = await read(own);
    if (standing) standings.push(standing);
  }
  return standings;
}

/** The same port in the first state it was measured in, if that was for the same purpose; for `better than M0`. */
export async function firstOf(
  read: StandingReader,
  runs: readonly Run[],
  latest: Standing,
): Promise<{ state: string; marginDb: number } | null> {
  const same = runs.filter(({ port, purpose }) => port === latest.port && purpose === latest.sweep.purpose);
  const labels = same.map(({ state }) => state);
  const earliest = labels.sort((a, b) => stateNumber(a) - stateNumber(b))[0];
  if (earliest === undefined || earliest === latest.state) return null;
  const first = await read(same.filter(({ state }) => state === earliest));
  return first?.worst ? { state: earliest, marginDb: first.worst.marginDb } : null;
}
