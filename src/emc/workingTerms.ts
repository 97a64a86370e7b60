import { factorUnitOf, signOf } from './factorQuantity';
import { factorAt } from './factorTable';
import { isInRange, stretchAt, stretchesOf } from './pathStretches';
import type { PathTerm, Trace, WorkingTerm } from './types';
import { DBM_TO_DBUV_50_OHM, isReceiverInput, powerAsDbm, toReceiverLevel } from './units';

const PLAIN = { sign: '' as const, termId: null, applied: true, notAppliedBecause: null, rows: null };

/** The reading in its own unit, then what makes it a level at the receiver's input. */
export function readingTerms(trace: Trace, reading: number): WorkingTerm[] {
  const { unit } = trace;
  const given = { ...PLAIN, figure: reading, unit, name: 'reading' };
  if (!Number.isFinite(reading)) return [];
  if (unit === 'dB') return [{ ...given, applied: false, notAppliedBecause: 'relative dB is no level' }];
  if (unit === 'dBuV' || !isReceiverInput(unit)) return [given];
  const conversion = {
    ...PLAIN,
    sign: '+' as const,
    figure: DBM_TO_DBUV_50_OHM,
    unit: 'dB',
    name: 'dBm to dBµV in 50 ohm',
  };
  if (unit === 'dBm') return [given, conversion];
  const notAdded = { ...given, applied: false, notAppliedBecause: 'its level is added instead' };
  const level = toReceiverLevel(reading, unit);
  if (level === null) return [notAdded];
  const dbm = powerAsDbm(reading, unit);
  if (dbm === null) return [notAdded, { ...PLAIN, figure: level, unit: 'dBuV', name: 'reading as a level' }];
  return [notAdded, { ...PLAIN, figure: dbm, unit: 'dBm', name: 'reading as a level' }, conversion];
}

/**
 * Every term of the path that has a value at a frequency, applied or not, with the rows it was interpolated from. An
 * item whose range lies elsewhere is left out; on the edge of two ranges the terms of the smaller correction stand there
 * as not applied.
 */
export function pathTerms(terms: readonly PathTerm[], hz: number): WorkingTerm[] {
  const governing = stretchAt(stretchesOf(terms), hz).terms;
  return terms.flatMap((term): WorkingTerm[] => {
    const factor = isInRange(term, hz) ? factorAt(term.table, hz) : null;
    if (factor === null) return [];
    const { valueDb, ...rows } = factor;
    const { quantity } = term.table;
    const applied = term.applied && (governing === null || governing.includes(term));
    return [
      {
        sign: signOf(quantity) > 0 ? '+' : '−',
        figure: valueDb,
        unit: factorUnitOf(quantity),
        name: term.name,
        termId: term.id,
        applied,
        notAppliedBecause: applied ? null : whyNot(term),
        rows,
      },
    ];
  });
}

/** Why the path gives no factor at a frequency, as a sentence; null where it gives one. */
export function noFactorBecause(terms: readonly PathTerm[], hz: number): string | null {
  const governing = stretchAt(stretchesOf(terms), hz).terms;
  if (governing === null) return 'No range of the signal path reaches this frequency.';
  const lacking = governing.find((term) => factorAt(term.table, hz) === null);
  return lacking ? `${lacking.table.name} has no value at this frequency.` : null;
}

function whyNot(term: PathTerm): string | null {
  if (!term.applied) return term.notAppliedBecause ?? null;
  return 'two ranges meet at this frequency and the larger correction governs';
}
