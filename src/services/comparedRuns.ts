import { preparePath } from '@/emc/correction';
import type { Run, RunContext } from './runs';

/** A run with what it is judged by. */
export interface Side {
  run: Run;
  context: RunContext;
}

/** What a level is measured in; runs in dBµV and in dBµV/m have no difference. */
export function unitsOf({ context }: Side): string[] {
  return [...new Set(context.heads.map(({ unit }) => preparePath(unit, context.judged.terms).levelUnit ?? unit))];
}

export function sameUnit(a: Side, b: Side): boolean {
  return new Set([...unitsOf(a), ...unitsOf(b)]).size === 1;
}

/** What both runs cover; null where that is nothing. */
export function overlapOf(a: Run, b: Run): { fromHz: number; toHz: number } | null {
  const overlap = { fromHz: Math.max(a.firstHz, b.firstHz), toHz: Math.min(a.lastHz, b.lastHz) };
  return overlap.toHz > overlap.fromHz ? overlap : null;
}

/** The wider step of two runs; 0 where they stand on one even axis. Of an uneven axis the step is its mean. */
export function coarserStepHz(a: Run, b: Run): number {
  const oneAxis = a.stepHz !== null && a.stepHz === b.stepHz && a.firstHz === b.firstHz && a.lastHz === b.lastHz;
  const step = (run: Run) => Math.abs(run.stepHz ?? (run.lastHz - run.firstHz) / Math.max(1, run.points - 1));
  return oneAxis ? 0 : Math.max(step(a), step(b));
}
