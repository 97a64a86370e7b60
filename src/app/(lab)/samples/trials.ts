import type { Actor } from '@/auth/actor';
import { found } from '@/app/found';
import { sameReading } from '@/app/(lab)/compare/runLabel';
import { movesOfTrials, type TrialMove } from '@/services/comparison';
import { counted, type Run } from './worstRun';

/** Beyond so many newest trials the difference is left to the sheet of the two. */
const COMPARED = 12;

export const isTrial = ({ trial }: Run): boolean => trial !== null;

/** The run of the trial's own state that it is laid beside: the same reading, the same purpose before another, the newest. */
export function ownRunOf(trial: Run, runs: readonly Run[]): Run | null {
  const own = counted(runs).filter((run) => run.state === trial.state && sameReading(run, trial));
  return own.find(({ purpose }) => purpose === trial.purpose) ?? own[0] ?? null;
}

/** What the newest trials of a sample moved, by the trial's id. `runs` are the sample's, newest first. */
export async function trialMoves(actor: Actor, runs: readonly Run[]): Promise<Map<string, TrialMove>> {
  const pairs = runs
    .filter((run) => isTrial(run) && !run.voided)
    .flatMap((trial) => {
      const own = ownRunOf(trial, runs);
      return own ? [{ trial: trial.id, own: own.id }] : [];
    });
  return found(movesOfTrials(actor, pairs.slice(0, COMPARED)));
}
