import type { Detector, LevelUnit } from '@/emc/kinds';
import { statsOf } from './columnStats';
import { averageKind, detectorIn, detectorInHeading, modeHidesDetector } from './detectors';
import { moved } from './numbers';
import { nearest, speaksOfDefaults, wordsOnly, type Entry } from './preamble';
import { splitCells } from './cells';
import { KEYS } from './settings';
import { levelsOf } from './series';
import type { Table } from './table';
import type { Piece } from './blocks';
import type { RecognisedTrace } from './types';
import { isLinear, levelUnitIn, type WrittenUnit } from './units';

interface Stated {
  value: string;
  entry: Entry;
}

/** `Detector A` and `Trace 2 Detector` speak for one trace. */
function numberOf(key: string): number | null {
  const found = /^(?:trace ?([1-9a-f]) .+|.+ ([1-9a-f]))$/.exec(key);
  const letter = found?.[1] ?? found?.[2];
  if (!letter) return null;
  return letter >= 'a' ? letter.charCodeAt(0) - 97 : Number(letter) - 1;
}

/** One statement per trace, from a list, from numbered keys, or from one line for all. */
function perTrace(
  entries: readonly Entry[],
  key: RegExp,
  traces: number,
  takes: (value: string) => boolean,
): (Stated | null)[] {
  const none = Array<Stated | null>(traces).fill(null);
  const fits = (entry: Entry) => entry.values.some((value) => value !== '' && takes(value));
  const numbered = entries.filter((entry) => {
    const number = numberOf(entry.key);
    const plain = entry.key.replace(/^trace ?[1-9a-f] /, '').replace(/ [1-9a-f]$/, '');
    return number !== null && number < traces && key.test(plain) && fits(entry);
  });
  if (traces > 1 && numbered.length > 0) {
    return none.map((_, i) => {
      const entry = numbered.findLast((one) => numberOf(one.key) === i);
      return entry ? { value: entry.values[0]!, entry } : null;
    });
  }
  const entry = entries.findLast((one) => key.test(one.key) && fits(one));
  if (!entry) return none;
  const values = entry.values.filter((value) => value !== '');
  if (values.length >= traces && traces > 1) return none.map((_, i) => ({ value: values[i]!, entry }));
  return values.length === 1 || traces === 1 ? none.map(() => ({ value: values[0]!, entry })) : none;
}

interface UnitStated extends WrittenUnit {
  evidence: string;
}

/** Unit lines and trace block lines, the nearest first; a reference level only ever makes a proposal. */
function preambleUnits(table: Table, traces: number): (UnitStated | null)[] {
  for (const { line, text } of [...table.preamble].reverse()) {
    if (speaksOfDefaults(text)) continue;
    const cells = splitCells(text, table.scan.template.delimiter).filter((cell) => cell !== '');
    const evidence = `line ${line}: ${text.trim().slice(0, 120)}`;
    const key = wordsOnly(cells[0] ?? '');
    if (KEYS.reference.test(key)) continue;
    const about = KEYS.yUnit.test(key) || /^trace\b/.test(key);
    const units = cells.slice(1).map((cell) => levelUnitIn(cell, about));
    if (about && units.some((unit) => unit !== null)) {
      const list = units.filter((unit) => unit !== null);
      return Array.from({ length: traces }, (_, i) => ({
        ...(list.length === traces ? list[i]! : list.at(-1)!),
        evidence,
      }));
    }
    for (const cell of cells) {
      const stated = /units?\s*[:=]?\s*([^)\]]+)/i.exec(cell)?.[1];
      const unit = stated === undefined ? null : levelUnitIn(stated, true);
      if (unit && unit.written !== '') return Array.from({ length: traces }, () => ({ ...unit, evidence }));
    }
  }
  return Array<UnitStated | null>(traces).fill(null);
}

/** The unit of a stated reference level: what an instrument displays in, so a good proposal. */
export function referenceUnit(table: Table): LevelUnit | null {
  const entry = nearest(table.entries, KEYS.reference);
  for (const value of entry?.values ?? []) {
    const unit = levelUnitIn(value.replace(/^[\s\d.,+-]+/, ''), true)?.unit ?? null;
    if (unit && unit !== 'dB/m') return unit;
  }
  return null;
}

function withoutUnit(heading: string): string {
  const bare = heading.replace(/\s*[([][^)\]]*[)\]]\s*$/, (bracket) =>
    levelUnitIn(bracket) !== null || levelUnitIn(bracket, true) !== null ? '' : bracket,
  );
  return bare.trim() || heading;
}

function namesOf(table: Table, piece: Piece): string[] {
  const { levelColumns, headings, entries, preamble, scan } = table;
  if (table.layout !== 'pairs') return [piece.name ?? 'levels'];
  const listed = perTrace(entries, KEYS.traceName, levelColumns.length, () => true);
  const block = levelColumns.length === 1 ? nearest(entries, /^trace$/) : null;
  const line = preamble.findLast(({ text }) =>
    /^trace ?\d+$/i.test(splitCells(text, scan.template.delimiter)[0] ?? ''),
  );
  const names = levelColumns.map((column, i) => {
    const heading = headings.cells[column];
    if (heading) return withoutUnit(heading);
    if (listed[i]) return listed[i].value;
    if (block && /^\d+$/.test(block.values[0] ?? '')) return `Trace ${block.values[0]}`;
    if (levelColumns.length === 1 && line) return splitCells(line.text, scan.template.delimiter)[0]!;
    return `column ${column + 1}`;
  });
  return names.map((name, i) => {
    const same = names.filter((other) => other === name).length;
    return same === 1 ? name : `${name} (${names.slice(0, i + 1).filter((other) => other === name).length})`;
  });
}

/** Does every column hold one value, or is this one alone in doing so? Then it is filler, not a measurement. */
const FEWEST_FOR_FILLER = 8;

/** The traces of one sweep as far as the file says what they are. */
export function tracesOf(table: Table, piece: Piece, axis: Float64Array, shift: number): RecognisedTrace[] {
  const columns = table.layout === 'pairs' ? table.levelColumns : table.levelColumns.slice(0, 1);
  const names = namesOf(table, piece);
  const units = preambleUnits(table, columns.length);
  const detectors = perTrace(table.entries, KEYS.detector, columns.length, (value) => detectorIn(value) !== null);
  const modes = perTrace(
    table.entries,
    KEYS.mode,
    columns.length,
    (value) => !/^\d/.test(value) && !/^trace/i.test(value),
  );
  const averaging = nearest(table.entries, KEYS.averageType);
  const levels = columns.map((column) => statsOf(levelsOf(table, piece, column)));
  const varied = levels.some(({ min, max }) => min !== max);

  return columns.map((column, index): RecognisedTrace => {
    const stats = levels[index]!;
    const heading = table.layout === 'pairs' ? (table.headings.cells[column] ?? null) : null;
    const inHeading = heading === null ? null : levelUnitIn(heading);
    const unitStated: UnitStated | null = inHeading
      ? { ...inHeading, evidence: `line ${table.headings.line}: heading “${heading}”` }
      : units[index]!;
    const written = unitStated?.unit === 'dB/m' ? null : (unitStated?.unit ?? null);
    // Watts and volts are positive: a `(V)` over negative figures means something else.
    const unit = isLinear(written) && stats.min < 0 ? null : written;
    const asWritten = detectors[index]?.value ?? (heading && detectorInHeading(heading) ? heading : null);
    const mode = modes[index]?.value ?? null;
    let detector: Detector | null = asWritten === null ? null : detectorIn(asWritten);
    if (detector === 'average' && averaging) detector = averageKind(averaging.values[0]!) ?? detector;
    if (mode !== null && modeHidesDetector(mode)) detector = 'unknown';
    return {
      index,
      column,
      name: names[index]!,
      unit,
      unitEvidence: unit === null ? null : unitStated!.evidence,
      detector,
      detectorAsWritten: asWritten,
      mode,
      blank:
        stats.min === stats.max && stats.count >= FEWEST_FOR_FILLER && (varied || stats.min === 0 || stats.min <= -200),
      linear: isLinear(unit) || (unit === null && stats.min > 0 && stats.max < 1),
      first: stats.first,
      last: stats.last,
      min: stats.min,
      minAtHz: moved(axis[stats.minRow]!, shift),
      max: stats.max,
      maxAtHz: moved(axis[stats.maxRow]!, shift),
    };
  });
}
