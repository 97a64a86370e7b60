import { positive } from './freeSpace';

/** V-networks of CISPR 16-1-2 by what stands across the receiver's 50 ohm. */
export const AMN_CIRCUITS = ['50 ohm || 50 uH', '50 ohm || (50 uH + 5 ohm)'] as const;
export type AmnCircuit = (typeof AMN_CIRCUITS)[number];

export interface Impedance {
  magnitudeOhm: number;
  phaseDeg: number;
}

const LOAD_OHM = 50;
const INDUCTANCE_H = 50e-6;
/** Source: CISPR 16-1-2:2014 (from memory). */
const MAGNITUDE_TOLERANCE = 0.2;
const PHASE_TOLERANCE_DEG = 11.5;

/**
 * Nominal impedance between a line and ground of an artificial mains network: 50 Ω parallel to R + jω·50 µH, with R of
 * 0 or 5 Ω. Source: CISPR 16-1-2:2014, V-networks. Throws RangeError on a frequency of zero or less.
 */
export function amnImpedance(circuit: AmnCircuit, frequencyHz: number): Impedance {
  const seriesOhm = circuit === '50 ohm || (50 uH + 5 ohm)' ? 5 : 0;
  const reactanceOhm = 2 * Math.PI * positive('Frequency', frequencyHz, 'Hz') * INDUCTANCE_H;
  const branch = { magnitude: Math.hypot(seriesOhm, reactanceOhm), phase: Math.atan2(reactanceOhm, seriesOhm) };
  // Z1·Z2/(Z1 + Z2) in polar form
  const magnitudeOhm = (LOAD_OHM * branch.magnitude) / Math.hypot(LOAD_OHM + seriesOhm, reactanceOhm);
  const phase = branch.phase - Math.atan2(reactanceOhm, LOAD_OHM + seriesOhm);
  return { magnitudeOhm, phaseDeg: (phase * 180) / Math.PI };
}

/** A measured impedance beside the nominal one. */
export interface AmnDeviation {
  nominal: Impedance;
  /** Part of the nominal magnitude, 0.2 being 20 % too much. */
  magnitudeRatio: number;
  phaseDeg: number;
  within: boolean;
}

/**
 * A measured impedance against the network's: within ±20 % in magnitude and ±11.5° in phase. Source: CISPR 16-1-2:2014
 * (from memory). Throws RangeError on a frequency or magnitude of zero or less and on a phase that is not finite.
 */
export function amnDeviation(circuit: AmnCircuit, frequencyHz: number, measured: Impedance): AmnDeviation {
  positive('Impedance', measured.magnitudeOhm, 'ohm');
  if (!Number.isFinite(measured.phaseDeg)) throw new RangeError(`${measured.phaseDeg} degrees is no phase.`);
  const nominal = amnImpedance(circuit, frequencyHz);
  const magnitudeRatio = measured.magnitudeOhm / nominal.magnitudeOhm - 1;
  const phaseDeg = measured.phaseDeg - nominal.phaseDeg;
  const within = Math.abs(magnitudeRatio) <= MAGNITUDE_TOLERANCE && Math.abs(phaseDeg) <= PHASE_TOLERANCE_DEG;
  return { nominal, magnitudeRatio, phaseDeg, within };
}
