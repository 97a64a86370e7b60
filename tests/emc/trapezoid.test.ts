import radiation from '@fixtures/published/radiation.json';
import fc from 'fast-check';
import { envelopeCorners, envelopePeakDbuv, harmonicPeakDbuv, harmonicPeakV, type Trapezoid } from '@/emc/trapezoid';

const { trapezoidSpectrum: published } = radiation;
const { worked } = published;
const clock: Trapezoid = {
  amplitudeV: worked.amplitudeV,
  frequencyHz: worked.freqMHz * 1e6,
  riseS: worked.riseNs * 1e-9,
  fallS: worked.riseNs * 1e-9,
  dutyCycle: worked.dutyCycle,
};

/** Peak of a harmonic summed over samples of the waveform, as far from the closed form as can be. */
function summed({ amplitudeV, frequencyHz, riseS, fallS, dutyCycle }: Trapezoid, n: number): number {
  const samples = 40_000;
  const [rise, fall] = [riseS * frequencyHz, fallS * frequencyHz];
  const high = dutyCycle - (rise + fall) / 2;
  let [real, imaginary] = [0, 0];
  for (let i = 0; i < samples; i++) {
    const t = (i + 0.5) / samples;
    const value = t < rise ? t / rise : t < rise + high ? 1 : t < rise + high + fall ? 1 - (t - rise - high) / fall : 0;
    real += (value * Math.cos(2 * Math.PI * n * t)) / samples;
    imaginary += (value * Math.sin(2 * Math.PI * n * t)) / samples;
  }
  return 2 * amplitudeV * Math.hypot(real, imaginary);
}

const anyTrapezoid = fc
  .record({
    amplitudeV: fc.double({ min: 0.1, max: 50, noNaN: true }),
    frequencyHz: fc.double({ min: 1e4, max: 1e9, noNaN: true }),
    dutyCycle: fc.double({ min: 0.05, max: 0.95, noNaN: true }),
    rise: fc.double({ min: 0.02, max: 0.98, noNaN: true }),
    fall: fc.double({ min: 0.02, max: 0.98, noNaN: true }),
  })
  .map(({ rise, fall, ...wave }): Trapezoid => {
    const room = Math.min(wave.dutyCycle, 1 - wave.dutyCycle) / wave.frequencyHz;
    return { ...wave, riseS: rise * room, fallS: fall * room };
  });

describe('harmonics of a trapezoid (spectra of digital clock signals, verified form)', () => {
  test.each(worked.rows)(
    'harmonic $n of 3.3 V at 25 MHz, 1 ns edges, 50 % (computed; numpy.fft.rfft agrees)',
    (row) => {
      expect(harmonicPeakV(clock, row.n)).toBeCloseTo(row.peakV, 5);
      expect(Math.abs(harmonicPeakV(clock, row.n) - row.fftPeakV)).toBeLessThan(5e-6);
      if (row.peakDbUv === null) expect(harmonicPeakDbuv(clock, row.n)).toBeNull();
      else expect(harmonicPeakDbuv(clock, row.n)).toBeCloseTo(row.peakDbUv, 3);
      expect(envelopePeakDbuv(clock, row.freqMHz * 1e6)).toBeCloseTo(row.envelopeDbUv, 3);
    },
  );

  test('at exactly 50 % every even harmonic vanishes (verified), and stays without a level', () => {
    for (let n = 2; n <= 200; n += 2) {
      expect(harmonicPeakV(clock, n)).toBe(0);
      expect(harmonicPeakDbuv(clock, n)).toBeNull();
      expect(harmonicPeakV(clock, n - 1)).toBeGreaterThan(0);
    }
  });

  test('nulls at k/tr: 10 MHz with 5 ns edges at multiples of 200 MHz, with 0.5 ns first at 2 GHz (verified)', () => {
    const { nullMHz } = published.nulls[1]!;
    const slow = { ...clock, frequencyHz: 10e6, riseS: 5e-9, fallS: 5e-9, dutyCycle: 0.43 };
    const zeros = (wave: Trapezoid) =>
      Array.from({ length: 200 }, (_, i) => i + 1).filter((n) => harmonicPeakV(wave, n) === 0);
    // n = 100 and 200 are nulls of the width as well: 43 and 86 whole periods of it.
    expect(zeros(slow)).toEqual(Array.from({ length: 10 }, (_, k) => ((k + 1) * nullMHz!) / 10));
    const fast = { ...slow, riseS: 0.5e-9, fallS: 0.5e-9, dutyCycle: Math.SQRT1_2 / 2 };
    expect(zeros(fast)).toEqual([200]);
  });

  test('nulls at k/tau for other duty cycles (verified)', () => {
    const quarter = { ...clock, dutyCycle: 0.25 };
    expect([1, 2, 3, 4, 5, 8].map((n) => harmonicPeakV(quarter, n) === 0)).toEqual([
      false,
      false,
      false,
      true,
      false,
      true,
    ]);
  });

  test.each(published.evenHarmonicSensitivity.rows)(
    'second harmonic at duty $dutyCycle: $secondHarmonicRelFundamentalDb dB against the first (computed)',
    ({ dutyCycle, secondHarmonicRelFundamentalDb }) => {
      const wave = { ...clock, dutyCycle };
      const second = harmonicPeakDbuv(wave, 2);
      if (secondHarmonicRelFundamentalDb === null) expect(second).toBeNull();
      else expect(second! - harmonicPeakDbuv(wave, 1)!).toBeCloseTo(secondHarmonicRelFundamentalDb, 2);
    },
  );

  test('with equal and unequal edges it is what summing the waveform gives (property)', () => {
    fc.assert(
      fc.property(anyTrapezoid, fc.integer({ min: 1, max: 25 }), (wave, n) => {
        expect(harmonicPeakV(wave, n) / wave.amplitudeV).toBeCloseTo(summed(wave, n) / wave.amplitudeV, 4);
      }),
      { numRuns: 40 },
    );
  });

  test('exchanging the edges, or looking at the low part instead of the high, changes no harmonic (property)', () => {
    fc.assert(
      fc.property(anyTrapezoid, fc.integer({ min: 1, max: 100 }), (wave, n) => {
        const at = harmonicPeakV(wave, n) / wave.amplitudeV;
        const turned = { ...wave, riseS: wave.fallS, fallS: wave.riseS };
        expect(harmonicPeakV(turned, n) / wave.amplitudeV).toBeCloseTo(at, 9);
        expect(harmonicPeakV({ ...wave, dutyCycle: 1 - wave.dutyCycle }, n) / wave.amplitudeV).toBeCloseTo(at, 9);
      }),
    );
  });
});

describe('envelope of a trapezoid (spectra of digital clock signals, verified form)', () => {
  test('corners of the worked clock at 15.9155 and 318.3099 MHz (computed)', () => {
    const { firstHz, secondHz } = envelopeCorners(clock);
    expect(firstHz / 1e6).toBeCloseTo(worked.firstCornerMHz, 4);
    expect(secondHz / 1e6).toBeCloseTo(worked.secondCornerMHz, 4);
  });

  test.each(published.corners2)('an edge of $riseNs ns turns at $secondCornerMHz MHz (computed)', (row) => {
    const edges = { riseS: row.riseNs * 1e-9, fallS: 12e-9, frequencyHz: 10e6 };
    expect(envelopeCorners({ ...clock, ...edges }).secondHz / 1e6).toBeCloseTo(row.secondCornerMHz, 4);
    // The faster edge decides, whichever it is.
    const turned = { ...edges, riseS: edges.fallS, fallS: edges.riseS };
    expect(envelopeCorners({ ...clock, ...turned }).secondHz / 1e6).toBeCloseTo(row.secondCornerMHz, 4);
  });

  test('0, -20 and -40 dB per decade, joined at the corners', () => {
    const slow = { ...clock, frequencyHz: 1e3, dutyCycle: 0.01, riseS: 1e-8, fallS: 1e-8 };
    const { firstHz, secondHz } = envelopeCorners(slow);
    const slope = (hz: number) => envelopePeakDbuv(slow, hz * 1.01)! - envelopePeakDbuv(slow, hz)!;
    const perDecade = 1 / Math.log10(1.01);
    expect(slope(firstHz / 2) * perDecade).toBeCloseTo(0, 9);
    expect(slope(firstHz * 2) * perDecade).toBeCloseTo(-20, 6);
    expect(slope(secondHz * 2) * perDecade).toBeCloseTo(-40, 6);
    expect(envelopePeakDbuv(slow, firstHz)).toBeCloseTo(20 * Math.log10(2 * 3.3 * 0.01 * 1e6), 9);
  });

  test('no harmonic lies above it, equal edges or not (property)', () => {
    fc.assert(
      fc.property(anyTrapezoid, fc.integer({ min: 1, max: 500 }), (wave, n) => {
        const level = harmonicPeakDbuv(wave, n) ?? -Infinity;
        expect(level).toBeLessThanOrEqual(envelopePeakDbuv(wave, n * wave.frequencyHz)! + 1e-9);
      }),
    );
  });

  test('below the fundamental there is no harmonic and no envelope', () => {
    expect(envelopePeakDbuv(clock, 24.9e6)).toBeNull();
    expect(envelopePeakDbuv(clock, 25e6)).not.toBeNull();
  });

  test('what is no trapezoid is refused by name', () => {
    expect(() => harmonicPeakV(clock, 0)).toThrow('0 is no harmonic');
    expect(() => harmonicPeakV(clock, 1.5)).toThrow('1.5 is no harmonic');
    expect(() => harmonicPeakV({ ...clock, amplitudeV: -1 }, 1)).toThrow('Amplitude -1 V');
    expect(() => envelopeCorners({ ...clock, riseS: 0 })).toThrow('Rise time 0 s');
    expect(() => envelopeCorners({ ...clock, fallS: NaN })).toThrow('Fall time NaN s');
    for (const dutyCycle of [0, 1, NaN]) expect(() => envelopeCorners({ ...clock, dutyCycle })).toThrow('Duty cycle');
    expect(() => envelopeCorners({ ...clock, riseS: 21e-9, fallS: 21e-9 })).toThrow('do not fit');
    expect(envelopeCorners({ ...clock, riseS: 20e-9, fallS: 20e-9 }).firstHz).toBeGreaterThan(0);
    expect(() => envelopeCorners({ ...clock, riseS: 5e-9, fallS: 5e-9, dutyCycle: 0.9 })).toThrow('do not fit');
    expect(() => envelopePeakDbuv(clock, 0)).toThrow('Frequency 0 Hz');
  });
});
