import { positive } from './freeSpace';
import { dbuvFromMicrovolts, microvoltsFromDbuv } from './units';

// Levels pass through as they are given; impedances have to be finite and above zero, otherwise RangeError.

/** dBm into an impedance as dBµV across it: + 90 + 10 log10(Z/Ω). Source: definitions; 106.9897 dB in 50 Ω. */
export function dbuvFromDbmAcross(levelDbm: number, impedanceOhm: number): number {
  return levelDbm + dbmToDbuv(impedanceOhm);
}

/** dBµV across an impedance as dBm into it. Source: definitions. */
export function dbmFromDbuvAcross(levelDbuv: number, impedanceOhm: number): number {
  return levelDbuv - dbmToDbuv(impedanceOhm);
}

/**
 * dBµV across an impedance as dBµA through it: − 20 log10(Z/Ω). With a current probe's transfer impedance for Z it is
 * the current under the probe. Source: Ohm's law.
 */
export function dbuaFromDbuv(levelDbuv: number, impedanceOhm: number): number {
  return levelDbuv - impedanceDbOhm(impedanceOhm);
}

/** dBµA through an impedance as dBµV across it. Source: Ohm's law. */
export function dbuvFromDbua(levelDbua: number, impedanceOhm: number): number {
  return levelDbua + impedanceDbOhm(impedanceOhm);
}

/** An impedance in dBΩ: 20 log10(Z/Ω). Source: definition. */
export function impedanceDbOhm(impedanceOhm: number): number {
  return 20 * Math.log10(positive('Impedance', impedanceOhm, 'ohm'));
}

/** 1 mW is 10⁹ pW. */
const DBM_TO_DBPW = 90;

/** dBm to dBpW. Source: definitions. */
export function dbpwFromDbm(levelDbm: number): number {
  return levelDbm + DBM_TO_DBPW;
}

/** dBpW to dBm. Source: definitions. */
export function dbmFromDbpw(levelDbpw: number): number {
  return levelDbpw - DBM_TO_DBPW;
}

/** V to dBµV; null for zero or less, which has no level. Source: definition. */
export function dbuvFromVolts(volts: number): number | null {
  return dbuvFromMicrovolts(volts * 1e6);
}

/** dBµV to V. Source: definition. */
export function voltsFromDbuv(levelDbuv: number): number {
  return microvoltsFromDbuv(levelDbuv) / 1e6;
}

function dbmToDbuv(impedanceOhm: number): number {
  return 90 + 10 * Math.log10(positive('Impedance', impedanceOhm, 'ohm'));
}
