import { positive, WAVE_IMPEDANCE, wavelengthM } from './freeSpace';

/**
 * Antenna factor in dB/m of an antenna with gain G (dBi, mismatch and loss included) into a load: AF = √(4π Z0/(G R))/λ,
 * which in 50 Ω is 9.7305/(λ√G) or 20 log10(f/MHz) − G − 29.77 (29.79 and 29.8 in print), in 75 Ω − 31.53. Free space.
 * Source: effective aperture Gλ²/4π. Throws RangeError on a frequency or load of zero or less.
 */
export function antennaFactorFromGain(frequencyHz: number, gainDbi: number, loadOhm: number): number {
  return isotropicFactorDb(frequencyHz, loadOhm) - gainDbi;
}

/** Gain in dBi from an antenna factor in dB/m, the same relation the other way. Throws as `antennaFactorFromGain`. */
export function gainFromAntennaFactor(frequencyHz: number, antennaFactorDbPerM: number, loadOhm: number): number {
  return isotropicFactorDb(frequencyHz, loadOhm) - antennaFactorDbPerM;
}

function isotropicFactorDb(frequencyHz: number, loadOhm: number): number {
  const ratio = (4 * Math.PI * WAVE_IMPEDANCE) / positive('Load', loadOhm, 'ohm');
  return 10 * Math.log10(ratio) - 20 * Math.log10(wavelengthM(frequencyHz));
}
