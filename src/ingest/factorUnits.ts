import type { FactorUnit } from '@/emc/kinds';
import { levelUnitIn } from './units';

/** `dBS` is a transfer admittance: the same figures as a transfer impedance in dBΩ, turned over. */
export type WrittenFactorUnit = FactorUnit | 'dBS' | 'ohm';

/* Looked for in text without blanks and brackets, Ω written out: `dB(S/m)`, `dB/Ωm`, `dB(Ω⁻¹m⁻¹)`, `dB(µA/m)/µV`. */
const WRITTEN: [WrittenFactorUnit, RegExp][] = [
  ['dB(S/m)', /db(?:s(?:\/m|[·*]?m-1)|(?:re)?1?\/ohm[·*/]?m|ohm-1[·*]?m-1|[µu]?a\/m\/[µu]?v)(?![a-z])/],
  ['dB(pW/µV)', /db(?:re)?pw\/[µu]v/],
  ['dBΩ', /db(?:re1?)?ohms?(?![a-z0-9/-])/],
  ['dBS', /db(?:re1?)?(?:s|siemens)(?![a-z0-9/])/],
  // Bare ohm, where no decibels stand beside it.
  ['ohm', /^(?!.*db).*(?:^|[^a-z])ohms?(?![a-z])/],
];

/** The unit of a factor that a heading states, where it is none that a level or an antenna factor could have. */
export function factorOnlyUnitIn(text: string): WrittenFactorUnit | null {
  const spaced = text
    .toLowerCase()
    .replace(/[\u03c9\u2126]/g, 'ohm')
    .replace(/μ/g, 'µ')
    .replace(/⁻¹/g, '-1');
  const joined = spaced.replace(/[\s()[\]]/g, '');
  const found = WRITTEN.find(([unit, pattern]) =>
    pattern.test(unit === 'ohm' ? spaced.replace(/[()[\]]/g, ' ') : joined),
  );
  return found?.[0] ?? null;
}

/** The unit of a factor that a heading states, `dB` and `dB/m` included; null when it states none or a level's. */
export function factorUnitIn(text: string, alone = false): WrittenFactorUnit | null {
  const own = factorOnlyUnitIn(text);
  if (own) return own;
  const unit = levelUnitIn(text, alone)?.unit;
  return unit === 'dB' || unit === 'dB/m' ? unit : null;
}
