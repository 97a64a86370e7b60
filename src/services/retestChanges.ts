import type { CreationAttributes } from 'sequelize';
import type { Actor } from '@/auth/actor';
import type { Port } from '@/emc/kinds';
import { readsWorse } from '@/emc/retestStatus';
import { newPublicId } from '@/models/publicId';
import { Retest, type RetestStatus } from '@/models/retest';
import { RetestChange, type RetestAction } from '@/models/retestChange';
import { nextNumbers } from './counters';
import { dayIn, labSettings } from './lab';
import { factsOf, type RetestFacts } from './retestFacts';
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
  const changes: CreationAttributes<RetestChange>[] = [];
  const note = (row: Retest, action: RetestAction, to: RetestStatus, reason: string, one: Wanted, before: Before) => {
    (tally[action] ??= []).push(row.number);
    changes.push({
      retestId: row.id,
      at: happening.at,
      userId: actor.userId,
      action,
      fromStatus: before.status,
      toStatus: to,
      reason,
      sweepId: one.runId,
      marginFromDb: before.marginDb,
      marginToDb: one.facts.marginDb,
    });
  };
  const opened = await openItems(wanted, happening);
  for (const one of wanted) {
    const row = one.row ?? opened.get(one)!;
    const turn = turnOf(one, happening);
    if (!one.row) {
      note(row, 'opened', 'waiting', one.says, one, { status: null, marginDb: null });
      if (turn.status === 'waiting') continue;
    }
    const moved = row.status !== turn.status || row.carriedTo !== turn.carriedTo || turn.released;
    const updated = one.status !== 'gone' && !sameFacts(factsOf(row), one.facts);
    if (!moved && !updated && row.statusReason === turn.reason) continue;
    const before = { status: row.status, marginDb: row.marginDb };
    await changeRow(row, one, turn);
    if (moved) note(row, ACTIONS[turn.status], turn.status, turn.reason, one, before);
    else note(row, 'updated', turn.status, `${turn.reason}: ${happening.because}`, one, before);
  }
  await RetestChange.bulkCreate(changes);
  return tally;
}

interface Before {
  status: RetestStatus | null;
  marginDb: number | null;
}

async function changeRow(row: Retest, one: Wanted, { status, reason, carriedTo, released }: Turn): Promise<void> {
  const facts = one.status === 'gone' ? {} : one.facts;
  const unplanned = row.status === 'scheduled' && status !== 'scheduled' ? { scheduledOn: null, note: null } : {};
  const free = released ? { withdrawnBy: null, withdrawnMarginDb: null, withdrawnVerdict: null } : {};
  const values = { ...facts, ...unplanned, ...free, status, statusReason: reason.slice(0, 400), carriedTo };
  await Retest.update({ ...values, version: row.version + 1 }, { where: { id: row.id } });
}

/** The new items as rows, each waiting. */
async function openItems(wanted: readonly Wanted[], { stateId, port, at }: Happening): Promise<Map<Wanted, Retest>> {
  const fresh = wanted.filter(({ row }) => row === null);
  if (fresh.length === 0) return new Map();
  const year = dayIn((await labSettings()).zone, at).slice(0, 4);
  const first = await nextNumbers(`retest-${year}`, fresh.length);
  const ids = fresh.map(() => newPublicId());
  await Retest.bulkCreate(
    fresh.map(({ facts, says }, i) => ({
      ...facts,
      publicId: ids[i]!,
      number: `T-${year.slice(2)}-${String(first + i).padStart(3, '0')}`,
      stateId,
      port,
      status: 'waiting',
      statusReason: says,
      openedAt: at,
      createdAt: at,
    })),
  );
  const rows = await Retest.findAll({ where: { publicId: ids } });
  const byId = new Map(rows.map((row) => [row.publicId, row]));
  return new Map(fresh.map((one, i) => [one, byId.get(ids[i]!)!]));
}

function sameFacts(a: RetestFacts, b: RetestFacts): boolean {
  return (Object.keys(a) as (keyof RetestFacts)[]).every((name) => JSON.stringify(a[name]) === JSON.stringify(b[name]));
}
