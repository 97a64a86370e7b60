import type { Draft } from './draftTypes';
import type { DropEntry } from './dropEntry';

/* What was said of a held file, for as long as the tab is open: a reload loses nothing of it. */

type Remembered = Pick<DropEntry, 'touched' | 'kept'> & { draft: Draft | null };
const keyOf = (fileId: string) => `stillfield-drop ${fileId}`;
const written = new Map<string, string>();

export function remember(entry: DropEntry): void {
  if (!entry.file) return;
  const { draft, touched, kept } = entry;
  const text = JSON.stringify({ draft, touched, kept } satisfies Remembered);
  if (written.get(entry.file.id) === text) return;
  written.set(entry.file.id, text);
  try {
    sessionStorage.setItem(keyOf(entry.file.id), text);
  } catch {
    // A browser that keeps nothing still has it until the page is left.
  }
}

export function forget(fileId: string): void {
  written.delete(fileId);
  try {
    sessionStorage.removeItem(keyOf(fileId));
  } catch {
    // Nothing was kept.
  }
}

/** An entry with what was said of its file before, where the browser still has it. */
export function recalled(entry: DropEntry): DropEntry {
  if (!entry.file) return entry;
  try {
    const stored = JSON.parse(sessionStorage.getItem(keyOf(entry.file.id)) ?? 'null') as Remembered | null;
    if (!stored || !entry.draft) return entry;
    const draft =
      stored.draft && Array.isArray(stored.draft.traces) ? { ...entry.draft, ...stored.draft } : entry.draft;
    return { ...entry, draft, touched: stored.touched ?? 0, kept: stored.kept ?? null };
  } catch {
    return entry;
  }
}
