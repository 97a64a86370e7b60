import { positive } from './freeSpace';
import { dbuvFromMicrovolts } from './units';

/** A periodic trapezoid between 0 and its amplitude. */
export interface Trapezoid {
  amplitudeV: number;
  frequencyHz: number;
  /** From 0 to 100 % of the amplitude, as fall is. */
  riseS: number;
  fallS: number;
  /** Width at half the amplitude over the period. */
  dutyCycle: number;
}

/** What rounding leaves of a null, as a part of the amplitude. Chosen here, far under any harmonic that is read. */
const NULL_PART = 1e-12;

/**
 * Peak of the n-th harmonic, V, exactly: A/(πn)·|sinc(n·tr/T) − sinc(n·tf/T)·exp(−j2πn·τ/T)|, which for equal edges is
 * the published 2A·(τ/T)·|sinc(nτ/T)|·|sinc(n·tr/T)| with sinc x = sin(πx)/(πx). 0 at a null.
 * Throws RangeError on what is no trapezoid and unless n is an integer above zero.
 * Source: EMC textbooks on spectra of digital clock signals; unequal edges by differentiating the waveform once, which
 * leaves two rectangles.
 */
export function harmonicPeakV(wave: Trapezoid, n: number): number {
  checkTrapezoid(wave);
  if (!(Number.isInteger(n) && n > 0)) throw new RangeError(`${n} is no harmonic.`);
  const rise = sinc(n * wave.riseS * wave.frequencyHz);
  const fall = sinc(n * wave.fallS * wave.frequencyHz);
  const phase = 2 * Math.PI * n * wave.dutyCycle;
  const parts = Math.hypot(rise - fall * Math.cos(phase), fall * Math.sin(phase));
  return parts < NULL_PART * n ? 0 : (wave.amplitudeV / (Math.PI * n)) * parts;
}

/** The same in dBµV; null at a null, which has no level. */
export function harmonicPeakDbuv(wave: Trapezoid, n: number): number | null {
  return dbuvFromMicrovolts(harmonicPeakV(wave, n) * 1e6);
}

/**
 * Corners of the envelope: 1/(πτ), from which it falls by 20 dB per decade, and 1/(π·t) with the faster of the edges,
 * from which it falls by 40. Throws RangeError on what is no trapezoid.
 * Source: EMC textbooks on spectra of digital clock signals. With unequal edges the faster one bounds both.
 */
export function envelopeCorners(wave: Trapezoid): { firstHz: number; secondHz: number } {
  checkTrapezoid(wave);
  return {
    firstHz: wave.frequencyHz / (Math.PI * wave.dutyCycle),
    secondHz: 1 / (Math.PI * Math.min(wave.riseS, wave.fallS)),
  };
}

/**
 * Envelope of the peaks of the harmonics at a frequency, dBµV: 2A·τ/T up to the first corner, then falling. No harmonic
 * lies above it. It stands for harmonics, so below the fundamental it is null. Throws RangeError on what is no
 * trapezoid and unless the frequency is finite and above zero.
 */
export function envelopePeakDbuv(wave: Trapezoid, frequencyHz: number): number | null {
  const { firstHz, secondHz } = envelopeCorners(wave);
  if (positive('Frequency', frequencyHz, 'Hz') < wave.frequencyHz) return null;
  const flatV = 2 * wave.amplitudeV * wave.dutyCycle;
  return dbuvFromMicrovolts(flatV * 1e6 * Math.min(1, firstHz / frequencyHz) * Math.min(1, secondHz / frequencyHz));
}

function checkTrapezoid({ amplitudeV, frequencyHz, riseS, fallS, dutyCycle }: Trapezoid): void {
  positive('Amplitude', amplitudeV, 'V');
  const ofPeriod = positive('Frequency', frequencyHz, 'Hz') / 2;
  const edges = (positive('Rise time', riseS, 's') + positive('Fall time', fallS, 's')) * ofPeriod;
  if (!(dutyCycle > 0 && dutyCycle < 1)) throw new RangeError(`Duty cycle ${dutyCycle} is not between 0 and 1.`);
  // A triangle is still a trapezoid; its edges fill the width but for rounding.
  if (edges > Math.min(dutyCycle, 1 - dutyCycle) * (1 + 1e-9)) {
    throw new RangeError(
      `Edges of ${riseS} s and ${fallS} s do not fit a duty cycle of ${dutyCycle} at ${frequencyHz} Hz.`,
    );
  }
}

/** sin(πx)/(πx), exactly 0 at whole numbers. */
function sinc(x: number): number {
  if (x === 0) return 1;
  const nearest = Math.round(x);
  const sign = nearest % 2 === 0 ? 1 : -1;
  return (sign * Math.sin(Math.PI * (x - nearest))) / (Math.PI * x);
}
