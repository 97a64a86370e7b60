import { positive, WAVE_IMPEDANCE } from './freeSpace';

// Far field in free space throughout: no ground reflection, beyond `smallSourceBoundaryM` and `largeSourceBoundaryM`.

/**
 * Level at 1 m of 0 dBm EIRP: E = √(30 Ω · P)/d, 104.7712 dBµV/m. Source: power density P/4πd² with 120π Ω, the form
 * of the US regulator's guidance; with 376.73 Ω it is 0.003 dB less.
 */
const EIRP_AT_1_M_DB = 120 + 10 * Math.log10(30e-3);

/** Gain of a half-wave dipole over an isotropic radiator as ERP counts it; computed 2.151 dBi, printed 2.15 or 2.14. */
export const HALF_WAVE_DIPOLE_DBI = 2.15;

const Z0_DB_OHM = 20 * Math.log10(WAVE_IMPEDANCE);

/** EIRP in dBm to dBµV/m at a distance: E = √(30 P)/d. Throws RangeError on a distance of zero or less. */
export function fieldFromEirp(eirpDbm: number, distanceM: number): number {
  return eirpDbm + EIRP_AT_1_M_DB - spreadingDb(distanceM);
}

/** dBµV/m at a distance to the EIRP in dBm that makes it: P = (E d)²/30. Throws as `fieldFromEirp`. */
export function eirpFromField(fieldDbuvPerM: number, distanceM: number): number {
  return fieldDbuvPerM - EIRP_AT_1_M_DB + spreadingDb(distanceM);
}

/** ERP (over a half-wave dipole) to EIRP, both dBm: + 2.15 dB. Source: definitions. */
export function eirpFromErp(erpDbm: number): number {
  return erpDbm + HALF_WAVE_DIPOLE_DBI;
}

/** EIRP to ERP, both dBm: − 2.15 dB. Source: definitions. */
export function erpFromEirp(eirpDbm: number): number {
  return eirpDbm - HALF_WAVE_DIPOLE_DBI;
}

/** ERP in dBm to dBµV/m at a distance. Throws as `fieldFromEirp`. */
export function fieldFromErp(erpDbm: number, distanceM: number): number {
  return fieldFromEirp(eirpFromErp(erpDbm), distanceM);
}

/** dBµV/m at a distance to the ERP in dBm that makes it. Throws as `fieldFromEirp`. */
export function erpFromField(fieldDbuvPerM: number, distanceM: number): number {
  return erpFromEirp(eirpFromField(fieldDbuvPerM, distanceM));
}

/** dBµV/m to dBµA/m of a plane wave: − 20 log10(376.73) = − 51.52 dB. Source: H = E/Z0; printed 51.5. */
export function magneticFromElectric(fieldDbuvPerM: number): number {
  return fieldDbuvPerM - Z0_DB_OHM;
}

/** dBµA/m to dBµV/m of a plane wave: + 51.52 dB. Limits below 30 MHz in dBµV/m are read off a loop this way. */
export function electricFromMagnetic(fieldDbuaPerM: number): number {
  return fieldDbuaPerM + Z0_DB_OHM;
}

/** dBµA/m to dBpT in air: + 20 log10(4π/10) = + 1.984 dB. Source: B = µ0 H; printed 2. */
export function fluxDensityFromMagnetic(fieldDbuaPerM: number): number {
  return fieldDbuaPerM + 20 * Math.log10((4 * Math.PI) / 10);
}

/** Power flux in dBm/m² to dBµV/m of a plane wave: + 115.76 dB. Source: S = E²/Z0; printed 115.8. */
export function fieldFromPowerFlux(fluxDbmPerM2: number): number {
  return fluxDbmPerM2 + 90 + Z0_DB_OHM / 2;
}

/** dBµV/m to power flux in dBm/m² of a plane wave. Source: S = E²/Z0. */
export function powerFluxFromField(fieldDbuvPerM: number): number {
  return fieldDbuvPerM - 90 - Z0_DB_OHM / 2;
}

function spreadingDb(distanceM: number): number {
  return 20 * Math.log10(positive('Distance', distanceM, 'm'));
}
