import { positive } from './freeSpace';
import { dbuvFromDbm } from './units';

/** Thermal noise of a matched source at 290 K in 1 Hz: 10 log10(k·290 K/1 mW), printed −174. k: SI definition. */
export const THERMAL_NOISE_DBM_PER_HZ = 10 * Math.log10(1.380649e-23 * 290 * 1e3);

/**
 * R.m.s. noise of a receiver in dBµV at its 50 Ω input: −174 dBm + 10 log10(RBW/Hz) + noise figure. A peak or quasi-peak
 * reading of it lies above. With the path's factors added it is the lowest field that can be read. `rbwHz` is taken as
 * the noise bandwidth. Source: definition of the noise figure. Throws RangeError on an RBW of zero or less.
 */
export function receiverNoiseDbuv(rbwHz: number, noiseFigureDb: number): number {
  return dbuvFromDbm(THERMAL_NOISE_DBM_PER_HZ + 10 * Math.log10(positive('RBW', rbwHz, 'Hz')) + noiseFigureDb);
}

/**
 * How readings change from one RBW to another, in dB: noise with the bandwidth (10 log10 of the ratio), the peak of
 * pulses shorter than the filter can follow with its square (20 log10); a steady carrier not at all. Source: power and
 * voltage of broadband signals. Throws RangeError on an RBW of zero or less.
 */
export function rbwChange(fromHz: number, toHz: number): { noiseDb: number; impulseDb: number } {
  const decades = Math.log10(positive('RBW', toHz, 'Hz') / positive('RBW', fromHz, 'Hz'));
  return { noiseDb: 10 * decades, impulseDb: 20 * decades };
}
