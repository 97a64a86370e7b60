import type { LevelUnit } from './kinds';

/** dBm to dBµV across 50 ohm: 20 log10(√(1 mW · 50 Ω) / 1 µV) = 90 + 10 log10 50 = 106.9897 dB. Source: definitions. */
export const DBM_TO_DBUV_50_OHM = 90 + 10 * Math.log10(50);

/** Units a reading has at the receiver's input; everything else is a quantity of its own and takes no factor. */
export function isReceiverInput(unit: LevelUnit): boolean {
  return ['dBuV', 'dBm', 'V', 'mV', 'uV', 'W', 'mW'].includes(unit);
}

/** True for units that are not logarithmic: their zero has no level. */
export function isLinear(unit: LevelUnit): boolean {
  return ['V', 'mV', 'uV', 'W', 'mW'].includes(unit);
}

/** µV to dBµV, or µV/m to dBµV/m; null for zero or less, which has no level. Source: definition. */
export function dbuvFromMicrovolts(microvolts: number): number | null {
  return microvolts > 0 && Number.isFinite(microvolts) ? 20 * Math.log10(microvolts) : null;
}

/** dBµV to µV, or dBµV/m to µV/m. Source: definition. */
export function microvoltsFromDbuv(levelDbuv: number): number {
  return 10 ** (levelDbuv / 20);
}

/** dBm in 50 ohm to dBµV. Source: definitions; printed as +107 dB. */
export function dbuvFromDbm(levelDbm: number): number {
  return levelDbm + DBM_TO_DBUV_50_OHM;
}

/** mW to dBm; null for zero or less. Source: definition. */
export function dbmFromMilliwatts(milliwatts: number): number | null {
  return milliwatts > 0 && Number.isFinite(milliwatts) ? 10 * Math.log10(milliwatts) : null;
}

/**
 * A reading as a level: dBµV for anything read at the receiver's input (50 ohm), the same figure for dBµV/m, dBµA,
 * dBµA/m and dBpW. Null where it cannot be a level: a relative `dB`, a linear zero or less, a figure that is not
 * finite.
 */
export function toReceiverLevel(value: number, unit: LevelUnit): number | null {
  if (!Number.isFinite(value)) return null;
  const dbm = powerAsDbm(value, unit);
  switch (unit) {
    case 'dB':
      return null;
    case 'dBm':
    case 'mW':
    case 'W':
      return dbm === null ? null : dbuvFromDbm(dbm);
    case 'V':
      return dbuvFromMicrovolts(value * 1e6);
    case 'mV':
      return dbuvFromMicrovolts(value * 1e3);
    case 'uV':
      return dbuvFromMicrovolts(value);
    default:
      return value;
  }
}

/** A reading of power in dBm; null for units that are not power, and for zero or less. */
export function powerAsDbm(value: number, unit: LevelUnit): number | null {
  if (unit === 'dBm') return value;
  if (unit === 'mW') return dbmFromMilliwatts(value);
  if (unit === 'W') return dbmFromMilliwatts(value * 1e3);
  return null;
}
