import { budgetOf } from '@/emc/budget';
import { mismatchBounds, mismatchContribution, reflectionFromVswr, returnLossDb } from '@/emc/mismatch';
import { answer, level, ratio, resultOf, say, start, type Given, type Pane, type Term } from '../pane';

const BOUNDS = 'LAB34 3.4.3; through a two-port CISPR 16-4-2 Annex A, from memory';

/** How far a mismatch between two ports can move a reading, and what it adds to a budget. */
export const mismatch: Pane = {
  id: 'mismatch',
  title: 'Mismatch',
  about: 'How far two mismatched ports can move a reading, and what that adds to a budget.',
  fields: (choice) => {
    const vswr = choice('as') !== 'reflection';
    const range = vswr ? ('vswr' as const) : ('reflection' as const);
    const unit = vswr ? 'VSWR' : '|Γ|';
    return [
      {
        kind: 'choice',
        name: 'as',
        label: 'Ports are given as',
        called: 'how the ports are given',
        choices: [
          { value: 'vswr', word: 'VSWR' },
          { value: 'reflection', word: 'reflection coefficient' },
        ],
      },
      { kind: 'figure', name: vswr ? 'vs' : 'rs', label: 'Source port', unit, range },
      { kind: 'figure', name: vswr ? 'vl' : 'rl', label: 'Load port', unit, range },
      {
        kind: 'figure',
        name: 'pad',
        label: 'Attenuation in between',
        unit: 'dB',
        range: 'not-negative',
        hint: 'A matched attenuator or a lossy cable. Left empty, the ports are joined directly.',
      },
    ];
  },
  compute: (given) => {
    const vswr = given.choice('as') !== 'reflection';
    const names = vswr ? ['vs', 'vl'] : ['rs', 'rl'];
    const reflections = (figures: number[]) => figures.map((figure) => (vswr ? reflectionFromVswr(figure) : figure));
    const pad = given.figure('pad');
    const between = { s11: 0, s21: 10 ** (-(pad ?? 0) / 20), s22: 0 };
    const needs = [...names, 'as', 'pad?'];
    const bound = (id: string, name: string, of: 'plusDb' | 'minusDb') =>
      answer(id, name, given, needs, (...figures) => {
        const [source, load] = reflections(figures);
        const bounds = mismatchBounds(source!, load!, between);
        return {
          formula: `20 log10(1 ${of === 'plusDb' ? '+' : '−'} |Γs| |Γl| 10^(−A / 10))`,
          given: inputs(given, figures, [source!, load!]),
          terms: [],
          result: level(Math.abs(bounds[of])),
          resultName: of === 'plusDb' ? 'reads high by at most' : 'reads low by at most',
          source: BOUNDS,
        };
      });
    const loss = (id: string, name: string, at: string) =>
      answer(id, name, given, [at, 'as'], (figure) => {
        const reflection = vswr ? reflectionFromVswr(figure!) : figure!;
        const lossDb = returnLossDb(reflection);
        if (lossDb === null) return 'a perfect match returns nothing';
        return {
          formula: '−20 log10 |Γ|',
          given: [start(ratio(reflection), '|Γ|', vswr ? '(VSWR − 1) / (VSWR + 1)' : 'as typed here')],
          terms: [],
          result: level(lossDb),
          resultName: 'return loss',
          source: 'definition',
        };
      });
    const answers = [
      bound('high', 'Reads high by at most', 'plusDb'),
      bound('low', 'Reads low by at most', 'minusDb'),
      answer('u', 'Standard uncertainty', given, needs, (...figures) => {
        const [source, load] = reflections(figures);
        const contribution = mismatchContribution('mismatch', mismatchBounds(source!, load!, between), BOUNDS);
        const row = budgetOf([contribution]).rows[0]!;
        return {
          formula: 'larger bound / √2, U-shaped',
          given: [
            start(level(contribution.valueDb), 'larger bound', 'worked out above'),
            start(ratio(row.divisor), 'divisor of a U-shaped distribution', 'LAB34 3.4'),
          ],
          terms: [],
          result: level(row.standardDb),
          resultName: 'standard uncertainty',
          source: 'LAB34 3.4.3',
        };
      }),
      loss('loss-source', 'Return loss of the source', names[0]!),
      loss('loss-load', 'Return loss of the load', names[1]!),
    ];
    const [high, low] = [resultOf(answers, 'high'), resultOf(answers, 'low')];
    return {
      answers,
      says: high && low ? say`The reading may be up to ${high} high or ${low} low.` : null,
      cautions: [],
    };
  },
  holds: [
    'Bounds over every phase between the two ports; magnitudes only. The lower bound is always the farther one.',
    'Attenuation counts twice, out and back, and is taken as matched at both of its ends.',
  ],
};

function inputs(given: Given, figures: number[], reflections: number[]): Term[] {
  const vswr = given.choice('as') !== 'reflection';
  const pad = given.figure('pad');
  const how = vswr ? '(VSWR − 1) / (VSWR + 1)' : 'as typed here';
  return [
    ...(vswr ? [start(ratio(figures[0]!), 'VSWR of the source'), start(ratio(figures[1]!), 'VSWR of the load')] : []),
    start(ratio(reflections[0]!), 'source |Γs|', how),
    start(ratio(reflections[1]!), 'load |Γl|', how),
    pad === null
      ? { sign: '', quantity: null, name: 'attenuation A in between', source: 'not given, ports joined directly' }
      : start(level(pad), 'attenuation A in between'),
  ];
}
