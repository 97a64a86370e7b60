import { positive } from './freeSpace';
import {
  ENVELOPE_END,
  ENVELOPE_PEAK,
  envelopeRate,
  highestDeflection,
  quasiPeakDetector,
  type QuasiPeakReceiver,
} from './quasiPeakModel';

/** Source: CISPR 16-1-1:2019, quasi-peak receivers (bandwidths and constants verified, reference rates from memory). */
export const QUASI_PEAK_RECEIVERS = {
  A: { bandwidthHz: 200, chargeS: 45e-3, dischargeS: 500e-3, meterS: 160e-3, referencePrfHz: 25 },
  B: { bandwidthHz: 9e3, chargeS: 1e-3, dischargeS: 160e-3, meterS: 160e-3, referencePrfHz: 100 },
  'C and D': { bandwidthHz: 120e3, chargeS: 1e-3, dischargeS: 550e-3, meterS: 100e-3, referencePrfHz: 100 },
} as const satisfies Record<string, QuasiPeakReceiver>;

/** Pulses per second, or one pulse alone. */
export type PulseRate = number | 'isolated';

/**
 * By how many dB the quasi-peak of short, equal pulses lies below their peak. The receiver is modelled: two critically
 * coupled double-tuned stages, whose envelope after an impulse is sin(ωt) − ωt·cos(ωt) under exp(−ωt) with ω = πB6/√2;
 * a half-wave detector whose charge time is that of a suddenly applied carrier; a discharge; a critically damped meter,
 * of which the highest deflection counts. Null where pulses follow so fast that their envelopes overlap, which this
 * model does not add. Source: CISPR 16-1-1, whose table allows 1 to 2 dB; computed. Throws RangeError on a rate of zero
 * or less.
 */
export function quasiPeakBelowPeakDb(receiver: QuasiPeakReceiver, rate: PulseRate): number | null {
  const periodS = rate === 'isolated' ? Infinity : 1 / positive('Pulse rate', rate, 'Hz');
  if (periodS * envelopeRate(receiver) < ENVELOPE_END) return null;
  const detector = quasiPeakDetector(receiver);
  const highest = highestDeflection(receiver, detector, periodS);
  return -20 * Math.log10(highest / detector.ofCarrier);
}

/**
 * How much more a pulse train at this rate needs than one at the reference rate for the same quasi-peak, in dB: the
 * relative pulse response of CISPR 16-1-1. Null and errors as `quasiPeakBelowPeakDb`.
 */
export function relativePulseResponseDb(receiver: QuasiPeakReceiver, rate: PulseRate): number | null {
  const belowDb = quasiPeakBelowPeakDb(receiver, rate);
  const referenceDb = quasiPeakBelowPeakDb(receiver, receiver.referencePrfHz);
  return belowDb === null || referenceDb === null ? null : belowDb - referenceDb;
}

/**
 * Quasi-peak in dBµV (r.m.s. of the carrier that reads the same) of pulses with an area in volt seconds: peak of the
 * envelope 2·area·1.05·B6. Null and errors as `quasiPeakBelowPeakDb`. Source: CISPR 16-1-1, absolute pulse response.
 */
export function quasiPeakOfPulsesDbuv(receiver: QuasiPeakReceiver, areaVs: number, rate: PulseRate): number | null {
  const belowDb = quasiPeakBelowPeakDb(receiver, rate);
  if (belowDb === null) return null;
  const impulseBandwidthHz = 2 * ENVELOPE_PEAK * envelopeRate(receiver);
  const peakV = 2 * positive('Pulse area', areaVs, 'Vs') * impulseBandwidthHz;
  return 20 * Math.log10((peakV / Math.SQRT2) * 1e6) - belowDb;
}
