import { positive, wavelengthM } from './freeSpace';
import { groundPlaneRays } from './groundPlaneRays';
import type { Polarisation } from './kinds';

/** A site with a ground plane, as normalised site attenuation is stated for it. */
export interface SiteGeometry {
  polarisation: Polarisation;
  distanceM: number;
  txHeightM: number;
  /** The receive antenna's scan, both ends included; 1 m to 4 m on the sites of ANSI C63.4 and CISPR 16-1-4. */
  rxLowestM: number;
  rxHighestM: number;
}

/** Normalised site attenuation and the receive height at which the field is largest. */
export interface SiteAttenuation {
  nsaDb: number;
  rxHeightM: number;
}

/** Radiated by a half-wave dipole with 1 pW: E = √(49.2)/d µV/m. */
const FIELD_AT_1_M_SQUARED = 49.2;
/** 20 log10(279.1); printed 48.92 or 48.9. */
const NSA_CONSTANT_DB = 48.92;
/** Steps of the height scan per period of the interference between the two rays, before the maximum is refined. */
const STEPS_PER_PERIOD = 64;
const FEWEST_STEPS = 64;

/**
 * Theoretical normalised site attenuation over a perfectly conducting plane: −20 log10(f/MHz) + 48.92 − ED max, ED max
 * being the largest field of direct and reflected ray over the height scan, in dBµV/m. Source: the site-attenuation
 * model of 1982 that ANSI C63.4 and CISPR 16-1-4 adopted. Throws RangeError on a frequency, distance or height of zero
 * or less and on a scan that runs downwards.
 */
export function groundPlaneNsa(frequencyHz: number, geometry: SiteGeometry): SiteAttenuation {
  const { distanceM, txHeightM, rxLowestM, rxHighestM } = geometry;
  if (rxHighestM < rxLowestM) throw new RangeError(`The height scan runs from ${rxLowestM} m to ${rxHighestM} m.`);
  const phasePerM = (2 * Math.PI) / wavelengthM(frequencyHz);
  const fieldAt = (rxHeightM: number) => {
    const rays = groundPlaneRays({ distanceM, txHeightM, rxHeightM });
    const phase = phasePerM * rays.pathDifferenceM;
    if (geometry.polarisation === 'horizontal') return sumOfRays(1 / rays.directM, -1 / rays.reflectedM, phase);
    return distanceM ** 2 * sumOfRays(1 / rays.directM ** 3, 1 / rays.reflectedM ** 3, phase);
  };
  // The path difference grows by at most 2 m per metre of height.
  const periods = (2 * (rxHighestM - rxLowestM)) / wavelengthM(frequencyHz);
  const steps = Math.max(FEWEST_STEPS, Math.ceil(STEPS_PER_PERIOD * periods));
  const rxHeightM = largestAt(fieldAt, rxLowestM, rxHighestM, steps);
  const fieldDb = 20 * Math.log10(fieldAt(rxHeightM)) + 10 * Math.log10(FIELD_AT_1_M_SQUARED);
  return { nsaDb: withoutFieldDb(frequencyHz) - fieldDb, rxHeightM };
}

/**
 * Normalised site attenuation in free space with the near-field terms: 20 log10((5·50/2π)·d/√(1 − 1/(βd)² + 1/(βd)⁴))
 * − 20 log10(f/MHz), β = 2π/λ. Source: CISPR 16-1-4, fully anechoic rooms (from memory). Throws RangeError on a
 * frequency or distance of zero or less.
 */
export function freeSpaceNsa(frequencyHz: number, distanceM: number): number {
  const inverse = (wavelengthM(frequencyHz) / (2 * Math.PI * positive('Distance', distanceM, 'm'))) ** 2;
  const nearTerms = 10 * Math.log10(1 - inverse + inverse ** 2);
  return 20 * Math.log10(((5 * 50) / (2 * Math.PI)) * distanceM) - nearTerms - 20 * Math.log10(frequencyHz / 1e6);
}

/**
 * The same from the far field alone, with the constants of the ground-plane form: what a ground plane's gain is counted
 * from. Source as `groundPlaneNsa`. Throws RangeError on a frequency or distance of zero or less.
 */
export function farFieldNsa(frequencyHz: number, distanceM: number): number {
  const fieldDb = 10 * Math.log10(FIELD_AT_1_M_SQUARED) - 20 * Math.log10(positive('Distance', distanceM, 'm'));
  return withoutFieldDb(frequencyHz) - fieldDb;
}

/**
 * What the ground plane adds to the free-space field at the best height of the scan, dB; at most 6.02 dB. Throws as
 * `groundPlaneNsa`.
 */
export function groundPlaneGainDb(frequencyHz: number, geometry: SiteGeometry): number {
  return farFieldNsa(frequencyHz, geometry.distanceM) - groundPlaneNsa(frequencyHz, geometry).nsaDb;
}

function withoutFieldDb(frequencyHz: number): number {
  return NSA_CONSTANT_DB - 20 * Math.log10(positive('Frequency', frequencyHz, 'Hz') / 1e6);
}

/** |a + b·exp(−jφ)| */
function sumOfRays(a: number, b: number, phase: number): number {
  return Math.hypot(a + b * Math.cos(phase), b * Math.sin(phase));
}

/** Where a smooth function is largest: the best of evenly spaced points, then thirds of the steps on either side. */
function largestAt(valueAt: (x: number) => number, from: number, to: number, steps: number): number {
  const at = (i: number) => from + ((to - from) * Math.min(Math.max(i, 0), steps)) / steps;
  let best = 0;
  for (let i = 1; i <= steps; i++) if (valueAt(at(i)) > valueAt(at(best))) best = i;
  let low = at(best - 1);
  let high = at(best + 1);
  for (let turn = 0; turn < 60; turn++) {
    const third = (high - low) / 3;
    if (valueAt(low + third) < valueAt(high - third)) low += third;
    else high -= third;
  }
  return valueAt((low + high) / 2) > valueAt(at(best)) ? (low + high) / 2 : at(best);
}
