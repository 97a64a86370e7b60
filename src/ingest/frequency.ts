import { statsOf, stepsOf } from './columnStats';
import { unitByDeclaration } from './axis';
import { moved } from './numbers';
import { nearest } from './preamble';
import type { Prepared } from './prepare';
import { KEYS } from './settings';
import type { Table } from './table';
import type { Recognition } from './types';
import { frequencyUnitIn, proposeFrequencyUnit, TO_HZ, type FrequencyUnit } from './units';

export interface AxisUnit {
  unit: FrequencyUnit | null;
  evidence: string | null;
  proposed: FrequencyUnit;
  remarks: Recognition['remarks'];
}

/** The unit of the frequencies by the nearest evidence; contradicting evidence leaves it open. */
export function axisUnit(prepared: Prepared, table: Table, raw: Float64Array): AxisUnit {
  const { headings, entries, preamble, declared, axisColumn } = table;
  const { option } = prepared;
  const stats = statsOf(raw);
  const proposed = proposeFrequencyUnit(stats.first, stats.last);
  if (option) {
    return { unit: option.unit, evidence: `line ${option.line}: ${option.text}`, proposed: option.unit, remarks: [] };
  }
  const heading = axisColumn === null ? null : (headings.cells[axisColumn] ?? null);
  const stated: { unit: FrequencyUnit; evidence: string }[] = [];
  const inHeading = heading === null ? null : frequencyUnitIn(heading);
  if (inHeading) stated.push({ unit: inHeading, evidence: `line ${headings.line}: heading “${heading}”` });
  const alone = preamble.findLast(({ text }) => /^\W*[kmg]?hz\W*$/i.test(text));
  const aloneUnit = alone && frequencyUnitIn(alone.text);
  if (aloneUnit) stated.push({ unit: aloneUnit, evidence: `line ${alone.line}: ${alone.text.trim()}` });
  const axisEntry = nearest(entries, KEYS.xUnit);
  const entryUnit = axisEntry && frequencyUnitIn(axisEntry.values[0]!);
  if (entryUnit) stated.push({ unit: entryUnit, evidence: `line ${axisEntry.line}: ${axisEntry.text}` });
  const step = Math.abs(stats.last - stats.first) / Math.max(1, stats.count - 1);
  const agreed = unitByDeclaration(stats.first, stats.last, step, declared);
  if (agreed && agreed !== 'same-figures') {
    const evidence = `line ${agreed.line}: agrees with the declared start and stop`;
    stated.push({ unit: agreed.unit, evidence });
  }
  const [best] = stated;
  if (!best) return { unit: null, evidence: null, proposed, remarks: [] };
  const against = agreed && agreed !== 'same-figures' && agreed.unit !== best.unit ? agreed : null;
  if (against) {
    const text = `The frequencies are said to be in ${best.unit} (${best.evidence}), but only ${against.unit} agrees with the declared start and stop.`;
    return { unit: null, evidence: null, proposed: against.unit, remarks: [{ text, line: against.line }] };
  }
  return { ...best, proposed: best.unit, remarks: [] };
}

/** The axis of the chosen sweep, in hertz by the stated or else the proposed unit. */
export function describeAxis(table: Table, raw: Float64Array, unit: AxisUnit): Recognition['frequency'] {
  const stats = statsOf(raw);
  const { step, even, duplicates, ascending } = stepsOf(raw, stats);
  const shift = TO_HZ[unit.unit ?? unit.proposed];
  return {
    column: table.axisColumn,
    unit: unit.unit,
    unitEvidence: unit.evidence,
    proposedUnit: unit.proposed,
    offset: stats.min < 0,
    firstHz: moved(stats.first, shift),
    lastHz: moved(stats.last, shift),
    points: raw.length,
    ascending,
    duplicates,
    stepHz: even
      ? Math.abs(moved(stats.last, shift) - moved(stats.first, shift)) / (raw.length - 1)
      : moved(step, shift),
    evenStep: even,
  };
}

/** Declared start and stop in hertz; figures without a unit count when they are those of the axis. */
export function declaredSpan(
  table: Table,
  raw: Float64Array,
  unit: AxisUnit,
): Pick<Recognition['settings'], 'startHz' | 'stopHz'> {
  const { settings, start, stop } = table.declared;
  const { first, last, count } = statsOf(raw);
  const step = Math.abs(last - first) / Math.max(1, count - 1);
  const same = unit.unit !== null && unitByDeclaration(first, last, step, table.declared) === 'same-figures';
  if (!same) return { startHz: settings.startHz, stopHz: settings.stopHz };
  const shift = TO_HZ[unit.unit!];
  return {
    startHz: settings.startHz ?? moved(start!.value, shift),
    stopHz: settings.stopHz ?? moved(stop!.value, shift),
  };
}

/** Declared count, start and stop beside what was read; repeated and backward frequencies. */
export function axisRemarks(table: Table, frequency: Recognition['frequency']): Recognition['remarks'] {
  const remarks: Recognition['remarks'] = [];
  const { settings, points, stop } = table.declared;
  const { stepHz, firstHz, lastHz, duplicates, ascending, offset } = frequency;
  if (table.layout === 'pairs' && settings.declaredPoints !== null && settings.declaredPoints !== frequency.points) {
    const text = `The file declares ${settings.declaredPoints} points; ${frequency.points} were read.`;
    remarks.push({ text, line: points!.entry.line });
  }
  const high = Math.max(firstHz, lastHz);
  if (
    frequency.unit !== null &&
    settings.stopHz !== null &&
    Math.abs(settings.stopHz - high) > 1.01 * stepHz + 1e-6 * high
  ) {
    const text = `The declared stop is ${settings.stopHz} Hz; the last frequency read is ${high} Hz.`;
    remarks.push({ text, line: stop!.entry.line });
  }
  if (duplicates > 0) {
    const times = duplicates === 1 ? 'One frequency appears' : `${duplicates} frequencies appear`;
    remarks.push({ text: `${times} more than once, as where pieces were joined. Every row is kept.`, line: null });
  } else if (!ascending && frequency.points > 1) {
    const way = firstHz > lastHz ? 'fall' : 'do not rise throughout';
    remarks.push({ text: `The frequencies ${way}. They are kept in the order of the file.`, line: null });
  }
  if (!offset && Math.min(firstHz, lastHz) === 0) {
    remarks.push({ text: 'The first frequency is 0 Hz; no limit line and no factor reaches it.', line: null });
  }
  return remarks;
}
