import { eirpFromErp, eirpFromField, erpFromEirp, fieldFromEirp, HALF_WAVE_DIPOLE_DBI } from '@/emc/fieldStrength';
import { add, answer, less, level, resultOf, say, scaled, start, type Pane, type Term } from '../pane';

const SOURCE = 'E = √(30 P) / d, free space';
const UNITS: Readonly<Record<string, string>> = { eirp: 'dBm', erp: 'dBm', field: 'dBµV/m' };

/** Radiated power as field strength at a distance, and back. */
export const eirp: Pane = {
  id: 'eirp',
  title: 'EIRP, ERP and field strength',
  about: 'Radiated power as field strength at a distance, and field strength as the power behind it.',
  fields: (choice) => [
    {
      kind: 'choice',
      name: 'have',
      label: 'Given is the',
      called: 'which of the three is given',
      choices: [
        { value: 'eirp', word: 'EIRP' },
        { value: 'erp', word: 'ERP' },
        { value: 'field', word: 'field' },
      ],
    },
    { kind: 'figure', name: 'level', label: 'Level', unit: UNITS[choice('have') ?? ''] ?? '', range: 'level' },
    { kind: 'figure', name: 'd', label: 'Distance', unit: 'm', range: 'above-zero', picks: ['3', '10'] },
  ],
  compute: (given) => {
    const have = given.choice('have');
    const eirpOf = (figure: number, d: number) =>
      have === 'field' ? eirpFromField(figure, d) : have === 'erp' ? eirpFromErp(figure) : figure;
    const distanceTerms = (d: number, toField: boolean): Term[] => {
      const at1m = fieldFromEirp(0, 1);
      const [onto, off] = toField ? [add, less] : [less, add];
      return [
        onto(level(at1m), 'field of 0 dBm EIRP at 1 m', '120 + 10 log10(0.030), E = √(30 P) / d'),
        off(level(at1m - fieldFromEirp(0, d)), '20 log10(d / 1 m)', 'spreading in free space'),
      ];
    };
    const eirpTerms = (figure: number, d: number): Term[] => {
      if (have === 'field') return [start(level(figure, 'dBµV/m'), 'field strength'), ...distanceTerms(d, false)];
      if (have === 'eirp') return [start(level(figure, 'dBm'), 'EIRP')];
      return [
        start(level(figure, 'dBm'), 'ERP'),
        add(level(HALF_WAVE_DIPOLE_DBI), 'gain of a half-wave dipole', 'definition of ERP'),
      ];
    };
    const inputs = (d: number): Term[] => [start(scaled(d, 'm'), 'distance d')];
    const answers = [
      answer('field', 'Field strength', given, ['level', 'd', 'have'], (figure, d) => ({
        formula: null,
        given: inputs(d!),
        terms:
          have === 'field'
            ? [start(level(figure!, 'dBµV/m'), 'field strength')]
            : [...eirpTerms(figure!, d!), ...distanceTerms(d!, true)],
        result: level(have === 'field' ? figure! : fieldFromEirp(eirpOf(figure!, d!), d!), 'dBµV/m'),
        resultName: 'field strength',
        source: have === 'field' ? 'as typed here' : SOURCE,
      })),
      answer('eirp', 'EIRP', given, ['level', have === 'field' ? 'd' : 'd?', 'have'], (figure, d) => ({
        formula: null,
        given: have === 'field' ? inputs(d!) : [],
        terms: eirpTerms(figure!, d ?? NaN),
        result: level(eirpOf(figure!, d ?? NaN), 'dBm'),
        resultName: 'EIRP',
        source: have === 'field' ? SOURCE : have === 'erp' ? 'definition of ERP' : 'as typed here',
      })),
      answer('erp', 'ERP', given, ['level', have === 'field' ? 'd' : 'd?', 'have'], (figure, d) => ({
        formula: null,
        given: have === 'field' ? inputs(d!) : [],
        terms:
          have === 'erp'
            ? [start(level(figure!, 'dBm'), 'ERP')]
            : [
                ...eirpTerms(figure!, d ?? NaN),
                less(level(HALF_WAVE_DIPOLE_DBI), 'gain of a half-wave dipole', 'definition of ERP'),
              ],
        result: level(have === 'erp' ? figure! : erpFromEirp(eirpOf(figure!, d ?? NaN)), 'dBm'),
        resultName: 'ERP',
        source: 'definition of ERP',
      })),
    ];
    const [found, power, d] = [resultOf(answers, 'field'), resultOf(answers, 'eirp'), given.figure('d')];
    const figure = given.figure('level');
    return {
      answers,
      says:
        found && power && d !== null && figure !== null
          ? have === 'field'
            ? say`${found} at ${scaled(d, 'm')} is ${power} EIRP.`
            : say`${level(figure, 'dBm')} ${have === 'erp' ? 'ERP' : 'EIRP'} is ${found} at ${scaled(d, 'm')}.`
          : null,
      cautions: [],
    };
  },
  holds: [
    'Free space and far field: no reflection from the ground, which can add up to 6.02 dB.',
    'EIRP counts over an isotropic radiator, ERP over a half-wave dipole, 2.15 dB apart; print also has 2.14.',
  ],
};
