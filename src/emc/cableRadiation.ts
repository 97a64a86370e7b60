import { groundFactor, nearFieldReason, positive, WAVE_IMPEDANCE, wavelengthM, type GroundForm } from './freeSpace';

/** A cable as a radiator. The form of the estimate is always named, since published constants differ by 6.02 dB. */
export interface CablePlace {
  form: GroundForm;
  frequencyHz: number;
  lengthM: number;
  distanceM: number;
}
/** A half wave of cable: its length follows from the frequency. */
export type HalfWavePlace = Omit<CablePlace, 'lengthM'>;

/** `because` says why there is no figure, as a sentence; it is null when there is one. */
export interface FieldEstimate {
  fieldVPerM: number | null;
  because: string | null;
}
export interface CurrentEstimate {
  currentA: number | null;
  because: string | null;
}

/**
 * Longest cable, in wavelengths, for which the short form is answered: beyond about a quarter the linear rise stops.
 * Source: Electromagnetic Compatibility Engineering (Wiley 2009), common-mode radiation; from memory.
 */
export const SHORT_CABLE_WAVELENGTHS = 1 / 4;

/**
 * Field per ampere of one current that is uniform along a straight cable, broadside and in the 1/r range, V/m per A:
 * Z0·L·f/(2·c·r) in free space (6.283e-7·f·L/r), twice that ground-plane-doubled (1.257e-6·f·L/r). This is the bare
 * form: it says nothing on whether the current of a real cable is uniform. Field and current are in the same sense,
 * peak or r.m.s. Throws RangeError unless frequency, length and distance are finite and above zero.
 * Source: Hertzian dipole of standard antenna theory texts; the doubled form as printed in Electromagnetic
 * Compatibility Engineering (Wiley 2009).
 */
export function uniformCurrentFieldPerAmpere({ form, frequencyHz, lengthM, distanceM }: CablePlace): number {
  const wavelengths = positive('Length', lengthM, 'm') / wavelengthM(frequencyHz);
  return (groundFactor(form) * WAVE_IMPEDANCE * wavelengths) / (2 * positive('Distance', distanceM, 'm'));
}

/**
 * Field per ampere of the largest current on a half wave of cable, V/m per A: 60/r in free space, 120/r doubled. The
 * trade holds the short form at this figure where the cable is near resonance (common practice), for a half-wave
 * dipole radiates no more at any angle. It is no bound for more than half a wave: a whole wave reaches 6 dB more where
 * its two halves are in phase. Throws as above. Source: half-wave dipole of standard antenna theory texts.
 */
export function halfWaveFieldPerAmpere({ form, frequencyHz, distanceM }: HalfWavePlace): number {
  positive('Frequency', frequencyHz, 'Hz');
  return (groundFactor(form) * WAVE_IMPEDANCE) / (2 * Math.PI * positive('Distance', distanceM, 'm'));
}

/**
 * Field of a common-mode current on a short cable, V/m, by the form of `uniformCurrentFieldPerAmpere`. No figure
 * beyond a quarter of a wavelength or nearer than λ/2π. Throws RangeError on a current that is negative or not finite.
 */
export function shortCableField(place: CablePlace, currentA: number): FieldEstimate {
  return fieldOf(currentA, uniformCurrentFieldPerAmpere(place), tooLong(place) ?? tooNear(place));
}

/** Common-mode current that makes just the limit, A, on a short cable; no figure where `shortCableField` has none. */
export function shortCableCurrentAt(place: CablePlace, limitVPerM: number): CurrentEstimate {
  return currentOf(limitVPerM, uniformCurrentFieldPerAmpere(place), tooLong(place) ?? tooNear(place));
}

/** Field of a half wave of cable at resonance, V/m; `currentA` is the largest along it. No figure nearer than λ/2π. */
export function halfWaveField(place: HalfWavePlace, currentA: number): FieldEstimate {
  return fieldOf(currentA, halfWaveFieldPerAmpere(place), tooNear(place));
}

/** The largest current along a half wave of cable that makes just the limit, A. No figure nearer than λ/2π. */
export function halfWaveCurrentAt(place: HalfWavePlace, limitVPerM: number): CurrentEstimate {
  return currentOf(limitVPerM, halfWaveFieldPerAmpere(place), tooNear(place));
}

/**
 * How far the short form lies above the field of a cable whose current has its maximum in the middle and none at its
 * ends, dB: (kL/2)/tan(kL/4), from 6.02 dB where the cable is very short (the current is then a triangle) to 3.92 dB
 * at half a wave. Null beyond half a wave, where the largest current is no longer in the middle. Throws RangeError
 * unless frequency and length are finite and above zero.
 * Source: sinusoidal current on a centre-fed dipole, standard antenna theory texts.
 */
export function shortFormExcessDb(frequencyHz: number, lengthM: number): number | null {
  const wavelengths = positive('Length', lengthM, 'm') / wavelengthM(frequencyHz);
  if (wavelengths > 1 / 2) return null;
  const kL = 2 * Math.PI * wavelengths;
  return 20 * Math.log10(kL / 2 / Math.tan(kL / 4));
}

function tooLong({ frequencyHz, lengthM }: CablePlace): string | null {
  if (lengthM <= SHORT_CABLE_WAVELENGTHS * wavelengthM(frequencyHz)) return null;
  return `${lengthM} m is more than a quarter of a wavelength at ${frequencyHz} Hz, where the short-cable form over-predicts.`;
}

function tooNear({ frequencyHz, distanceM }: HalfWavePlace): string | null {
  return nearFieldReason(frequencyHz, distanceM);
}

function fieldOf(currentA: number, perAmpere: number, because: string | null): FieldEstimate {
  if (!(currentA >= 0 && Number.isFinite(currentA))) throw new RangeError(`Current ${currentA} A is no current.`);
  return because === null ? { fieldVPerM: currentA * perAmpere, because } : { fieldVPerM: null, because };
}

function currentOf(limitVPerM: number, perAmpere: number, because: string | null): CurrentEstimate {
  const limit = positive('Limit', limitVPerM, 'V/m');
  return because === null ? { currentA: limit / perAmpere, because } : { currentA: null, because };
}
