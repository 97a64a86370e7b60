import { signOf } from './correction';
import { factorAt } from './factorTable';
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

/** Every term of the path that has a value at a frequency, applied or not, with the rows it was interpolated from. */
export function pathTerms(terms: readonly PathTerm[], hz: number): WorkingTerm[] {
  return terms.flatMap((term): WorkingTerm[] => {
    const factor = factorAt(term.table, hz);
    if (factor === null) return [];
    const { valueDb, ...rows } = factor;
    return [
      {
        sign: signOf(term.table.quantity) > 0 ? '+' : '−',
        figure: valueDb,
        unit: term.table.quantity === 'antenna-factor' ? 'dB/m' : 'dB',
        name: term.name,
        termId: term.id,
        applied: term.applied,
        notAppliedBecause: term.applied ? null : (term.notAppliedBecause ?? null),
        rows,
      },
    ];
  });
}
