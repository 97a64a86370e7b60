/** Speed of light in vacuum, m/s. Source: SI definition of the metre. */
export const SPEED_OF_LIGHT = 299_792_458;

/** Magnetic constant, H/m: 4π·10⁻⁷, which CODATA 2018 confirms to 1 part in 10⁹. */
export const MAGNETIC_CONSTANT = 4e-7 * Math.PI;

/** Wave impedance of free space, ohm: μ0·c = 376.73. */
export const WAVE_IMPEDANCE = MAGNETIC_CONSTANT * SPEED_OF_LIGHT;

/**
 * How the ground enters an estimate. `free-space`: the source alone. `ground-plane-doubled`: the reflected ray adds in
 * phase and doubles the field, 6.02 dB, the most that a reflecting plane can do. Published formulas print either.
 */
export type GroundForm = 'free-space' | 'ground-plane-doubled';

/** 1 or 2: what the form multiplies the field of the source alone by. */
export function groundFactor(form: GroundForm): 1 | 2 {
  return form === 'ground-plane-doubled' ? 2 : 1;
}

/** Wavelength in free space, m. Throws RangeError unless the frequency is finite and above zero. */
export function wavelengthM(frequencyHz: number): number {
  return SPEED_OF_LIGHT / positive('Frequency', frequencyHz, 'Hz');
}

/**
 * Why the 1/r field of a small source does not hold at a distance, as a sentence, or null where it does: it needs at
 * least λ/2π, where the near terms of a short dipole and a small loop are as large. Source: standard antenna theory
 * texts, the fields of a Hertzian dipole.
 */
export function nearFieldReason(frequencyHz: number, distanceM: number): string | null {
  const boundaryM = wavelengthM(frequencyHz) / (2 * Math.PI);
  if (positive('Distance', distanceM, 'm') >= boundaryM) return null;
  return `${distanceM} m is nearer than a wavelength over 2π at ${frequencyHz} Hz, where the field does not fall as 1/r.`;
}

/** The value itself. Throws RangeError, naming it, unless it is finite and above zero. */
export function positive(name: string, value: number, unit: string): number {
  if (!(value > 0 && Number.isFinite(value))) throw new RangeError(`${name} ${value} ${unit} is not above zero.`);
  return value;
}
