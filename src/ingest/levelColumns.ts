import {
  evenSteps,
  headingIsFrequency,
  headingIsOther,
  headingIsPhase,
  headingIsTime,
  type AxisCandidate,
} from './axis';
import { countsRows } from './columnStats';
import type { NoAxis } from './context';
import { detectorInHeading } from './detectors';
import { factorOnlyUnitIn } from './factorUnits';
import type { Content } from './template';
import type { Recognition } from './types';
import { levelUnitIn } from './units';

/**
 * Levels in some rows only, such as finals beside a sweep, are no trace: each such column is named with how many rows
 * it has levels in. `values` are those of every row, NaN where a cell is empty.
 */
export function sparseLevels(
  columns: readonly { column: number; heading: string | null; values: Float64Array }[],
  contents: readonly Content[],
  line: number,
): Recognition['remarks'] {
  return columns.flatMap(({ column, heading, values }) => {
    if (contents[column] !== 'sparse' || heading === null) return [];
    if (headingIsPhase(heading) || headingIsOther(heading) || headingIsTime(heading)) return [];
    if (levelUnitIn(heading) === null && detectorInHeading(heading) === null) return [];
    const filled = values.reduce((count, value) => count + (Number.isNaN(value) ? 0 : 1), 0);
    if (filled === 0) return [];
    const text = `Column ${column + 1}, ${heading}, has levels in ${filled} of ${values.length} rows; it is not read.`;
    return [{ text, line }];
  });
}

/** Which of the other columns are levels: no counters, no angles, no corrections, no second axis. */
export function sortColumns(
  candidates: readonly AxisCandidate[],
  axis: number | null,
  contents: readonly Content[],
  line: number,
) {
  const remarks: Recognition['remarks'] = [];
  let secondAxis: NoAxis | null = null;
  const along = axis === null ? null : candidates[axis]!;
  const unitOf = ({ heading }: AxisCandidate) => levelUnitIn(heading ?? '')?.unit ?? null;
  const absolute = candidates.some((one) => ![null, 'dB', 'dB/m'].includes(unitOf(one)));
  const levels = candidates.filter((one) => {
    const { heading, values, column } = one;
    if (one === along || contents[column] === 'sparse') return false;
    if (headingIsPhase(heading) || headingIsOther(heading) || headingIsTime(heading)) return false;
    if (along && values.length > 1 && values.every((value, i) => value === along.values[i])) return false;
    if (along && headingIsFrequency(heading)) {
      const [left, right] = [along.column, column].sort((a, b) => a - b);
      secondAxis ??= { found: `columns ${left! + 1} and ${right! + 1} are both frequencies, and they differ`, line };
      return false;
    }
    const unit = unitOf(one);
    if (absolute && (unit === 'dB' || unit === 'dB/m')) {
      const text = `“${heading}” is a column of corrections. The file does not say whether its levels hold them.`;
      remarks.push({ text, line });
      return false;
    }
    if (factorOnlyUnitIn(heading ?? '')) return true;
    return unit !== null || !(countsRows(values) || (values.length >= 10 && evenSteps(values)));
  });
  return { levelColumns: levels.map(({ column }) => column), secondAxis, remarks };
}
