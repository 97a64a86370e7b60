import { createHash } from 'node:crypto';
import { Op, QueryTypes } from 'sequelize';
import { authorise, type Actor } from '@/auth/actor';
import { AuditChain } from '@/models/auditChain';
import { AuditEntry } from '@/models/auditEntry';
import { database } from '@/models/database';
import { currentTransaction, lastly, unitOfWork } from '@/models/unitOfWork';

export interface Change {
  /** The chain it joins: `job-<public id>` or `lab`. */
  scope: string;
  action: string;
  subjectType: string;
  subjectId: string;
  before: Record<string, unknown> | null;
  after: Record<string, unknown> | null;
  /** When it happened; now unless a record is entered later than it was made. */
  at?: Date;
}

const GENESIS = '0'.repeat(64);

/** JSON with sorted keys at every depth, so that the same change always has the same bytes. */
export function canonical(value: unknown): string {
  if (value instanceof Date) return JSON.stringify(value.toISOString());
  if (Array.isArray(value)) return `[${value.map((item) => canonical(item ?? null)).join(',')}]`;
  if (value && typeof value === 'object') {
    const entries = Object.entries(value).filter(([, v]) => v !== undefined);
    entries.sort(([a], [b]) => (a < b ? -1 : 1));
    return `{${entries.map(([k, v]) => `${JSON.stringify(k)}:${canonical(v)}`).join(',')}}`;
  }
  return JSON.stringify(value ?? null);
}

export function chainHash(previous: string, bytes: string): string {
  return createHash('sha256').update(previous).update('\n').update(bytes).digest('hex');
}

/** Records a change in the current unit of work; the entry is written and chained just before the commit. */
export function recordChange(actor: Actor | null, change: Change): void {
  lastly(`audit ${change.scope}`, () => append(actor, change));
}

async function append(actor: Actor | null, change: Change): Promise<void> {
  const at = change.at ?? new Date();
  // Takes the exclusive lock whether or not the chain is there yet.
  await database().query(
    'INSERT INTO audit_chains (scope, length, head) VALUES (?, 0, ?) ON DUPLICATE KEY UPDATE length = length',
    { replacements: [change.scope, GENESIS], type: QueryTypes.INSERT },
  );
  const chain = await AuditChain.findOne({
    where: { scope: change.scope },
    lock: currentTransaction().LOCK.UPDATE,
    rejectOnEmpty: true,
  });
  const seq = Number(chain.length) + 1;
  const bytes = canonical({
    seq,
    at,
    actor: actor?.publicId ?? null,
    action: change.action,
    subject: [change.subjectType, change.subjectId],
    before: change.before,
    after: change.after,
  });
  const hash = chainHash(chain.head, bytes);
  await AuditEntry.create({
    scope: change.scope,
    seq,
    at,
    actorId: actor?.userId ?? null,
    action: change.action,
    subjectType: change.subjectType,
    subjectId: change.subjectId,
    canonical: bytes,
    previousHash: chain.head,
    hash,
  });
  await AuditChain.update({ length: seq, head: hash }, { where: { scope: change.scope } });
}

/** Re-computes a chain from its first entry. Returns the first broken sequence number, or null when it holds. */
export async function verifyChain(scope: string): Promise<number | null> {
  return unitOfWork(async () => {
    let previous = GENESIS;
    let expected = 1;
    for (;;) {
      const entries = await AuditEntry.findAll({
        where: { scope, seq: { [Op.gte]: expected } },
        order: [['seq', 'ASC']],
        limit: 500,
      });
      for (const entry of entries) {
        const sound =
          Number(entry.seq) === expected &&
          entry.previousHash === previous &&
          entry.hash === chainHash(previous, entry.canonical);
        if (!sound) return expected;
        previous = entry.hash;
        expected++;
      }
      if (entries.length < 500) break;
    }
    const chain = await AuditChain.findOne({ where: { scope } });
    return chain && (Number(chain.length) !== expected - 1 || chain.head !== previous) ? expected : null;
  });
}

export interface HistoryEntry {
  at: string;
  by: string | null;
  action: string;
  /** What moved, where that is little enough to be read in a line. */
  changes: { name: string; before: Small; after: Small }[];
}

type Small = string | number | boolean | null;

/** What happened to one record, newest first. The caller has shown that it may see the record. */
export async function historyOf(
  actor: Actor,
  subjectType: string,
  subjectId: string,
  limit = 50,
): Promise<HistoryEntry[]> {
  authorise(actor, 'audit.read');
  return unitOfWork(async () => {
    const entries = await AuditEntry.findAll({
      where: { subjectType, subjectId },
      order: [['id', 'DESC']],
      limit,
      include: [{ association: 'actor', attributes: ['name'] }],
    });
    return entries.map((entry) => ({
      at: entry.at.toISOString(),
      by: (entry as AuditEntry & { actor?: { name: string } }).actor?.name ?? null,
      action: entry.action,
      changes: smallChanges(entry.canonical),
    }));
  });
}

const FEW = 6;
const SHORT = 160;
/** Identifiers say nothing to a reader; figures are told where they can be rounded. */
const UNTOLD = /Id$|^(evaluation|organisation|sha256|engine|worstMarginDb|voided)$/;

/** The plain fields in which before and after differ, of a change that kept most of its record; a creation has none. */
function smallChanges(bytes: string): HistoryEntry['changes'] {
  const { before, after } = JSON.parse(bytes) as Record<'before' | 'after', Record<string, unknown> | null>;
  if (!before || !after) return [];
  const small = (value: unknown): value is Small =>
    value === null ||
    ['number', 'boolean'].includes(typeof value) ||
    (typeof value === 'string' && value.length <= SHORT);
  const names = Object.keys(after).filter((name) => {
    const [was, is] = [before[name] ?? null, after[name] ?? null];
    return !UNTOLD.test(name) && small(was) && small(is) && was !== is;
  });
  if (names.length > FEW) return [];
  // Of a reason given for each of two acts only the newer belongs to this one.
  return names.map((name) => ({
    name,
    before: name === 'reason' ? null : ((before[name] ?? null) as Small),
    after: (after[name] ?? null) as Small,
  }));
}
