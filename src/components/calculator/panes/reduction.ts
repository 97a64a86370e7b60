import { reductionNeeded, type ReductionGoal } from '@/emc/reduction';
import { formatMarginDb } from '@/format/quantities';
import { answer, less, level, ratio, resultOf, say, start, add, type Given, type Pane } from '../pane';

/** How far an emission has to come down to be under by more than U, or to a margin somebody asks for. */
export const reduction: Pane = {
  id: 'reduction',
  title: 'Reduction needed',
  about: 'How far an emission has to come down before it is under.',
  fields: (choice) => [
    {
      kind: 'figure',
      name: 'level',
      label: 'Level',
      unit: 'dB',
      range: 'level',
      hint: 'Level and limit in dB of one unit.',
    },
    { kind: 'figure', name: 'limit', label: 'Limit', unit: 'dB', range: 'level' },
    {
      kind: 'choice',
      name: 'goal',
      label: 'To be under by',
      called: 'goal',
      choices: [
        { value: 'u', word: 'more than U' },
        { value: 'margin', word: 'a margin' },
      ],
    },
    choice('goal') === 'margin'
      ? { kind: 'figure', name: 'target', label: 'Margin asked for', unit: 'dB under', range: 'level' }
      : { kind: 'figure', name: 'u', label: 'Expanded uncertainty U', unit: 'dB', range: 'not-negative' },
  ],
  compute: (given) => {
    const [limit, reading] = [given.figure('limit'), given.figure('level')];
    const goal = goalOf(given);
    const marginDb = limit === null || reading === null ? null : limit - reading;
    const needed = marginDb === null || goal === null ? null : reductionNeeded(marginDb, goal);
    const needs = ['level', 'limit', 'goal', given.choice('goal') === 'margin' ? 'target' : 'u'];
    const goalDb = given.choice('goal') === 'margin' ? given.figure('target') : given.figure('u');
    const goalName = given.choice('goal') === 'margin' ? 'margin asked for' : 'expanded uncertainty U';
    const answers = [
      answer('reduction', needed?.moreThan ? 'Reduction, more than' : 'Reduction, at least', given, needs, () => {
        if (needed!.reductionDb === 0 && !needed!.moreThan) {
          return {
            formula: 'nothing is missing',
            given: [start(level(limit!), 'limit'), start(level(reading!), 'level'), start(level(goalDb!), goalName)],
            terms: [],
            result: level(0),
            resultName: 'it is there already',
            source: SOURCE,
          };
        }
        return {
          formula: null,
          given: [],
          terms: [start(level(reading!), 'level'), less(level(limit!), 'limit'), add(level(goalDb!), goalName)],
          result: level(needed!.reductionDb!),
          resultName: needed!.moreThan ? 'more than this is needed' : 'reduction needed',
          source: SOURCE,
        };
      }),
      answer('factor', 'Field, current or voltage times', given, needs, () => ({
        formula: '10^(−reduction / 20)',
        given: [start(level(needed!.reductionDb!), 'reduction', 'worked out above')],
        terms: [],
        result: ratio(needed!.factor!),
        resultName: needed!.moreThan ? 'less than this part may be left' : 'at most this part may be left',
        source: 'definition of dB',
      })),
      answer('margin', 'Margin now', given, ['level', 'limit'], () => ({
        formula: null,
        given: [],
        terms: [start(level(limit!), 'limit'), less(level(reading!), 'level')],
        result: { value: marginDb!, unit: 'dB', form: 'margin' as const },
        resultName: 'margin',
        source: 'limit less level',
      })),
    ];
    const found = resultOf(answers, 'reduction');
    const now = marginDb === null ? '' : formatMarginDb(marginDb);
    return {
      answers,
      says:
        !found || !needed
          ? null
          : needed.reductionDb === 0 && !needed.moreThan
            ? say`Now ${now}; nothing is missing.`
            : needed.moreThan
              ? say`Now ${now}; it has to come down by more than ${found}.`
              : say`Now ${now}; it has to come down by ${found}.`,
      cautions: [],
    };
  },
  holds: [
    'Under by more than U is the guarded decision; a margin of exactly U is not enough (JCGM 106:2012, guarded acceptance).',
    'U covers the instrumentation, not the set-up nor the spread between samples.',
  ],
};

const SOURCE = 'limit less level against the goal; JCGM 106:2012';

function goalOf(given: Given): ReductionGoal | null {
  if (given.choice('goal') === 'margin') {
    const targetMarginDb = given.figure('target');
    return targetMarginDb === null ? null : { targetMarginDb };
  }
  const uncertaintyDb = given.figure('u');
  return given.choice('goal') === null || uncertaintyDb === null ? null : { uncertaintyDb };
}
