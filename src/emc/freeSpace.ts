/** Speed of light in vacuum, exact. Source: SI definition of the metre. */
export const SPEED_OF_LIGHT_M_PER_S = 299_792_458;

/** Wave impedance of free space √(µ0/ε0). Source: CODATA 2018; printed as 376.73 Ω, and as 377 Ω or 120π Ω. */
export const FREE_SPACE_IMPEDANCE_OHM = 376.730313668;

/** Free-space wavelength c/f in metres. Throws RangeError unless the frequency is finite and above zero. */
export function wavelengthM(frequencyHz: number): number {
  return SPEED_OF_LIGHT_M_PER_S / positive(frequencyHz, 'Hz', 'frequency');
}

/**
 * Where the reactive field of a source that is small against the wavelength has faded: λ/2π, in metres. Source: field
 * of a short dipole, whose 1/r and 1/r² terms are equal there.
 */
export function smallSourceBoundaryM(frequencyHz: number): number {
  return wavelengthM(frequencyHz) / (2 * Math.PI);
}

/** The frequency above which a distance lies beyond λ/2π: c/(2πd), in hertz. Throws RangeError on a distance of zero or less. */
export function smallSourceBoundaryHz(distanceM: number): number {
  return SPEED_OF_LIGHT_M_PER_S / (2 * Math.PI * positive(distanceM, 'm', 'distance'));
}

/**
 * Where the far field of a source of largest extent D begins: 2D²/λ, in metres. Source: the outer parts of the source
 * are then no more than λ/16 farther away than its middle. Throws RangeError on an extent of zero or less.
 */
export function largeSourceBoundaryM(frequencyHz: number, extentM: number): number {
  return (2 * positive(extentM, 'm', 'extent') ** 2) / wavelengthM(frequencyHz);
}

/** The figure itself. Throws RangeError, naming it, unless it is finite and above zero. */
export function positive(figure: number, unit: string, what: string): number {
  if (!(figure > 0 && Number.isFinite(figure))) throw new RangeError(`${figure} ${unit} is no ${what}.`);
  return figure;
}
