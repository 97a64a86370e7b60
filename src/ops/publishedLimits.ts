import published from '@fixtures/published/limits.json';
import type { Actor } from '@/auth/actor';
import { toLimitLine, toMicrovoltLine, type LimitRecord, type MicrovoltRecord } from '@/emc/limitLine';
import type { Port } from '@/emc/kinds';
import type { LimitLineRevision } from '@/models/limitLineRevision';
import type { LimitSet } from '@/models/limitSet';
import { enterLimitLine, enterLimitSet, type NewLimitLine } from '@/services/enterLimits';

export interface PublishedSet {
  key: string;
  name: string;
  port: Port;
  /** ids of lines in fixtures/published/limits.json */
  lineIds: string[];
}

type Sourced = { document: string; class: string; source: string; basis: string; port?: string };

/** Every published line by id, in the shape the lab enters it, with its source and how sure that is. */
export function publishedLines(): Map<string, NewLimitLine> {
  const lines = new Map<string, NewLimitLine>();
  for (const record of published.lines as unknown as (LimitRecord & Sourced)[]) {
    const { id, ...line } = toLimitLine(record);
    const { document, class: of, port = 'enclosure', source, basis } = record;
    lines.set(id, { ...line, key: id, document, class: of, port, source, basis });
  }
  for (const record of published.microvoltLines as unknown as (MicrovoltRecord & Sourced)[]) {
    const { id, ...line } = toMicrovoltLine(record);
    const { document, class: of, source, basis } = record;
    lines.set(id, { ...line, key: id, document, class: of, port: 'enclosure', source, basis });
  }
  return lines;
}

/** Enters the lines that some sets name, verified ones first, and the sets themselves; answers the sets by key. */
export async function enterPublishedLimits(
  actor: Actor,
  sets: PublishedSet[],
  at: Date,
): Promise<Map<string, LimitSet>> {
  const lines = publishedLines();
  const named = [...new Set(sets.flatMap((set) => set.lineIds))].map((id) => {
    const line = lines.get(id);
    if (!line) throw new RangeError(`${id} is not a published limit line`);
    return line;
  });
  const verifiedFirst = [
    ...named.filter((line) => line.basis === 'verified'),
    ...named.filter((line) => line.basis !== 'verified'),
  ];
  const rows = new Map<string, LimitLineRevision>();
  for (const line of verifiedFirst) rows.set(line.key, await enterLimitLine(actor, line, at));
  const entered = new Map<string, LimitSet>();
  for (const { key, name, port, lineIds } of sets) {
    const own = lineIds.map((id) => rows.get(id)!);
    const distanceM = own[0]!.distanceM;
    entered.set(key, await enterLimitSet(actor, { name, port, distanceM, lines: own }, at));
  }
  return entered;
}
