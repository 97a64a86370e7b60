import type { Actor } from '@/auth/actor';
import type { Port } from '@/emc/kinds';

export interface Settling {
  /** Row id of the modification state whose runs changed. */
  stateId: number;
  port: Port;
  /** Why, for the changes it writes: `run R-26-032 kept`. */
  because: string;
  at: Date;
}

/** Brings the retest queue of one state and port in line with its runs. Call inside the unit that changed them. */
export async function settleRetests(_actor: Actor, _settling: Settling): Promise<void> {}
