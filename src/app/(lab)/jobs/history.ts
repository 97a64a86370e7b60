import type { Actor } from '@/auth/actor';
import { historyOf, type HistoryEntry } from '@/services/audit';

/** The changes of several records that make up one sheet, newest first; empty for who may not see them. */
export async function historiesOf(
  actor: Actor,
  subjects: readonly (readonly [type: string, id: string])[],
): Promise<HistoryEntry[]> {
  if (actor.role === 'designer') return [];
  const entries: HistoryEntry[] = [];
  for (const [type, id] of subjects) entries.push(...(await historyOf(actor, type, id)));
  return entries.sort((a, b) => (a.at < b.at ? 1 : a.at > b.at ? -1 : 0));
}
