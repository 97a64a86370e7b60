import { type CurrentEstimate, type FieldEstimate } from './cableRadiation';
import {
  groundFactor,
  nearFieldReason,
  positive,
  SPEED_OF_LIGHT,
  WAVE_IMPEDANCE,
  wavelengthM,
  type GroundForm,
} from './freeSpace';

/** A loop of differential-mode current. */
export interface LoopPlace {
  form: GroundForm;
  frequencyHz: number;
  areaM2: number;
  /** All the way round; no less than that of a circle of the same area. */
  perimeterM: number;
  distanceM: number;
}

/**
 * Largest perimeter, in wavelengths, of a small loop: the current is then uniform and the field within 0.1 dB of the
 * form. Source: Electromagnetic Compatibility Engineering (Wiley 2009), radiated-emission chapter; from memory.
 */
export const SMALL_LOOP_WAVELENGTHS = 1 / 4;

/**
 * Field per ampere of a small loop, in its plane and in the 1/r range, V/m per A: Z0·π/c²·f²·A/r in free space
 * (1.317e-14·f²·A/r), twice that ground-plane-doubled (2.63e-14). The bare form, without its validity. Field and
 * current are in the same sense, peak or r.m.s. Throws RangeError unless all are finite and above zero.
 * Source: Electromagnetic Compatibility Engineering (Wiley 2009), radiated-emission chapter.
 */
export function loopFieldPerAmpere({ form, frequencyHz, areaM2, distanceM }: Omit<LoopPlace, 'perimeterM'>): number {
  const perSquareHertz = (WAVE_IMPEDANCE * Math.PI) / SPEED_OF_LIGHT ** 2;
  const field = perSquareHertz * positive('Frequency', frequencyHz, 'Hz') ** 2 * positive('Area', areaM2, 'm²');
  return (groundFactor(form) * field) / positive('Distance', distanceM, 'm');
}

/**
 * Field of a differential-mode current in a small loop, V/m. No figure beyond a perimeter of a quarter of a wavelength
 * or nearer than λ/2π. Throws RangeError on a current that is negative or not finite, and on a perimeter that no loop
 * of that area can have.
 */
export function smallLoopField(place: LoopPlace, currentA: number): FieldEstimate {
  if (!(currentA >= 0 && Number.isFinite(currentA))) throw new RangeError(`Current ${currentA} A is no current.`);
  const because = outside(place);
  const perAmpere = loopFieldPerAmpere(place);
  return because === null ? { fieldVPerM: currentA * perAmpere, because } : { fieldVPerM: null, because };
}

/** Loop current that makes just the limit, A; no figure where `smallLoopField` has none. */
export function smallLoopCurrentAt(place: LoopPlace, limitVPerM: number): CurrentEstimate {
  const limit = positive('Limit', limitVPerM, 'V/m');
  const because = outside(place);
  const perAmpere = loopFieldPerAmpere(place);
  return because === null ? { currentA: limit / perAmpere, because } : { currentA: null, because };
}

function outside({ frequencyHz, areaM2, perimeterM, distanceM }: LoopPlace): string | null {
  const circleM = 2 * Math.sqrt(Math.PI * positive('Area', areaM2, 'm²'));
  // A circle worked out by hand may be short by its last digits.
  if (positive('Perimeter', perimeterM, 'm') < circleM * (1 - 1e-3)) {
    throw new RangeError(`No loop of ${areaM2} m² has a perimeter of ${perimeterM} m.`);
  }
  if (perimeterM > SMALL_LOOP_WAVELENGTHS * wavelengthM(frequencyHz)) {
    return `A perimeter of ${perimeterM} m is more than a quarter of a wavelength at ${frequencyHz} Hz, so the loop is not small.`;
  }
  return nearFieldReason(frequencyHz, distanceM);
}
