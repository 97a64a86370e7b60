import { inPhaseSumDb, powerSumDb, raisedByNoiseDb } from '@/emc/addedLevels';
import { answer, level, resultOf, say, start, type Pane } from '../pane';

/** Signal and ambient, or several signals, as the one level that a receiver reads. */
export const addition: Pane = {
  id: 'addition',
  title: 'Levels that add',
  about: 'What a receiver reads where a signal meets noise, ambient or another signal.',
  fields: () => [
    {
      kind: 'figure',
      name: 'signal',
      label: 'Signal',
      unit: 'dB',
      range: 'level',
      hint: 'All levels in dB of one unit.',
    },
    { kind: 'figure', name: 'ambient', label: 'Noise, ambient or a second signal', unit: 'dB', range: 'level' },
    {
      kind: 'figure',
      name: 'third',
      label: 'A third level',
      unit: 'dB',
      range: 'level',
      hint: 'Left empty, two levels are added.',
    },
  ],
  compute: (given) => {
    const third = given.figure('third');
    const levels = (signal: number, ambient: number) => (third === null ? [signal, ambient] : [signal, ambient, third]);
    const inputs = (signal: number, ambient: number) => [
      start(level(signal), 'signal'),
      start(level(ambient), 'noise, ambient or second signal'),
      third === null
        ? { sign: '' as const, quantity: null, name: 'a third level', source: 'not given, not added' }
        : start(level(third), 'a third level'),
    ];
    const needs = ['signal', 'ambient', 'third?'];
    const answers = [
      answer('power', 'Together, powers adding', given, needs, (signal, ambient) => ({
        formula: '10 log10 Σ 10^(L / 10)',
        given: inputs(signal!, ambient!),
        terms: [],
        result: level(powerSumDb(levels(signal!, ambient!))),
        resultName: 'noise, or signals at unrelated phases',
        source: 'addition of powers',
      })),
      answer('phase', 'At most, all in phase', given, needs, (signal, ambient) => ({
        formula: '20 log10 Σ 10^(L / 20)',
        given: inputs(signal!, ambient!),
        terms: [],
        result: level(inPhaseSumDb(levels(signal!, ambient!))),
        resultName: 'the most that they can make',
        source: 'addition of voltages',
      })),
      answer('raised', 'Signal reads high by', given, ['signal', 'ambient'], (signal, ambient) => ({
        formula: '10 log10(1 + 10^(−d / 10))',
        given: [start(level(signal! - ambient!), 'signal above noise or ambient, d', 'signal less ambient')],
        terms: [],
        result: level(raisedByNoiseDb(signal! - ambient!)),
        resultName: 'the reading above the signal alone',
        source: 'addition of powers, both r.m.s. in the receiver’s bandwidth',
      })),
    ];
    const [power, raised] = [resultOf(answers, 'power'), resultOf(answers, 'raised')];
    const [signal, ambient] = [given.figure('signal'), given.figure('ambient')];
    return {
      answers,
      says:
        power && raised
          ? third === null
            ? say`Together they read ${power}, ${raised} above the signal alone.`
            : say`Together they read ${power}.`
          : null,
      cautions:
        signal !== null && ambient !== null && signal - ambient < 6
          ? ['The signal is less than 6 dB above: a reading does not tell it from the ambient.']
          : [],
    };
  },
  holds: [
    'Powers add for r.m.s. readings of unrelated signals in one bandwidth. Peak and quasi-peak readings add differently; no more than all in phase.',
    'A noise floor or ambient at least 6 dB below the limit is asked for (CISPR 16-2-3, from memory).',
    'Signal and ambient together under the limit still count as under.',
  ],
};
