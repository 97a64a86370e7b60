import { headingIsPhase, headingIsTime } from './axis';
import type { OptionLine } from './prepare';
import type { Table } from './table';
import type { RecognisedColumn, RecognisedTrace } from './types';

/** Time rows can have tens of thousands of columns; the first ones tell the story. */
const MOST_COLUMNS = 64;

/** How each column of the file was read, and why. */
export function describeColumns(
  table: Table,
  traces: readonly RecognisedTrace[],
  option: OptionLine | null,
): RecognisedColumn[] {
  const { scan, headings, hop, time, axisColumn, levelColumns } = table;
  const { contents, fileWidth } = scan.template;
  const describe = (index: number): Pick<RecognisedColumn, 'role' | 'evidence'> => {
    const content = contents[index] ?? 'empty';
    const heading = headings.cells[index] ?? null;
    const cell = scan.columns.indexOf(index);
    if (content === 'empty') return { role: 'blank', evidence: 'empty in every row' };
    if (content === 'sparse') {
      const empty = cell >= 0 && scan.data[cell]!.subarray(0, scan.rows).every((value) => Number.isNaN(value));
      if (empty) return { role: 'blank', evidence: 'empty in every row' };
      return { role: 'other', evidence: 'empty in some rows' };
    }
    if (hop && cell >= 0) {
      if (cell === hop.low) return { role: 'frequency', evidence: 'low edge of each hop' };
      if (cell === hop.low + 1) return { role: 'other', evidence: 'high edge of each hop' };
      if (cell === hop.binWidth) return { role: 'other', evidence: 'bin width' };
      if (cell < hop.firstLevel) return { role: 'other', evidence: 'count of samples' };
      if (cell >= hop.firstLevel + hop.bins) return { role: 'blank', evidence: 'repeats the column before it' };
    }
    if (time && cell >= 0) {
      if (cell < time.firstLevel) return { role: 'time', evidence: 'one row per moment' };
      return { role: 'level', evidence: `frequency in line ${time.line}` };
    }
    if (content === 'text') {
      const isTime = table.layout !== 'pairs' || headingIsTime(heading);
      return { role: isTime ? 'time' : 'other', evidence: 'text' };
    }
    if (index === axisColumn) return { role: 'frequency', evidence: table.axisEvidence };
    if (option && index % 2 === 0) {
      return option.format === 'RI'
        ? { role: 'other', evidence: 'imaginary part' }
        : { role: 'phase', evidence: 'angle' };
    }
    if (!levelColumns.includes(index)) {
      if (headingIsPhase(heading)) return { role: 'phase', evidence: `heading “${heading}”` };
      if (headingIsTime(heading)) return { role: 'time', evidence: `heading “${heading}”` };
      return { role: 'other', evidence: heading === null ? 'steady steps: no level' : `heading “${heading}”` };
    }
    const trace = traces.find(({ column }) => column === index);
    if (trace?.blank) return { role: 'blank', evidence: `${trace.min} in every row` };
    return { role: 'level', evidence: trace?.unitEvidence ?? 'numbers beside the frequencies' };
  };
  return Array.from({ length: Math.min(fileWidth, MOST_COLUMNS) }, (_, index) => ({
    index,
    heading: headings.cells[index] ?? null,
    ...describe(index),
  }));
}
