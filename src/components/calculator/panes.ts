import type { Pane } from './pane';
import { addition } from './panes/addition';
import { antenna } from './panes/antenna';
import { cable } from './panes/cable';
import { distance } from './panes/distance';
import { eirp } from './panes/eirp';
import { field } from './panes/field';
import { levels } from './panes/levels';
import { mismatch } from './panes/mismatch';
import { plane } from './panes/plane';
import { reduction } from './panes/reduction';
import { scan } from './panes/scan';

/** The panes of the calculator in their order. */
export const PANES: readonly Pane[] = [
  levels,
  field,
  distance,
  antenna,
  eirp,
  plane,
  cable,
  mismatch,
  addition,
  scan,
  reduction,
];

/** The pane of that id; the first for none that there is. */
export function paneOf(id: string | null | undefined): Pane {
  return PANES.find((pane) => pane.id === id) ?? PANES[0]!;
}

/** Calculations whose titles carry every word, each from its beginning; all of them for `calculator`. */
export function findPanes(words: string): Pane[] {
  const asked = words
    .toLowerCase()
    .split(/[\s,-]+/)
    .filter(Boolean);
  if (asked.length === 0) return [];
  return PANES.filter(({ title }) => {
    const named = `calculator ${title}`.toLowerCase().split(/[\s,-]+/);
    return asked.every((word) => word.length >= 3 && named.some((name) => name.startsWith(word)));
  });
}
