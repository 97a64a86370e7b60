import { chooseAxis, headingIsFrequency, headingIsOther, headingIsPhase, headingIsTime } from './axis';
import { mainBlockOf, resolveBlocks, splitAtLabels, splitAtRestarts, type Damage, type Piece } from './blocks';
import { splitCells } from './cells';
import { countsRows } from './columnStats';
import { headingsOf, type Headings } from './headings';
import { textNumberReader } from './numbers';
import { entriesOf, type Entry } from './preamble';
import type { Prepared } from './prepare';
import { hopRowsIn, timeRowsIn, type HopRows, type TimeRows } from './rowLayouts';
import { lineEndFrom, linesFrom, textOf, type Line } from './sample';
import { columnOf, type Block, type Scan } from './scan';
import { settingsOf, type Declared } from './settings';
import { frequencyUnitIn, levelUnitIn } from './units';

export interface Table {
  scan: Scan;
  layout: 'pairs' | 'hop-rows' | 'time-rows';
  headings: Headings;
  main: Block;
  preamble: Line[];
  entries: Entry[];
  declared: Declared;
  /** File column of the frequencies; null for row layouts and where none was found. */
  axisColumn: number | null;
  axisEvidence: string;
  /** Why there is no frequency axis; null when there is one. */
  noAxis: { found: string; line: number } | null;
  hop: HopRows | null;
  time: TimeRows | null;
  /** File columns of levels, in file order. */
  levelColumns: number[];
  pieces: Piece[];
  damage: Damage | null;
  remarks: { text: string; line: number | null }[];
}

const PREAMBLE_LINES = 4000;

/** Lines before a block that are no rows: those at the top of the file and those since the block before. */
export function preambleOf(prepared: Prepared, scan: Scan, index: number): Line[] {
  const { clean } = prepared;
  const first = scan.blocks[0]!;
  const top = linesFrom(clean, 0, 1, Math.min(first.firstLine - 1, PREAMBLE_LINES), first.from);
  const lines = first.firstLine > 1 ? top.filter(({ from }) => from < first.from) : [];
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
function otherAxis(entries: readonly Entry[], declared: Declared): { found: string; line: number } | null {
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

type Context = Pick<Table, 'headings' | 'preamble' | 'entries' | 'declared'> & { near: Line[] };

/** What the lines before a block say. */
function contextOf(prepared: Prepared, scan: Scan, first: number): Context {
  const { template } = scan;
  const preamble = preambleOf(prepared, scan, first);
  const gapFrom = first > 0 ? scan.blocks[first - 1]!.next : 0;
  const near = preamble.filter(({ from }) => from >= gapFrom);
  const headings = headingsOf(near, template);
  const rest = preamble.filter(({ line }) => headings.line === null || line < headings.line);
  const entries = entriesOf(rest, template.delimiter);
  return { headings, preamble: rest, entries, declared: settingsOf(entries, template), near };
}

/** The table as the lines before one of its sweeps describe it. */
export function tableFor(prepared: Prepared, table: Table, piece: Piece): Table {
  if (table.layout !== 'pairs' || table.scan.blocks[piece.block] === table.main) return table;
  const { headings, preamble, entries, declared } = contextOf(prepared, table.scan, piece.block);
  return { ...table, headings: headings.line === null ? table.headings : headings, preamble, entries, declared };
}

/** What an earlier recognition settled; reading the same file again keeps to it. */
export interface Settled {
  layout: Table['layout'];
  axisColumn: number | null;
}

/** What the rows of a file are: layout, axis, levels, sweeps and broken rows. */
export function* tableSteps(prepared: Prepared, scan: Scan, settled: Settled | null = null): Generator<void, Table> {
  const { clean, option } = prepared;
  const { template, columns } = scan;
  const main = mainBlockOf(scan);
  const first = scan.blocks.indexOf(main);
  const { near, ...context } = contextOf(prepared, scan, first);
  const { headings, entries, declared } = context;
  const base = { ...context, scan, main, axisEvidence: '', noAxis: null };
  const nothing = { axisColumn: null, hop: null, time: null, remarks: [...declared.remarks] };

  const tryHop = !option && !template.contents.includes('sparse') && (settled?.layout ?? 'hop-rows') === 'hop-rows';
  const hop = tryHop ? hopRowsIn(scan, main) : null;
  if (hop) {
    const { pieces, damage, remarks } = resolveBlocks(clean, scan, hop.low, null);
    const stamps = template.contents.slice(0, columns[0]).map((content, i) => (content === 'text' ? i : -1));
    const stampOf = (row: number) => {
      const from = scan.rowFrom?.[row];
      if (from === undefined) return null;
      const row0 = splitCells(textOf(clean.bytes, from, lineEndFrom(clean.bytes, from)), template.delimiter);
      return stamps.flatMap((i) => (i >= 0 ? [row0[i] ?? ''] : [])).join(' ') || null;
    };
    const split = splitAtRestarts(pieces, scan.data[hop.low]!).map((piece) => {
      const startedAt = stampOf(piece.firstRow);
      return { ...piece, startedAt, name: startedAt && `sweep ${startedAt}` };
    });
    const levelColumns = columns.slice(hop.firstLevel, hop.firstLevel + hop.bins);
    return { ...base, ...nothing, layout: 'hop-rows', hop, levelColumns, pieces: split, damage, remarks };
  }

  const tryTime = !option && (settled?.layout ?? 'time-rows') === 'time-rows';
  const time = tryTime ? timeRowsIn(clean, scan, main, near) : null;
  if (time) {
    const { damage, remarks } = resolveBlocks(clean, scan, null, null);
    const skip = time.firstRowIsHeading ? 1 : 0;
    const pieces = Array.from({ length: main.rows - skip }, (_, i): Piece => {
      const row = main.firstRow + skip + i;
      const from = scan.rowFrom?.[row];
      const stamp =
        from === undefined
          ? String(scan.data[0]![row])
          : splitCells(
              textOf(clean.bytes, from, Math.min(from + 400, lineEndFrom(clean.bytes, from))),
              template.delimiter,
            )[0]!;
      return { name: `row ${stamp}`, startedAt: stamp, firstRow: row, rows: 1, block: first };
    });
    const levelColumns = columns.slice(time.firstLevel);
    const cells = headings.cells.map(() => null);
    const own = { ...headings, line: time.line, cells };
    const above = context.preamble.filter(({ line }) => line < time.line);
    return {
      ...base,
      ...nothing,
      preamble: above,
      headings: own,
      layout: 'time-rows',
      time,
      levelColumns,
      pieces,
      damage,
      remarks,
    };
  }

  const candidates = columns.map((column, i) => ({
    column,
    heading: headings.cells[column] ?? null,
    values: columnOf(scan, i, main.firstRow, main.rows),
  }));
  yield;
  const choice = settled
    ? { index: columns.indexOf(settled.axisColumn ?? -1), evidence: '', notFrequency: null }
    : option
      ? { index: 0, evidence: 'first column of a network-parameter file', notFrequency: null }
      : chooseAxis(candidates, declared);
  yield;
  const line = headings.line ?? main.firstLine;
  const elsewhere = option || settled ? null : otherAxis(entries, declared);
  const noAxis =
    elsewhere && !(choice.index !== null && headingIsFrequency(candidates[choice.index]!.heading))
      ? elsewhere
      : choice.index === null
        ? { found: choice.notFrequency ?? 'no column that rises or falls steadily', line }
        : null;
  const resolved = resolveBlocks(clean, scan, choice.index, declared.settings.declaredPoints);
  yield;
  const { pieces, remarks } = resolved;
  // Noise parameters, five to a row, may follow the network parameters; the published format says so.
  const noise = option !== null && resolved.damage?.cells.length === 5;
  const damage = noise ? null : resolved.damage;
  const labelled = template.contents[0] === 'text' && scan.rowFrom !== null;
  const labelAt = (row: number) => {
    const from = scan.rowFrom![row]!;
    const end = Math.min(from + 200, lineEndFrom(clean.bytes, from));
    return splitCells(textOf(clean.bytes, from, end), template.delimiter)[0]!;
  };
  const named = labelled ? splitAtLabels(pieces, labelAt) : null;
  const axisColumn = choice.index === null ? null : columns[choice.index]!;
  const levelColumns = candidates
    .filter(({ column, heading, values }) => {
      if (column === axisColumn || template.contents[column] === 'sparse') return false;
      if (headingIsPhase(heading) || headingIsOther(heading) || headingIsTime(heading)) return false;
      return levelUnitIn(heading ?? '') !== null || !countsRows(values);
    })
    .map(({ column }) => column);
  return {
    ...base,
    ...nothing,
    layout: 'pairs',
    axisColumn,
    axisEvidence: choice.evidence,
    noAxis,
    levelColumns,
    pieces: named ?? splitAtRestarts(pieces, scan.data[choice.index ?? 0]!),
    damage,
    remarks: [...nothing.remarks, ...remarks],
  };
}

/**
 * Frequencies of one piece as written, or in hertz when the scan was made with a shift.
 * @param shift powers of ten for frequencies that stand in a heading line, outside the scan
 */
export function axisOf(table: Table, piece: Piece, shift = 0): Float64Array {
  const { scan, hop, time } = table;
  if (time) {
    const read = textNumberReader(scan.template);
    return Float64Array.from(time.frequencies, (text) => read(text, shift)!);
  }
  if (!hop) return columnOf(scan, scan.columns.indexOf(table.axisColumn!), piece.firstRow, piece.rows);
  const [low, width] = [scan.data[hop.low]!, scan.data[hop.binWidth]!];
  const axis = new Float64Array(piece.rows * hop.bins);
  for (let i = 0; i < axis.length; i++) {
    const row = piece.firstRow + Math.floor(i / hop.bins);
    axis[i] = low[row]! + (i % hop.bins) * width[row]!;
  }
  return axis;
}

/** Levels of one piece. Row layouts have one trace that runs over several columns; pairs have one per column. */
export function levelsOf(table: Table, piece: Piece, column: number): Float64Array {
  const { scan, hop, time } = table;
  if (time) {
    const from = scan.columns.indexOf(table.levelColumns[0]!);
    return Float64Array.from(table.levelColumns, (_, i) => scan.data[from + i]![piece.firstRow]!);
  }
  if (!hop) return columnOf(scan, scan.columns.indexOf(column), piece.firstRow, piece.rows);
  return Float64Array.from({ length: piece.rows * hop.bins }, (_, i) => {
    return scan.data[hop.firstLevel + (i % hop.bins)]![piece.firstRow + Math.floor(i / hop.bins)]!;
  });
}
