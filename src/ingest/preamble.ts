import { splitCells } from './cells';
import { textNumberReader, type NumberStyle } from './numbers';
import type { Line } from './sample';

/** A key with what follows it, wherever on a line it stands. */
export interface Entry {
  line: number;
  text: string;
  /** Lower case, words only: `X-Axis Unit [x]` is `x axis unit`. */
  key: string;
  /** Unit in brackets after the key, e.g. `kHz` of `RBW [kHz]`. */
  keyUnit: string | null;
  /** Cells after the key, empty ones at the end dropped. */
  values: string[];
}

export interface Quantity {
  value: number;
  unit: string | null;
  entry: Entry;
}

export function wordsOnly(text: string): string {
  return text
    .toLowerCase()
    .replace(/[([][^)\]]*[)\]]/g, ' ')
    .replace(/[^a-z0-9µ+]+/g, ' ')
    .trim();
}

/** Lines that speak of defaults say nothing about this file. */
export function speaksOfDefaults(text: string): boolean {
  return /default/i.test(text);
}

const COMMENT = /^["'\s]*(?:[#!%*;]|\/\/)+\s*/;

export function entriesOf(lines: readonly Line[], delimiter: string): Entry[] {
  const entries: Entry[] = [];
  for (const { line, text: whole } of lines) {
    if (speaksOfDefaults(whole) || whole.trim() === '') continue;
    const text = whole.replace(COMMENT, '');
    const cells = splitCells(text, delimiter === ' ' ? '\t' : delimiter);
    while (cells.length > 0 && cells.at(-1) === '') cells.pop();
    const add = (key: string, values: string[]) => {
      const keyUnit = /[([]([^)\]]+)[)\]]\s*$/.exec(key)?.[1] ?? null;
      entries.push({ line, text: whole.trim(), key: wordsOnly(key), keyUnit, values });
    };
    for (const [i, cell] of cells.entries()) {
      const pair = /^([^:=]*[a-zA-Z][^:=]*?)\s*[:=]\s*(.+)$/.exec(cell);
      if (pair) add(pair[1]!, [pair[2]!, ...cells.slice(i + 1)]);
      else if (/[a-zA-Z]/.test(cell)) add(cell.replace(/[:=]\s*$/, ''), cells.slice(i + 1));
    }
  }
  return entries;
}

/** Last entry whose key matches, the one nearest to the rows. */
export function nearest(entries: readonly Entry[], key: RegExp): Entry | null {
  return entries.findLast((entry) => key.test(entry.key) && entry.values.length > 0) ?? null;
}

/** Number and unit of an entry: `120;kHz`, `120 kHz`, `106.00dBuV`, `RBW [kHz];120`. */
export function quantityOf(entry: Entry | null, style: NumberStyle): Quantity | null {
  if (!entry) return null;
  const found = /^([+\-−]?[\d.,'’\u00a0\u2009\u202f]*\d[.,]?(?:[eE][+-]?\d+)?)\s*(.*)$/.exec(entry.values[0] ?? '');
  if (!found) return null;
  const value = textNumberReader(style)(found[1]!) ?? textNumberReader({ decimal: '.', thousands: null })(found[1]!);
  if (value === null) return null;
  const after = entry.values.slice(1).find((cell) => cell !== '') ?? null;
  return { value, unit: found[2]!.trim() || entry.keyUnit || (after && !/\d/.test(after) ? after : null), entry };
}

export function onOrOff(text: string | undefined): boolean | null {
  const word = (text ?? '').trim().toLowerCase();
  if (/^(?:off|false|no|none|0|disabled?|inactive|not used|-+)$/.test(word)) return false;
  if (/^(?:on|true|yes|1|enabled?|active|applied|used)$/.test(word)) return true;
  return null;
}
