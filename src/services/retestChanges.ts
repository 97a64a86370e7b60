import type { CreationAttributes } from 'sequelize';
import type { Actor } from '@/auth/actor';
import type { Port } from '@/emc/kinds';
import { readsWorse } from '@/emc/retestStatus';
import { newPublicId } from '@/models/publicId';
import { Retest, type RetestStatus } from '@/models/retest';
import { RetestChange, type RetestAction } from '@/models/retestChange';
import { nextNumbers } from './counters';
import { dayIn, labSettings } from './lab';
import { FACTS, factsOf, type RetestFacts } from './retestFacts';
import { inParts } from './retestRows';
import type { Wanted } from './retestWants';

export interface Happening {
  stateId: number;
  port: Port;
  /** What changed the runs: `run R-26-032 kept`. */
  because: string;
  /** The fitted state after this one, which takes over what is open here. */
  next: { id: number; label: string } | null;
  at: Date;
}

interface Turn {
  status: RetestStatus;
  reason: string;
  carriedTo: number | null;
  /** A person's withdrawal no longer holds. */
  released: boolean;
}

/** What becomes of an item: the runs propose, a person's scheduling and withdrawing stand as long as nothing new came. */
function turnOf({ row, facts, status, says }: Wanted, { because, next }: Happening): Turn {
  const gone = status === 'gone';
  let to: RetestStatus = gone ? 'withdrawn' : status;
  let reason = gone ? `no longer shown: ${because}` : says;
  let released = false;
  if (row && row.withdrawnBy !== null) {
    const before = { verdict: row.withdrawnVerdict, marginDb: row.withdrawnMarginDb };
    released = (status === 'waiting' || status === 'measured') && readsWorse(before, facts);
    if (!released) return { status: 'withdrawn', reason: row.statusReason, carriedTo: null, released };
    reason = `reads worse than when it was withdrawn: ${says}`;
  }
  const isNew = status === 'measured' && row?.finalId !== facts.finalId;
  if (row?.status === 'scheduled' && (to === 'waiting' || to === 'measured') && !isNew) {
    to = 'scheduled';
    reason = row.statusReason;
  }
  if (next && (to === 'waiting' || to === 'scheduled' || to === 'measured')) {
    return { status: 'withdrawn', reason: `carried to ${next.label}`, carriedTo: next.id, released };
  }
  // What had left the queue for another reason keeps it.
  if (gone && row?.status === 'withdrawn' && row.carriedTo === null) reason = row.statusReason;
  return { status: to, reason, carriedTo: null, released };
}

const ACTIONS: Record<RetestStatus, RetestAction> = {
  waiting: 'reopened',
  scheduled: 'scheduled',
  measured: 'measured',
  cleared: 'cleared',
  withdrawn: 'withdrawn',
};

/** Counts by what was done to them, for the audit entry. */
export type Tally = Partial<Record<RetestAction, string[]>>;

/** Writes items as the runs want them, and a change for each that differs; answers what was done to which. */
export async function writeWanted(actor: Actor, wanted: readonly Wanted[], happening: Happening): Promise<Tally> {
  const tally: Tally = {};
  const numbered = await numberNew(wanted, happening.at);
  for (const part of inParts(wanted)) {
    const opened = await openItems(part, numbered, happening);
    const rows: CreationAttributes<Retest>[] = [];
    const changes: CreationAttributes<RetestChange>[] = [];
    for (const one of part) {
      const row = one.row ?? opened.get(one)!;
      for (const change of changesOf(one, row, happening)) {
        (tally[change.action] ??= []).push(row.number);
        changes.push({ ...change, retestId: row.id, at: happening.at, userId: actor.userId, sweepId: one.runId });
        if (change.values) rows.push({ ...row.get({ plain: true }), ...change.values, version: row.version + 1 });
      }
    }
    if (rows.length > 0) await Retest.bulkCreate(rows, { updateOnDuplicate: [...CHANGING] });
    await RetestChange.bulkCreate(changes);
  }
  return tally;
}

const CHANGING = [
  ...FACTS,
  ...(['status', 'statusReason', 'carriedTo', 'scheduledOn', 'note', 'version'] as const),
  ...(['withdrawnBy', 'withdrawnMarginDb', 'withdrawnVerdict'] as const),
] as const;

type Change = Pick<RetestChange, 'action' | 'fromStatus' | 'toStatus' | 'reason' | 'marginFromDb' | 'marginToDb'> & {
  /** What the row becomes by it; absent where it was just entered so. */
  values?: Record<string, unknown>;
};

function changesOf(one: Wanted, row: Retest, happening: Happening): Change[] {
  const turn = turnOf(one, happening);
  const { status, reason } = turn;
  const margins = { marginFromDb: row.marginDb, marginToDb: one.facts.marginDb };
  const changes: Change[] = [];
  if (!one.row) {
    const opened = { action: 'opened', fromStatus: null, toStatus: 'waiting', reason: one.says } as const;
    changes.push({ ...opened, marginFromDb: null, marginToDb: margins.marginToDb });
    if (status === 'waiting') return changes;
  }
  const moved = row.status !== status || row.carriedTo !== turn.carriedTo || turn.released;
  const updated = one.status !== 'gone' && !sameFacts(factsOf(row), one.facts);
  if (!moved && !updated && row.statusReason === reason) return changes;
  const values = valuesOf(row, one, turn);
  const said = moved
    ? { action: ACTIONS[status], reason }
    : { action: 'updated' as const, reason: `${reason}: ${happening.because}`.slice(0, 400) };
  return [...changes, { ...said, fromStatus: row.status, toStatus: status, ...margins, values }];
}

function valuesOf(row: Retest, one: Wanted, { status, reason, carriedTo, released }: Turn): Record<string, unknown> {
  const facts = one.status === 'gone' ? {} : one.facts;
  const unplanned = row.status === 'scheduled' && status !== 'scheduled' ? { scheduledOn: null, note: null } : {};
  const free = released ? { withdrawnBy: null, withdrawnMarginDb: null, withdrawnVerdict: null } : {};
  return { ...facts, ...unplanned, ...free, status, statusReason: reason, carriedTo };
}

/** Numbers of the lab's year for what is new, in a row. */
async function numberNew(wanted: readonly Wanted[], at: Date): Promise<Map<Wanted, string>> {
  const fresh = wanted.filter(({ row }) => row === null);
  if (fresh.length === 0) return new Map();
  const year = dayIn((await labSettings()).zone, at).slice(0, 4);
  const first = await nextNumbers(`retest-${year}`, fresh.length);
  return new Map(fresh.map((one, i) => [one, `T-${year.slice(2)}-${String(first + i).padStart(3, '0')}`]));
}

/** The new items as rows, each waiting. */
async function openItems(
  wanted: readonly Wanted[],
  numbered: ReadonlyMap<Wanted, string>,
  { stateId, port, at }: Happening,
): Promise<Map<Wanted, Retest>> {
  const fresh = wanted.filter(({ row }) => row === null);
  if (fresh.length === 0) return new Map();
  const ids = fresh.map(() => newPublicId());
  const entered = { stateId, port, status: 'waiting' as const, openedAt: at, createdAt: at };
  await Retest.bulkCreate(
    fresh.map((one, i) => {
      const named = { publicId: ids[i]!, number: numbered.get(one)!, statusReason: one.says };
      return { ...one.facts, ...entered, ...named };
    }),
  );
  const rows = await Retest.findAll({ where: { publicId: ids } });
  const byId = new Map(rows.map((row) => [row.publicId, row]));
  return new Map(fresh.map((one, i) => [one, byId.get(ids[i]!)!]));
}

function sameFacts(a: RetestFacts, b: RetestFacts): boolean {
  const same = (one: unknown, other: unknown) =>
    one === other || (typeof one === 'object' && JSON.stringify(one) === JSON.stringify(other));
  return FACTS.every((name) => same(a[name], b[name]));
}
