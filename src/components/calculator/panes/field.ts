import { distanceTerm } from '@/emc/distance';
import { dbuvFromDbm } from '@/emc/units';
import { formatMarginDb } from '@/format/quantities';
import { add, answer, left, less, level, resultOf, say, shift, start, type Given, type Pane, type Term } from '../pane';
import { conversionFields, conversionOf, conversionTerm, standingSays } from '../distanceGiven';

/** What a reading at the receiver means in front of the antenna, each correction a term of its own. */
export const field: Pane = {
  id: 'field',
  title: 'Field strength from a reading',
  about: 'Reading plus antenna factor plus cable loss, less preamplifier gain.',
  fields: (choice) => [
    {
      kind: 'choice',
      name: 'unit',
      label: 'Reading is in',
      called: 'its unit',
      choices: [
        { value: 'dBuV', word: 'dBµV' },
        { value: 'dBm', word: 'dBm in 50 ohm' },
      ],
    },
    {
      kind: 'figure',
      name: 'reading',
      label: 'Reading',
      unit: choice('unit') === 'dBm' ? 'dBm' : 'dBµV',
      range: 'level',
    },
    { kind: 'figure', name: 'af', label: 'Antenna factor', unit: 'dB/m', range: 'level' },
    {
      kind: 'figure',
      name: 'loss',
      label: 'Cable loss',
      unit: 'dB',
      range: 'not-negative',
      hint: 'With attenuators; left empty, nothing is added.',
    },
    {
      kind: 'figure',
      name: 'gain',
      label: 'Preamplifier gain',
      unit: 'dB',
      range: 'not-negative',
      hint: 'Left empty, nothing is taken off.',
    },
    {
      kind: 'figure',
      name: 'limit',
      label: 'Limit',
      unit: 'dBµV/m',
      range: 'level',
      hint: 'Only for the margin.',
    },
    ...conversionFields(choice('rule'), true),
  ],
  compute: (given) => {
    const converts = given.choice('rule') !== 'none';
    const conversion = converts ? conversionOf(given) : null;
    const needs = [
      'reading',
      'af',
      'unit',
      'loss?',
      'gain?',
      'rule',
      ...(converts ? ['f', 'from', 'to', 'extent?'] : []),
    ];
    const sum = (): { terms: Term[]; dbuvPerM: number } => {
      const terms = termsOf(given);
      const term = conversion && conversionTerm(conversion);
      if (term) terms.push(term);
      return { terms, dbuvPerM: terms.reduce(signed, 0) };
    };
    const answers = [
      answer('level', 'Field strength', given, needs, () => {
        const { terms, dbuvPerM } = sum();
        return {
          formula: null,
          given: [],
          terms: conversion ? terms : [...terms, left('distance correction', 'not chosen, nothing added')],
          result: level(dbuvPerM, 'dBµV/m'),
          resultName: 'field strength',
          source: 'reading, corrected for what lies before the receiver',
        };
      }),
      answer('margin', 'Margin', given, [...needs, 'limit'], () => {
        const { dbuvPerM } = sum();
        const limit = given.figure('limit')!;
        return {
          formula: null,
          given: [start(level(dbuvPerM, 'dBµV/m'), 'field strength', 'worked out above')],
          terms: [
            start(level(limit, 'dBµV/m'), 'limit'),
            less(level(dbuvPerM, 'dBµV/m'), 'field strength', 'worked out above'),
          ],
          result: { value: limit - dbuvPerM, unit: 'dB', form: 'margin' },
          resultName: 'margin',
          source: 'limit less level',
        };
      }),
    ];
    const found = resultOf(answers, 'level');
    const margin = resultOf(answers, 'margin');
    const standing = conversion && found ? standingSays(distanceTerm(conversion)) : null;
    return {
      answers,
      says:
        found && (margin ? say`The field is ${found}: ${formatMarginDb(margin.value)}.` : say`The field is ${found}.`),
      cautions: standing?.cautions ?? [],
      notes: [
        ...(standing?.notes ?? []),
        ...(margin ? ['No uncertainty is counted here, so nothing is concluded from the margin.'] : []),
      ],
    };
  },
  holds: [
    'Antenna factor and loss are those at the frequency of the reading; nothing is interpolated here.',
    'Far field of the antenna, the detector’s reading as it is. A run on its own sheet uses the calibrated tables of its path.',
  ],
};

function termsOf(given: Given): Term[] {
  const reading = given.figure('reading')!;
  const first =
    given.choice('unit') === 'dBm'
      ? [
          start(level(reading, 'dBm'), 'reading'),
          shift(level(dbuvFromDbm(reading) - reading), 'from dBm to dBµV in 50 ohm', 'definitions'),
        ]
      : [start(level(reading, 'dBµV'), 'reading')];
  const [loss, gain] = [given.figure('loss'), given.figure('gain')];
  return [
    ...first,
    add(level(given.figure('af')!, 'dB/m'), 'antenna factor'),
    loss === null ? left('cable loss', 'not given, nothing added') : add(level(loss), 'cable loss'),
    gain === null ? left('preamplifier gain', 'not given, nothing taken off') : less(level(gain), 'preamplifier gain'),
  ];
}

function signed(sum: number, { sign, quantity }: Term): number {
  return sum + (quantity === null ? 0 : sign === '−' ? -quantity.value : quantity.value);
}
