import type { FindingRun } from '@/format/finding';
import { daysBetween, formatDay, formatDue } from '@/format/dates';
import { QUANTITY_WORDS } from '@/format/revisions';
import type { EquipmentView } from '@/schemas/bench';

type Item = Pick<EquipmentView, 'identifier' | 'state' | 'calibratedOn' | 'dueOn' | 'due'>;
type Verdict = 'over' | 'inconclusive' | 'under' | 'not-covered';

const KINDS: Record<string, string> = { amn: 'AMN', aan: 'AAN', site: 'test site' };
const QUANTITIES: Record<string, string> = QUANTITY_WORDS;

/** `current-probe` is written current probe. */
export function kindOf(role: string): string {
  return KINDS[role] ?? role.replaceAll('-', ' ');
}

export function quantityOf(quantity: string): string {
  return QUANTITIES[quantity] ?? quantity.replaceAll('-', ' ');
}

/** A due state takes the position of a verdict: under the line, across it, above it. */
export const DUE_VERDICTS: Record<EquipmentView['due'], Verdict> = {
  lapsed: 'over',
  'due-soon': 'inconclusive',
  'in-date': 'under',
  'not-calibrated': 'not-covered',
};

/** `in date`, `due in 9 days`, `lapsed 46 days, quarantined`. */
export function dueWords(item: Item, today: string): string {
  const base =
    item.due === 'not-calibrated'
      ? 'not calibrated'
      : item.due === 'in-date' || item.dueOn === null
        ? 'in date'
        : formatDue(item.dueOn, today);
  return item.state === 'in-use' ? base : `${base}, ${item.state}`;
}

const ORDER: EquipmentView['due'][] = ['lapsed', 'due-soon', 'not-calibrated', 'in-date'];

/** Sorts what asks for somebody first, then by identifier; what is retired last. */
export function mostUrgentFirst(a: Item, b: Item): number {
  const retired = Number(a.state === 'retired') - Number(b.state === 'retired');
  const due = ORDER.indexOf(a.due) - ORDER.indexOf(b.due);
  return retired || due || a.identifier.localeCompare(b.identifier, 'en', { numeric: true });
}

/** What has lapsed and what lapses next. `AMN-2 lapsed on 2 Oct 2026 and is quarantined. ANT-02 is due in 9 days.` */
export function equipmentFinding(items: readonly Item[], today: string): { verdict: Verdict; runs: FindingRun[] } {
  const used = items.filter(({ state }) => state !== 'retired').sort(mostUrgentFirst);
  if (used.length === 0) return { verdict: 'not-covered', runs: [{ text: 'No equipment is entered yet.' }] };
  const lapsed = used.filter(({ due }) => due === 'lapsed');
  const soon = used.filter(({ due }) => due === 'due-soon').sort(byDueDay);
  const runs: FindingRun[] = [];
  for (const item of lapsed.slice(0, 2)) {
    runs.push(id(item), { text: ' lapsed on ' }, figure(formatDay(item.dueOn!)), {
      text: item.state === 'quarantined' ? ' and is quarantined. ' : ' and is still in use. ',
    });
  }
  if (lapsed.length > 2) runs.push({ text: `${lapsed.length - 2} more have lapsed. ` });
  for (const item of soon.slice(0, 2)) runs.push(id(item), { text: ` is ${formatDue(item.dueOn!, today)}. ` });
  if (soon.length > 2) runs.push({ text: `${soon.length - 2} more are due within 30 days. ` });
  const next = used.filter(({ due, dueOn }) => due === 'in-date' && dueOn !== null).sort(byDueDay)[0];
  if (next && soon.length === 0) {
    const lead = lapsed.length === 0 ? 'Everything with a due date is in date; next is ' : 'Next is ';
    runs.push({ text: lead }, id(next), { text: ', due ' }, figure(formatDay(next.dueOn!)), { text: '.' });
  }
  if (runs.length === 0) runs.push({ text: 'Nothing has a due date.' });
  const blocking = lapsed.some(({ state }) => state === 'in-use');
  return {
    verdict: blocking ? 'over' : lapsed.length + soon.length > 0 ? 'inconclusive' : 'under',
    runs: trimmed(runs),
  };
}

const id = ({ identifier }: Item): FindingRun => ({ text: identifier, figure: true, strong: true });
const figure = (text: string): FindingRun => ({ text, figure: true });
const byDueDay = (a: Item, b: Item) => daysBetween(b.dueOn!, a.dueOn!);

function trimmed(runs: FindingRun[]): FindingRun[] {
  return runs.map((run, at) => (at === runs.length - 1 ? { ...run, text: run.text.trimEnd() } : run));
}
