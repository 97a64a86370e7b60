import published from '@fixtures/published/limits.json';
import type { Actor } from '@/auth/actor';
import type { Port } from '@/emc/kinds';
import {
  toLimitLine,
  toMicrovoltLine,
  toMicrovoltLinesAbove,
  type LimitRecord,
  type MicrovoltRecord,
} from '@/emc/limitLine';
import type { LimitLine } from '@/emc/types';
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

type Sourced = { document: string; class: string; source: string; basis: string };
type SourcedLine = LimitRecord & Sourced & { port: string | null };

/** Every published line by id, in the shape the lab enters it, with its source and how sure that is. */
export function publishedLines(): Map<string, NewLimitLine> {
  const lines = new Map<string, NewLimitLine>();
  const add = ({ id, ...line }: LimitLine, more: Sourced & { port: string }) => {
    const { document, class: of, port, source, basis } = more;
    lines.set(id, { ...line, key: id, document, class: of, port, source, basis });
  };
  for (const record of published.lines as unknown as SourcedLine[]) {
    add(toLimitLine(record), { ...record, port: record.port ?? record.portText });
  }
  for (const record of published.microvoltLines as unknown as (MicrovoltRecord & Sourced)[]) {
    const figures = record.rows.map(({ limitUvPerM }) => limitUvPerM).join(', ');
    const port = 'enclosure';
    add(toMicrovoltLine(record), { ...record, port, source: `${record.source}, stated as ${figures} µV/m` });
    for (const line of toMicrovoltLinesAbove(record)) {
      const source = `${record.source} with 15.35(b), stated as ${record.rows.at(-1)!.limitUvPerM} µV/m average`;
      add(line, { ...record, port, source, basis: `${record.basis}, the end at 40 GHz from memory` });
    }
  }
  return lines;
}

/** Enters sets in their order, each with its lines, verified ones first; answers the sets by key. */
export async function enterPublishedLimits(
  actor: Actor,
  sets: PublishedSet[],
  at: Date,
): Promise<Map<string, LimitSet>> {
  const lines = publishedLines();
  const rows = new Map<string, LimitLineRevision>();
  const entered = new Map<string, LimitSet>();
  for (const { key, name, port, lineIds } of sets) {
    const named = lineIds.map((id) => {
      const line = lines.get(id);
      if (!line) throw new RangeError(`${id} is not a published limit line`);
      return line;
    });
    const verifiedFirst = named.toSorted((a, b) => Number(b.basis === 'verified') - Number(a.basis === 'verified'));
    for (const line of verifiedFirst) {
      if (!rows.has(line.key)) rows.set(line.key, await enterLimitLine(actor, line, at));
    }
    const own = lineIds.map((id) => rows.get(id)!);
    const distanceM = own[0]!.distanceM;
    entered.set(key, await enterLimitSet(actor, { name, port, distanceM, lines: own }, at));
  }
  return entered;
}
