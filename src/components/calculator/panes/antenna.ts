import { antennaFactorFromGain, gainFromAntennaFactor } from '@/emc/antennaFactor';
import { answer, hertz, less, level, ratio, resultOf, say, shift, start, type Pane, type Term } from '../pane';

const SOURCE = 'effective aperture Gλ²/4π, free space';

/** Antenna factor from gain and gain from antenna factor. */
export const antenna: Pane = {
  id: 'antenna',
  title: 'Antenna factor and gain',
  about: 'The antenna factor that a gain makes, or the gain behind an antenna factor.',
  fields: (choice) => [
    {
      kind: 'choice',
      name: 'have',
      label: 'Given is the',
      called: 'which of the two is given',
      choices: [
        { value: 'gain', word: 'gain' },
        { value: 'af', word: 'antenna factor' },
      ],
    },
    choice('have') === 'af'
      ? { kind: 'figure', name: 'af', label: 'Antenna factor', unit: 'dB/m', range: 'level' }
      : { kind: 'figure', name: 'gain', label: 'Gain', unit: 'dBi', range: 'level' },
    { kind: 'frequency', name: 'f', label: 'Frequency', unit: 'MHz' },
    { kind: 'figure', name: 'load', label: 'Load', unit: 'ohm', range: 'above-zero', picks: ['50', '75'] },
  ],
  compute: (given) => {
    const fromGain = given.choice('have') === 'gain';
    const terms = (frequencyHz: number, loadOhm: number): Term[] => {
      const constantDb = antennaFactorFromGain(1e6, 0, loadOhm);
      return [
        start(level(antennaFactorFromGain(frequencyHz, 0, loadOhm) - constantDb), '20 log10(f / 1 MHz)', SOURCE),
        shift(
          level(constantDb),
          'constant of free space and load',
          '10 log10(4π Z0 / R) − 20 log10(λ at 1 MHz), Z0 = 376.73 ohm',
        ),
      ];
    };
    const inputs = (frequencyHz: number, loadOhm: number): Term[] => [
      start(hertz(frequencyHz), 'frequency f'),
      start(ratio(loadOhm, 'ohm'), 'load R'),
    ];
    const answers = [
      fromGain || given.choice('have') === null
        ? answer('af', 'Antenna factor', given, ['gain', 'f', 'load', 'have'], (gain, f, load) => ({
            formula: null,
            given: inputs(f!, load!),
            terms: [...terms(f!, load!), less(level(gain!, 'dBi'), 'gain')],
            result: level(antennaFactorFromGain(f!, gain!, load!), 'dB/m'),
            resultName: 'antenna factor',
            source: SOURCE,
          }))
        : answer('gain', 'Gain', given, ['af', 'f', 'load', 'have'], (af, f, load) => ({
            formula: null,
            given: inputs(f!, load!),
            terms: [...terms(f!, load!), less(level(af!, 'dB/m'), 'antenna factor')],
            result: level(gainFromAntennaFactor(f!, af!, load!), 'dBi'),
            resultName: 'gain over an isotropic radiator',
            source: SOURCE,
          })),
    ];
    const found = resultOf(answers, fromGain ? 'af' : 'gain');
    const f = given.figure('f');
    const load = given.figure('load');
    return {
      answers,
      says:
        found && f !== null && load !== null
          ? say`At ${hertz(f)} into ${ratio(load, 'ohm')} the ${fromGain ? 'antenna factor' : 'gain'} is ${found}.`
          : null,
      cautions: [],
    };
  },
  holds: [
    'Gain with mismatch and loss of the antenna counted in; free space, far field.',
    'Print rounds the constant to −29.77, −29.79 or −29.8 dB in 50 ohm; here it is computed.',
    'A calibrated antenna factor of its height and polarisation goes before any of these.',
  ],
};
