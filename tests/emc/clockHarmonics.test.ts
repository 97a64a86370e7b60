import { attributeHarmonics, type DeclaredClock, type SeenEmission } from '@/emc/clockHarmonics';
import { declared, madeSpectrum } from './spectra';

const at = (frequencyHz: number, bandwidthHz = 120e3): SeenEmission => ({
  frequencyHz,
  bandwidthHz,
  levelDb: 30,
  marginDb: 10,
});
const crystal: DeclaredClock = { name: 'crystal', fundamentalHz: 25e6, tolerancePpm: 50 };
const harmonics = (emission: SeenEmission, ...clocks: DeclaredClock[]) =>
  attributeHarmonics([emission], clocks)[0]!.matches.map(({ clock, harmonic }) => `${clock} ${harmonic}`);

describe('harmonics of declared clocks', () => {
  test('a harmonic is met within tolerance plus half the bandwidth, not beyond', () => {
    // The 8th: 200 MHz, 10 kHz of tolerance and 60 kHz of bandwidth to either side.
    for (const offset of [-69_999, 0, 69_999]) expect(harmonics(at(200e6 + offset), crystal)).toEqual(['crystal 8']);
    for (const offset of [-70_001, 70_001]) expect(harmonics(at(200e6 + offset), crystal)).toEqual([]);
    expect(attributeHarmonics([at(200e6 + 30e3)], [crystal])[0]!.matches).toEqual([
      {
        clock: 'crystal',
        harmonic: 8,
        expectedHz: 200e6,
        offsetHz: 30e3,
        byChance: expect.closeTo((120e3 + 20e3) / 25e6, 12),
      },
    ]);
  });

  test('down-spread reaches below, not above, in proportion to the harmonic', () => {
    const spread = { ...crystal, tolerancePpm: 0, spread: { belowPpm: 5_000, abovePpm: 0 } };
    expect(harmonics(at(200e6 - 1_059_999), spread)).toEqual(['crystal 8']);
    expect(harmonics(at(200e6 - 1_060_001), spread)).toEqual([]);
    expect(harmonics(at(200e6 + 59_999), spread)).toEqual(['crystal 8']);
    expect(harmonics(at(200e6 + 60_001), spread)).toEqual([]);
    const up = { ...crystal, tolerancePpm: 0, spread: { belowPpm: 0, abovePpm: 5_000 } };
    expect(harmonics(at(200e6 + 1_059_999), up)).toEqual(['crystal 8']);
  });

  test('an overlap is stated with every clock, the nearest first', () => {
    const other: DeclaredClock = { name: 'bus', fundamentalHz: 33.34e6, tolerancePpm: 100 };
    expect(harmonics(at(200.03e6), crystal, other)).toEqual(['bus 6', 'crystal 8']);
    expect(harmonics(at(200.01e6), crystal, other)).toEqual(['crystal 8', 'bus 6']);
  });

  test('there is no harmonic below the fundamental', () => {
    expect(harmonics(at(30e3), { ...crystal, fundamentalHz: 30e6 })).toEqual([]);
    expect(harmonics(at(25e6), crystal)).toEqual(['crystal 1']);
  });

  test('harmonics that a bandwidth does not tell apart say nothing', () => {
    const slow: DeclaredClock = { name: 'slow', fundamentalHz: 200e3, tolerancePpm: 10 };
    const [found] = attributeHarmonics([at(100e6)], [slow]);
    expect(found!.matches).toEqual([]);
    expect(found!.untelling).toMatchObject([{ clock: 'slow', harmonic: 500 }]);
    // Twice the bandwidth and more apart: it says something.
    expect(harmonics(at(1e6, 9e3), { ...slow, tolerancePpm: 0 })).toEqual(['slow 5']);
    const [many] = attributeHarmonics([at(100e6)], [{ ...slow, fundamentalHz: 32_768 }]);
    expect(many!.untelling).toMatchObject([{ harmonic: 3052, byChance: 1 }]);
  });

  test('in 100 made spectra every harmonic goes to its clock, and others no more often than their windows are wide', () => {
    let [harmonicsMade, right, others, falsely, expected] = [0, 0, 0, 0, 0];
    for (let seed = 1; seed <= 100; seed++) {
      const made = madeSpectrum({
        seed,
        clocks: 2,
        lowestFundamentalHz: 8e6,
        highestFundamentalHz: 60e6,
        missing: 0.3,
        jitterHz: 30e3,
        ambient: 12,
        hump: 8,
      });
      const clocks = declared(made, 50);
      attributeHarmonics(made.emissions, clocks).forEach(({ matches }, i) => {
        const { from, harmonic, frequencyHz } = made.emissions[i]!;
        if (harmonic === null) {
          others++;
          if (matches.length > 0) falsely++;
          for (const { fundamentalHz } of clocks) expected += (120e3 + 2 * frequencyHz * 50e-6) / fundamentalHz;
        } else {
          harmonicsMade++;
          if (matches.some((match) => match.clock === from && match.harmonic === harmonic)) right++;
        }
      });
    }
    expect(right).toBe(harmonicsMade);
    expect(others).toBe(2_000);
    // Counts of what is rare scatter by their root.
    expect(falsely).toBeLessThan(expected + 4 * Math.sqrt(expected));
    expect(falsely).toBeGreaterThan(0);
  });

  test('what cannot be is refused by name', () => {
    expect(() => harmonics(at(100e6), { ...crystal, fundamentalHz: 0 })).toThrow('Fundamental 0 Hz');
    expect(() => harmonics(at(-1), crystal)).toThrow('Frequency -1 Hz');
    expect(() => harmonics(at(1e6, 0), crystal)).toThrow('Bandwidth 0 Hz');
    expect(() => harmonics(at(1e6), { ...crystal, tolerancePpm: -1 })).toThrow('crystal: a tolerance of -1 ppm');
    expect(() => harmonics(at(1e6), { ...crystal, spread: { belowPpm: 1e6, abovePpm: 0 } })).toThrow('1000000 ppm');
  });
});
