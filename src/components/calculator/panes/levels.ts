import {
  dbmFromDbuvAcross,
  dbpwFromDbm,
  dbuaFromDbuv,
  dbuvFromDbmAcross,
  dbuvFromDbua,
  dbuvFromVolts,
  impedanceDbOhm,
  voltsFromDbuv,
} from '@/emc/inputLevels';
import {
  add,
  answer,
  less,
  level,
  ratio,
  resultOf,
  say,
  scaled,
  start,
  type Given,
  type Pane,
  type Term,
  type Working,
} from '../pane';
import type { Quantity } from '@/format/calculated';

const UNITS = [
  { value: 'dBm', word: 'dBm' },
  { value: 'dBuV', word: 'dBµV' },
  { value: 'dBuA', word: 'dBµA' },
  { value: 'V', word: 'V' },
  { value: 'mV', word: 'mV' },
  { value: 'uV', word: 'µV' },
] as const;

const IN_VOLTS: Readonly<Record<string, number>> = { V: 1, mV: 1e-3, uV: 1e-6 };
const WORDS: Readonly<Record<string, string>> = Object.fromEntries(UNITS.map(({ value, word }) => [value, word]));
const DEFINITION = 'definitions of dBm, dBµV and dBµA; Ohm’s law';

/** A level at one impedance in every unit a receiver or a generator shows. */
export const levels: Pane = {
  id: 'levels',
  title: 'Level units',
  about: 'A level as dBm, dBµV, dBµA and volts, at the impedance it stands across.',
  fields: (choice) => [
    { kind: 'choice', name: 'unit', label: 'Level is in', called: 'its unit', choices: UNITS },
    {
      kind: 'figure',
      name: 'level',
      label: 'Level',
      unit: WORDS[choice('unit') ?? ''] ?? '',
      range: choice('unit') !== null && choice('unit')! in IN_VOLTS ? 'above-zero' : 'level',
    },
    {
      kind: 'figure',
      name: 'ohm',
      label: 'Impedance',
      unit: 'ohm',
      range: 'above-zero',
      picks: ['50', '75', '150'],
      hint: 'A current probe’s transfer impedance here gives the current under the probe.',
    },
  ],
  compute: (given) => {
    const unit = given.choice('unit');
    const answers = [
      answer('dbuv', 'Voltage level', given, needs(unit, 'dBuV'), (figure, ohm) =>
        voltageLevel(unit!, figure!, ohm ?? null),
      ),
      answer('dbm', 'Power level', given, ['level', 'ohm', 'unit'], (figure, ohm) => {
        const dbuv = asDbuv(unit!, figure!, ohm!);
        const dbm = unit === 'dBm' ? figure! : dbmFromDbuvAcross(dbuv, ohm!);
        if (unit === 'dBm') return typed(level(dbm, 'dBm'), 'power level');
        return {
          formula: 'P = U² / Z',
          given: [start(entered(unit!, figure!), 'level'), start(ratio(ohm!, 'ohm'), 'impedance Z')],
          terms: [
            start(level(dbuv, 'dBµV'), 'voltage level', fromLevel(unit!)),
            less(level(dbuv - dbm), '90 + 10 log10(Z / 1 ohm)', DEFINITION),
          ],
          result: level(dbm, 'dBm'),
          resultName: 'power level',
          source: DEFINITION,
        };
      }),
      answer('dbua', 'Current level', given, needs(unit, 'dBuA'), (figure, ohm) => {
        if (unit === 'dBuA') return typed(level(figure!, 'dBµA'), 'current level');
        const dbuv = asDbuv(unit!, figure!, ohm!);
        return {
          formula: 'I = U / Z',
          given: [start(entered(unit!, figure!), 'level'), start(ratio(ohm!, 'ohm'), 'impedance Z')],
          terms: [
            start(level(dbuv, 'dBµV'), 'voltage level', fromLevel(unit!)),
            less(level(impedanceDbOhm(ohm!), 'dB'), '20 log10(Z / 1 ohm)', DEFINITION),
          ],
          result: level(dbuaFromDbuv(dbuv, ohm!), 'dBµA'),
          resultName: 'current level',
          source: 'Ohm’s law',
        };
      }),
      answer('volts', 'Voltage', given, needs(unit, 'dBuV'), (figure, ohm) => {
        const dbuv = unit! in IN_VOLTS ? null : asDbuv(unit!, figure!, ohm ?? NaN);
        const volts = dbuv === null ? figure! * IN_VOLTS[unit!]! : voltsFromDbuv(dbuv);
        if (dbuv === null) return typed(scaled(volts, 'V'), 'voltage, r.m.s.');
        return {
          formula: 'U = 1 µV × 10^(level / 20)',
          given: [start(level(dbuv, 'dBµV'), 'voltage level', fromLevel(unit!))],
          terms: [],
          result: scaled(volts, 'V'),
          resultName: 'voltage, r.m.s.',
          source: 'definition of dBµV',
        };
      }),
      answer('dbpw', 'Power above 1 pW', given, ['level', 'ohm', 'unit'], (figure, ohm) => {
        const dbm = unit === 'dBm' ? figure! : dbmFromDbuvAcross(asDbuv(unit!, figure!, ohm!), ohm!);
        return {
          formula: null,
          given: [],
          terms: [
            start(level(dbm, 'dBm'), 'power level', unit === 'dBm' ? 'as typed here' : 'worked out above'),
            add(level(dbpwFromDbm(dbm) - dbm), '1 mW above 1 pW', 'definitions'),
          ],
          result: level(dbpwFromDbm(dbm), 'dBpW'),
          resultName: 'power level',
          source: 'definitions of dBm and dBpW',
        };
      }),
    ];
    return { answers, says: sentence(given, answers), cautions: [] };
  },
  holds: [
    'Levels are r.m.s. of a sine across a resistance; a peak voltage is 1.414 times as high.',
    'dBµV to dBm needs the impedance: 106.99 dB apart in 50 ohm, 108.75 dB in 75 ohm.',
  ],
};

/** What a unit needs besides the level to become another: volts and dBµV need no impedance between them. */
function needs(unit: string | null, to: 'dBuV' | 'dBuA'): string[] {
  const free = unit !== null && (unit === to || (to === 'dBuV' && unit in IN_VOLTS));
  return free ? ['level', 'unit', 'ohm?'] : ['level', 'ohm', 'unit'];
}

function asDbuv(unit: string, figure: number, ohm: number): number {
  if (unit in IN_VOLTS) return dbuvFromVolts(figure * IN_VOLTS[unit]!)!;
  if (unit === 'dBm') return dbuvFromDbmAcross(figure, ohm);
  return unit === 'dBuA' ? dbuvFromDbua(figure, ohm) : figure;
}

function entered(unit: string, figure: number): Quantity {
  return unit in IN_VOLTS ? scaled(figure * IN_VOLTS[unit]!, 'V') : level(figure, WORDS[unit]!);
}

const fromLevel = (unit: string) => (unit === 'dBuV' ? 'as typed here' : `from the level in ${WORDS[unit]!}`);

function typed(result: Quantity, resultName: string): Working {
  return { formula: null, given: [], terms: [start(result, resultName)], result, resultName, source: 'as typed here' };
}

function voltageLevel(unit: string, figure: number, ohm: number | null): Working {
  if (unit === 'dBuV') return typed(level(figure, 'dBµV'), 'voltage level');
  if (unit in IN_VOLTS) {
    return {
      formula: '20 log10(U / 1 µV)',
      given: [start(scaled(figure * IN_VOLTS[unit]!, 'V'), 'voltage U')],
      terms: [],
      result: level(asDbuv(unit, figure, NaN), 'dBµV'),
      resultName: 'voltage level',
      source: 'definition of dBµV',
    };
  }
  const dbuv = asDbuv(unit, figure, ohm!);
  const shift: Term =
    unit === 'dBm'
      ? add(level(dbuv - figure), '90 + 10 log10(Z / 1 ohm)', DEFINITION)
      : add(level(dbuv - figure), '20 log10(Z / 1 ohm)', 'Ohm’s law');
  return {
    formula: null,
    given: [start(ratio(ohm!, 'ohm'), 'impedance Z')],
    terms: [start(entered(unit, figure), unit === 'dBm' ? 'power level' : 'current level'), shift],
    result: level(dbuv, 'dBµV'),
    resultName: 'voltage level',
    source: DEFINITION,
  };
}

function sentence(given: Given, answers: Parameters<typeof resultOf>[0]) {
  const [unit, figure, ohm] = [given.choice('unit'), given.figure('level'), given.figure('ohm')];
  const [dbuv, dbm] = [resultOf(answers, 'dbuv'), resultOf(answers, 'dbm')];
  if (unit === null || figure === null || dbuv === null) return null;
  const from = entered(unit, figure);
  if (dbm === null || ohm === null) return say`${from} is ${unit === 'dBuV' ? resultOf(answers, 'volts')! : dbuv}.`;
  const at = ratio(ohm, 'ohm');
  if (unit === 'dBm' || unit === 'dBuV') return say`${from} in ${at} is ${unit === 'dBm' ? dbuv : dbm}.`;
  return say`${from} in ${at} is ${dbuv}, or ${dbm}.`;
}
