import { afterLineEnd } from './bytes';
import { headingsOf, type Headings } from './headings';
import { entriesOf, type Entry } from './preamble';
import type { Prepared } from './prepare';
import { lineEndFrom, linesFrom, type Line } from './sample';
import type { Scan } from './scan';
import { settingsOf, type Declared } from './settings';
import { frequencyUnitIn } from './units';

/** What the lines before the rows say. */
export interface Context {
  headings: Headings;
  preamble: Line[];
  entries: Entry[];
  declared: Declared;
}

/** Why there is no frequency axis. */
export interface NoAxis {
  found: string;
  line: number;
}

const PREAMBLE_LINES = 4000;
const PREAMBLE_BYTES = 1 << 20;

/** Lines before a block that are no rows: those at the top of the file and those since the block before. */
export function preambleOf(prepared: Prepared, scan: Scan, index: number): Line[] {
  const { clean } = prepared;
  const first = scan.blocks[0]!;
  const near = Math.max(0, first.from - PREAMBLE_BYTES);
  const from = near === 0 ? 0 : afterLineEnd(clean.bytes, lineEndFrom(clean.bytes, near));
  const top = first.from > from ? linesFrom(clean, from, 0, Infinity, first.from - from) : [];
  const lines = top.map((line, i) => ({ ...line, line: first.firstLine - top.length + i })).slice(-PREAMBLE_LINES);
  for (let i = 0; i < index; i++) {
    const before = scan.blocks[i]!;
    const next = scan.blocks[i + 1]!;
    if (lines.length > 2 * PREAMBLE_LINES) break;
    const between = linesFrom(clean, before.next, before.lastLine + 1, PREAMBLE_LINES, next.from - before.next);
    lines.push(...between.filter(({ from }) => from < next.from));
  }
  return lines.map((line) => ({ ...line, text: line.text.slice(0, 4000) }));
}

/** An axis other than frequency that the preamble names: an x unit of seconds, a span of nothing. */
export function otherAxis({ entries, declared }: Context): NoAxis | null {
  const unit = entries.findLast(({ key, values }) => /^(?:x|horizontal) ?(?:axis )?units?$/.test(key) && values[0]);
  if (
    unit &&
    frequencyUnitIn(unit.values[0]!) === null &&
    /^[nuµμm]?s(?:ec)?$|second|samples?|points?|^dbm?$/i.test(unit.values[0]!)
  ) {
    return { found: `an axis in ${unit.values[0]} (“${unit.text}”)`, line: unit.line };
  }
  const { span, start, stop } = declared;
  const zero = span?.value === 0 && (!start || !stop || start.value === stop.value);
  return zero ? { found: `a span of zero (“${span.entry.text}”): the axis is time`, line: span.entry.line } : null;
}

/** What the lines before a block say. */
export function contextOf(prepared: Prepared, scan: Scan, first: number): Context & { near: Line[] } {
  const { template } = scan;
  const preamble = preambleOf(prepared, scan, first);
  const gapFrom = first > 0 ? scan.blocks[first - 1]!.next : 0;
  const near = preamble.filter(({ from }) => from >= gapFrom);
  const headings = headingsOf(near, template);
  const rest = preamble.filter(({ line }) => headings.line === null || line < headings.line);
  const entries = entriesOf(rest, template.delimiter);
  return { headings, preamble: rest, entries, declared: settingsOf(entries, template, near[0]?.line), near };
}
