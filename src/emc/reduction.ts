/** What a level has to come down to: more than U below the limit, or a margin that somebody asks for. */
export type ReductionGoal = { uncertaintyDb: number | null } | { targetMarginDb: number };

export interface Reduction {
  /** 0 where the level is there already; null where it cannot be told, and `because` says why. */
  reductionDb: number | null;
  /** True: a reduction of exactly `reductionDb` is not enough, since under asks for more than U. */
  moreThan: boolean;
  /** What a field, current or voltage has to be multiplied by, at most: 10^(−dB/20), 1 where nothing is needed. */
  factor: number | null;
  because: string | null;
}

/**
 * How far an emission has to come down. With `uncertaintyDb` it is what is missing to a margin of more than U, so a
 * margin of exactly U still needs more than 0 dB (guarded acceptance, JCGM 106:2012; `decide` asks for more than U).
 * With `targetMarginDb` reaching the target is enough. `marginDb` is limit less level; null has no reduction.
 * Throws RangeError on a margin or target that is not finite, and on an uncertainty that is negative or not finite.
 */
export function reductionNeeded(marginDb: number | null, goal: ReductionGoal): Reduction {
  const guarded = 'uncertaintyDb' in goal;
  const goalDb = guarded ? goal.uncertaintyDb : goal.targetMarginDb;
  if (marginDb === null) return unknown('Without a level and a limit there is no margin to start from.');
  if (!Number.isFinite(marginDb)) throw new RangeError(`Margin ${marginDb} dB is no figure.`);
  if (goalDb === null) return unknown('No uncertainty is stated for this frequency.');
  if (!Number.isFinite(goalDb)) throw new RangeError(`A goal of ${goalDb} dB is no figure.`);
  if (guarded && goalDb < 0) throw new RangeError(`Expanded uncertainty ${goalDb} dB is no figure.`);
  const there = guarded ? marginDb > goalDb : marginDb >= goalDb;
  const reductionDb = there ? 0 : goalDb - marginDb;
  return { reductionDb, moreThan: guarded && !there, factor: 10 ** (-reductionDb / 20), because: null };
}

function unknown(because: string): Reduction {
  return { reductionDb: null, moreThan: false, factor: null, because };
}
