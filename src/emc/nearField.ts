import { positive, SPEED_OF_LIGHT, wavelengthM } from './freeSpace';

/**
 * Where the reactive field of a source that is small against the wavelength has faded: λ/2π, in metres. Source: field
 * of a short dipole, whose 1/r and 1/r² terms are equal there. Throws RangeError on a frequency of zero or less.
 */
export function smallSourceBoundaryM(frequencyHz: number): number {
  return wavelengthM(frequencyHz) / (2 * Math.PI);
}

/** The frequency at which a distance is λ/2π: c/2πd, in hertz. Throws RangeError on a distance of zero or less. */
export function smallSourceBoundaryHz(distanceM: number): number {
  return SPEED_OF_LIGHT / (2 * Math.PI * positive('Distance', distanceM, 'm'));
}

/**
 * Where the far field of a source of largest extent D begins: 2D²/λ, in metres. Source: the outer parts of the source
 * are then no more than λ/16 farther away than its middle. Throws RangeError on a frequency or extent of zero or less.
 */
export function largeSourceBoundaryM(frequencyHz: number, extentM: number): number {
  return (2 * positive('Extent', extentM, 'm') ** 2) / wavelengthM(frequencyHz);
}
