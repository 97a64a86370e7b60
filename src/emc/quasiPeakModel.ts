/** The quasi-peak receiver of a band: 6 dB bandwidth, time constants, and the pulse rate its response is stated from. */
export interface QuasiPeakReceiver {
  bandwidthHz: number;
  chargeS: number;
  dischargeS: number;
  meterS: number;
  referencePrfHz: number;
}

/** A detector's charging resistance as a time constant, and its voltage on a steady carrier of amplitude 1. */
export interface QuasiPeakDetector {
  resistanceS: number;
  ofCarrier: number;
}

/** In units of 1/ω: where an envelope has faded to 10⁻⁴ of its peak, and how finely it is followed until then. */
export const ENVELOPE_END = 13;
const ENVELOPE_STEPS = 130;
/** Steps per shorter time constant between pulses, and of the charge time. */
const GAP_STEPS = 60;
const CHARGE_STEPS = 100;
/** Longer time constants until the deflection repeats: e⁻⁹ is 10⁻⁴. */
const SETTLED = 9;

/** ω of the envelope: πB6/√2, for two stages that together are 6 dB down at ± B6/2. */
export function envelopeRate({ bandwidthHz }: QuasiPeakReceiver): number {
  return (Math.PI * bandwidthHz) / Math.SQRT2;
}

/** The envelope behind two critically coupled stages after an impulse, x being ωt. 2ω times its peak is the impulse bandwidth, 1.048 B6. */
function envelope(x: number): number {
  return Math.abs(Math.exp(-x) * (Math.sin(x) - x * Math.cos(x)));
}

/** It is largest where its slope, e⁻ˣ(x sin x + x cos x − sin x), vanishes. */
export const ENVELOPE_PEAK = envelope(rootOf((x) => x * (Math.sin(x) + Math.cos(x)) - Math.sin(x), 1, Math.PI));

/** Its course in parts of its peak, at every half step. */
const ENVELOPE = Float64Array.from({ length: 2 * ENVELOPE_STEPS + 1 }, (_, i) => {
  return envelope((i * ENVELOPE_END) / (2 * ENVELOPE_STEPS)) / ENVELOPE_PEAK;
});

/**
 * The charging resistance times the capacitance, such that a carrier applied suddenly brings the capacitor to 63 % of
 * its final voltage within the charge time. Source: CISPR 16-1-1, definition of the charge time constant.
 */
export function quasiPeakDetector({ chargeS, dischargeS }: QuasiPeakReceiver): QuasiPeakDetector {
  const finalWith = (resistanceS: number) => rootOf((v) => charge(1, v) / resistanceS - v / dischargeS, 0, 1);
  const ahead = (resistanceS: number) => {
    let v = 0;
    for (let i = 0; i < CHARGE_STEPS; i++) v = charged(v, 1, 1, 1, resistanceS, dischargeS, chargeS / CHARGE_STEPS);
    return v - (1 - Math.exp(-1)) * finalWith(resistanceS);
  };
  const resistanceS = rootOf(ahead, chargeS / 50, chargeS);
  return { resistanceS, ofCarrier: finalWith(resistanceS) };
}

/**
 * Highest deflection of the meter for pulses whose envelope peaks at 1, once they repeat; `periodS` is Infinity for one
 * alone. Capacitor: charge through the resistance, discharge through the load. Meter: critically damped.
 */
export function highestDeflection(receiver: QuasiPeakReceiver, detector: QuasiPeakDetector, periodS: number): number {
  const { dischargeS, meterS } = receiver;
  const settledS = SETTLED * Math.max(dischargeS, meterS);
  const envelopeS = ENVELOPE_END / envelopeRate(receiver);
  const gapS = Math.min(periodS, settledS) - envelopeS;
  const gapSteps = Math.ceil((gapS * GAP_STEPS) / Math.min(dischargeS, meterS));
  const meter = criticallyDamped(meterS);
  let v = 0;
  let highest = 0;
  const advance = (to: number, dt: number) => {
    highest = Math.max(highest, meter(v, to, dt));
    v = to;
  };
  for (let pulse = 0; pulse <= settledS / periodS; pulse++) {
    const dt = envelopeS / ENVELOPE_STEPS;
    for (let i = 0; i < ENVELOPE.length - 2; i += 2) {
      const [start, middle, end] = [ENVELOPE[i]!, ENVELOPE[i + 1]!, ENVELOPE[i + 2]!];
      advance(charged(v, start, middle, end, detector.resistanceS, dischargeS, dt), dt);
    }
    const kept = Math.exp(-gapS / gapSteps / dischargeS);
    for (let i = 0; i < gapSteps; i++) advance(v * kept, gapS / gapSteps);
  }
  return highest;
}

/** Capacitor voltage after a step over which the carrier's amplitude is known at three places (Runge-Kutta). */
function charged(
  v: number,
  start: number,
  middle: number,
  end: number,
  resistanceS: number,
  dischargeS: number,
  dt: number,
): number {
  const slope = (amplitude: number, at: number) => charge(amplitude, at) / resistanceS - at / dischargeS;
  const a = slope(start, v);
  const b = slope(middle, v + (a * dt) / 2);
  const c = slope(middle, v + (b * dt) / 2);
  const d = slope(end, v + c * dt);
  return v + (dt / 6) * (a + 2 * b + 2 * c + d);
}

/** A meter at rest: T²m″ + 2T m′ + m = v, solved exactly for a voltage that runs straight over a step; answers m. */
function criticallyDamped(timeS: number): (from: number, to: number, dt: number) => number {
  let deflection = 0;
  let speed = 0;
  return (from, to, dt) => {
    const slope = (to - from) / dt;
    const offset = deflection - (from - 2 * timeS * slope);
    const growth = speed - slope + offset / timeS;
    const kept = Math.exp(-dt / timeS);
    const left = (offset + growth * dt) * kept;
    deflection = to - 2 * timeS * slope + left;
    speed = slope + growth * kept - left / timeS;
    return deflection;
  };
}

/** What a half-wave rectified carrier drives through the charging resistance into a capacitor at v, over one cycle. */
function charge(amplitude: number, v: number): number {
  if (amplitude <= v) return 0;
  const angle = Math.acos(v / amplitude);
  return (amplitude * Math.sin(angle) - angle * v) / Math.PI;
}

/** Where a function that falls through zero between two places does so. */
function rootOf(valueAt: (x: number) => number, from: number, to: number): number {
  let [low, high] = [from, to];
  for (let turn = 0; turn < 60; turn++) {
    const middle = (low + high) / 2;
    if (valueAt(middle) > 0) low = middle;
    else high = middle;
  }
  return (low + high) / 2;
}
