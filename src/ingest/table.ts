import { chooseAxis, headingIsFrequency } from './axis';
import { mainBlockOf, resolveBlocks, splitAtLabels, splitAtRestarts, type Piece } from './blocks';
import { splitCells } from './cells';
import { contextOf, otherAxis, type Context, type NoAxis } from './context';
import type { Damage } from './damage';
import { sortColumns, sparseLevels } from './levelColumns';
import type { Prepared } from './prepare';
import { hopRowsIn, timeRowsIn, type HopRows, type TimeRows } from './rowLayouts';
import { lineEndFrom, textOf } from './sample';
import { columnOf, type Block, type Scan } from './scan';
import type { Recognition } from './types';

/** What the rows of a file are. */
export interface Table extends Context {
  scan: Scan;
  main: Block;
  layout: 'pairs' | 'hop-rows' | 'time-rows';
  /** File column of the frequencies; null for row layouts and where none was found. */
  axisColumn: number | null;
  axisEvidence: string;
  noAxis: NoAxis | null;
  hop: HopRows | null;
  time: TimeRows | null;
  /** File columns of levels, in file order. */
  levelColumns: number[];
  pieces: Piece[];
  damage: Damage | null;
  remarks: Recognition['remarks'];
}

/** Without the broken row and what comes after it. */
function beforeDamage(pieces: readonly Piece[], damage: Damage | null): Piece[] {
  if (damage === null) return [...pieces];
  return pieces
    .map((piece) => ({ ...piece, rows: Math.min(piece.rows, damage.rowBefore - piece.firstRow + 1) }))
    .filter(({ rows }) => rows > 0);
}

/** What an earlier recognition settled; reading the same file again keeps to it. */
export interface Settled {
  layout: Table['layout'];
  axisColumn: number | null;
}

/** What every layout starts from. */
type Base = Omit<Table, 'layout' | 'levelColumns' | 'pieces' | 'damage'>;

/** Cells of one row as text, from its place in the file; null where rows carry no text. */
function rowText({ clean }: Prepared, scan: Scan, row: number): string[] | null {
  const from = scan.rowFrom?.[row];
  if (from === undefined) return null;
  return splitCells(
    textOf(clean.bytes, from, Math.min(from + 400, lineEndFrom(clean.bytes, from))),
    scan.template.delimiter,
  );
}

function hopTable(prepared: Prepared, base: Base, hop: HopRows): Table {
  const { scan } = base;
  const { contents } = scan.template;
  const { pieces, damage, remarks } = resolveBlocks(prepared.clean, scan, hop.low, null);
  const named = splitAtRestarts(pieces, scan.data[hop.low]!).map((piece) => {
    const cells = rowText(prepared, scan, piece.firstRow)?.slice(0, scan.columns[0]);
    const startedAt = cells?.filter((_, i) => contents[i] === 'text').join(' ') || null;
    return { ...piece, startedAt, name: startedAt && `sweep ${startedAt}` };
  });
  const levelColumns = scan.columns.slice(hop.firstLevel, hop.firstLevel + hop.bins);
  return {
    ...base,
    layout: 'hop-rows',
    hop,
    levelColumns,
    pieces: beforeDamage(named, damage),
    damage,
    remarks: [...base.remarks, ...remarks],
  };
}

function timeTable(prepared: Prepared, base: Base, time: TimeRows): Table {
  const { scan, main, headings } = base;
  const { damage, remarks } = resolveBlocks(prepared.clean, scan, null, null);
  const skip = time.firstRowIsHeading ? 1 : 0;
  const pieces = Array.from({ length: main.rows - skip }, (_, i): Piece => {
    const firstRow = main.firstRow + skip + i;
    const stamp = rowText(prepared, scan, firstRow)?.[0] ?? String(scan.data[0]![firstRow]);
    return { name: `row ${stamp}`, startedAt: stamp, firstRow, rows: 1, block: scan.blocks.indexOf(main) };
  });
  return {
    ...base,
    layout: 'time-rows',
    time,
    preamble: base.preamble.filter(({ line }) => line < time.line),
    headings: { ...headings, line: time.line, cells: headings.cells.map(() => null) },
    levelColumns: scan.columns.slice(time.firstLevel),
    pieces: beforeDamage(pieces, damage),
    damage,
    remarks: [...base.remarks, ...remarks],
  };
}

function* pairsTable(prepared: Prepared, base: Base, settled: Settled | null): Generator<void, Table> {
  const { clean, option } = prepared;
  const { scan, main, headings, declared } = base;
  const { template, columns } = scan;
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
  const axis = choice.index;
  const line = headings.line ?? main.firstLine;
  const { levelColumns, secondAxis, remarks: aside } = sortColumns(candidates, axis, template.contents, line);
  yield;
  const everyRow = candidates.map((one, i) => ({ ...one, values: columnOf(scan, i, 0, scan.rows) }));
  const beside = sparseLevels(everyRow, template.contents, line);
  yield;
  const named = axis !== null && headingIsFrequency(candidates[axis]?.heading ?? null);
  const elsewhere = option || settled || named ? null : otherAxis(base);
  const none = { found: choice.notFrequency ?? 'no column that rises or falls steadily', line };
  const resolved = resolveBlocks(clean, scan, axis, declared.settings.declaredPoints);
  yield;
  // Noise parameters, five to a row, may follow the network parameters; the published format says so.
  const isNoise = option !== null && resolved.damage?.cells.length === 5;
  const damage = isNoise ? null : resolved.damage;
  const isLabelled = template.contents[0] === 'text' && scan.rowFrom !== null;
  const stacks = isLabelled ? splitAtLabels(resolved.pieces, (row) => rowText(prepared, scan, row)![0]!) : null;
  return {
    ...base,
    layout: 'pairs',
    axisColumn: axis === null ? null : columns[axis]!,
    axisEvidence: choice.evidence,
    noAxis: elsewhere ?? (axis === null ? none : secondAxis),
    levelColumns,
    pieces: beforeDamage(stacks ?? splitAtRestarts(resolved.pieces, scan.data[axis ?? 0]!), damage),
    damage,
    remarks: [...base.remarks, ...aside, ...beside, ...resolved.remarks],
  };
}

/** What the rows of a file are: layout, axis, levels, sweeps and broken rows. */
export function* tableSteps(prepared: Prepared, scan: Scan, settled: Settled | null = null): Generator<void, Table> {
  const main = mainBlockOf(scan);
  const { near, ...context } = contextOf(prepared, scan, scan.blocks.indexOf(main));
  const remarks = [...context.declared.remarks];
  const base: Base = {
    ...context,
    scan,
    main,
    axisColumn: null,
    axisEvidence: '',
    noAxis: null,
    hop: null,
    time: null,
    remarks,
  };
  const may = (layout: Table['layout']) => prepared.option === null && (settled === null || settled.layout === layout);
  const hop = may('hop-rows') && !scan.template.contents.includes('sparse') ? hopRowsIn(scan, main) : null;
  if (hop) return hopTable(prepared, base, hop);
  const time = may('time-rows') ? timeRowsIn(prepared.clean, scan, main, near) : null;
  if (time) return timeTable(prepared, base, time);
  return yield* pairsTable(prepared, base, settled);
}

/** The table as the lines before one of its sweeps describe it. */
export function tableFor(prepared: Prepared, table: Table, piece: Piece): Table {
  if (table.layout !== 'pairs' || table.scan.blocks[piece.block] === table.main) return table;
  const { headings, preamble, entries, declared } = contextOf(prepared, table.scan, piece.block);
  return { ...table, headings: headings.line === null ? table.headings : headings, preamble, entries, declared };
}
