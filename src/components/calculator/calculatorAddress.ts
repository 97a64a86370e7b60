import type { Entries } from './givenOf';
import type { Pane } from './pane';
import { paneOf } from './panes';

/** What the address of the calculator names: the pane, what stands in its fields, and the figure that is explained. */
export interface CalculatorAddress {
  pane: Pane;
  entries: Entries;
  /** Id of the answer whose working is shown; null for the first that has one. */
  shown: string | null;
}

const PATH = '/calculator';
/** Longer than any figure; what comes in an address may be anything. */
const LONGEST = 40;

/** Reads a query. Names that no pane has are left alone, so an old address still opens. */
export function readAddress(query: URLSearchParams): CalculatorAddress {
  const entries: Record<string, string> = {};
  for (const [name, value] of query) {
    if (name !== 'pane' && name !== 'show' && !(name in entries)) entries[name] = value.slice(0, LONGEST);
  }
  return { pane: paneOf(query.get('pane')), entries, shown: query.get('show') };
}

/** The address, with what is empty or belongs to no field of the pane left out. */
export function calculatorHref({ pane, entries, shown }: CalculatorAddress): string {
  const query = new URLSearchParams({ pane: pane.id });
  for (const name of namesOf(pane)) {
    const value = entries[name];
    if (value !== undefined && value !== '') query.set(name, value);
  }
  if (shown !== null) query.set('show', shown);
  return `${PATH}?${query}`;
}

/** Every name that a pane may ask for, whatever is chosen in it. */
function namesOf(pane: Pane): string[] {
  const always = pane.fields(() => null);
  const names = new Set(always.map(({ name }) => name));
  for (const field of always) {
    if (field.kind !== 'choice') continue;
    for (const { value } of field.choices) {
      for (const { name } of pane.fields((asked) => (asked === field.name ? value : null))) names.add(name);
    }
  }
  return [...names];
}
