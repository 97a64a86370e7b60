import type { z } from 'zod';
import { port as portSchema, verdict as verdictSchema } from '@/schemas/common';
import type { sweepListItem } from '@/schemas/sweep';

export type Run = z.infer<typeof sweepListItem>;
export type Port = Run['port'];
export type Verdict = Run['verdict'];

/** The core's vocabulary lists verdicts worst first. */
const SEVERITY: readonly Verdict[] = verdictSchema.options;

interface Judged {
  verdict: Verdict;
  worst: { marginDb: number } | null;
}

/** Sorts worst first: by verdict, then by margin; without a margin last of its verdict. */
export function worstFirst(one: Judged, other: Judged): number {
  const verdicts = SEVERITY.indexOf(one.verdict) - SEVERITY.indexOf(other.verdict);
  if (verdicts !== 0) return verdicts;
  const [a, b] = [one.worst?.marginDb ?? Infinity, other.worst?.marginDb ?? Infinity];
  return a === b ? 0 : a - b;
}

/** An ambient run is without the sample, a trial speaks for itself alone, and a voided run for nothing. */
export function counted(runs: readonly Run[]): Run[] {
  return runs.filter(({ purpose, trial, voided }) => purpose !== 'ambient' && trial === null && !voided);
}

export function worstRun(runs: readonly Run[]): Run | null {
  return counted(runs).sort(worstFirst)[0] ?? null;
}

/** Ports that were measured, in the order of the trade's list. */
export function portsOf(runs: readonly Run[]): Port[] {
  return portSchema.options.filter((port) => counted(runs).some((run) => run.port === port));
}

/** M12 comes after M2. */
export function stateNumber(label: string): number {
  return Number(label.slice(1));
}

/** For each measured port the runs of the newest state in which it was measured. */
export function latestOfEachPort(runs: readonly Run[]): Run[][] {
  return portsOf(runs).map((port) => {
    const own = counted(runs).filter((run) => run.port === port);
    const newest = Math.max(...own.map(({ state }) => stateNumber(state)));
    return own.filter(({ state }) => stateNumber(state) === newest);
  });
}
