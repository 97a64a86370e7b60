import { positive, SPEED_OF_LIGHT } from './freeSpace';

/** Two antennas over a reflecting ground plane; heights above it, distance along it, in metres. */
export interface RayGeometry {
  distanceM: number;
  txHeightM: number;
  rxHeightM: number;
}

export interface GroundPlaneRays {
  directM: number;
  reflectedM: number;
  pathDifferenceM: number;
  /** Between the reflected ray and the plane. */
  grazingAngleDeg: number;
  /** Along the plane from below the transmitter. */
  reflectionPointFromTxM: number;
  /** Where a horizontally polarised field first vanishes: the difference is one wavelength. */
  firstHorizontalNullHz: number;
  /** Where it is first largest: the difference is half a wavelength. */
  firstHorizontalPeakHz: number;
}

/**
 * The direct and the reflected ray between two antennas. Source: image theory; the reflected ray of a horizontally
 * polarised field turns its phase by 180°. Throws RangeError on a distance or height of zero or less.
 */
export function groundPlaneRays({ distanceM, txHeightM, rxHeightM }: RayGeometry): GroundPlaneRays {
  positive('Distance', distanceM, 'm');
  const sumM = positive('Height', txHeightM, 'm') + positive('Height', rxHeightM, 'm');
  const directM = Math.hypot(distanceM, txHeightM - rxHeightM);
  const reflectedM = Math.hypot(distanceM, sumM);
  // The difference of squares is 4·h1·h2; divided so, nothing cancels at long distances.
  const pathDifferenceM = (4 * txHeightM * rxHeightM) / (directM + reflectedM);
  return {
    directM,
    reflectedM,
    pathDifferenceM,
    grazingAngleDeg: (Math.atan2(sumM, distanceM) * 180) / Math.PI,
    reflectionPointFromTxM: (distanceM * txHeightM) / sumM,
    firstHorizontalNullHz: SPEED_OF_LIGHT / pathDifferenceM,
    firstHorizontalPeakHz: SPEED_OF_LIGHT / (2 * pathDifferenceM),
  };
}
