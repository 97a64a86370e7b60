import {
  electricFromMagnetic,
  fieldFromPowerFlux,
  fluxDensityFromMagnetic,
  magneticFromElectric,
  powerFluxFromField,
} from '@/emc/fieldStrength';
import { answer, level, resultOf, say, shift, start, type Pane } from '../pane';

const UNITS = [
  { value: 'e', word: 'dBµV/m' },
  { value: 'h', word: 'dBµA/m' },
  { value: 's', word: 'dBm/m²' },
] as const;
const Z0 = 'plane wave, Z0 = 376.73 ohm';

/** Electric field, magnetic field and power flux of one plane wave. */
export const plane: Pane = {
  id: 'plane',
  title: 'Electric and magnetic field',
  about: 'E, H and power flux of a plane wave, through 376.73 ohm.',
  fields: (choice) => [
    { kind: 'choice', name: 'unit', label: 'Level is in', called: 'its unit', choices: UNITS },
    {
      kind: 'figure',
      name: 'level',
      label: 'Level',
      unit: UNITS.find(({ value }) => value === choice('unit'))?.word ?? '',
      range: 'level',
    },
  ],
  compute: (given) => {
    const unit = given.choice('unit');
    const electric = (figure: number) =>
      unit === 'h' ? electricFromMagnetic(figure) : unit === 's' ? fieldFromPowerFlux(figure) : figure;
    const word = UNITS.find(({ value }) => value === unit)?.word ?? '';
    const from = (figure: number) => start(level(figure, word), 'level');
    const one = (
      id: string,
      name: string,
      toUnit: string,
      how: string,
      source: string,
      of: (figure: number) => number,
    ) =>
      answer(id, name, given, ['level', 'unit'], (figure) => {
        const result = of(figure!);
        const same = word === toUnit;
        return {
          formula: null,
          given: [],
          terms: same ? [from(figure!)] : [from(figure!), shift(level(result - figure!), how, source)],
          result: level(result, toUnit),
          resultName: name.toLowerCase(),
          source: same ? 'as typed here' : source,
        };
      });
    const step = unit === 's' ? '90 + 10 log10(Z0)' : '20 log10(Z0)';
    const answers = [
      one('e', 'Electric field', 'dBµV/m', step, Z0, electric),
      one('h', 'Magnetic field', 'dBµA/m', unit === 's' ? '90 − 10 log10(Z0)' : '20 log10(Z0)', Z0, (figure) =>
        unit === 'h' ? figure : magneticFromElectric(electric(figure)),
      ),
      one('b', 'Flux density', 'dBpT', 'from the level to B = µ0 H', 'µ0 = 4π·10⁻⁷ H/m; ' + Z0, (figure) =>
        fluxDensityFromMagnetic(unit === 'h' ? figure : magneticFromElectric(electric(figure))),
      ),
      one('s', 'Power flux', 'dBm/m²', 'S = E²/Z0', Z0, (figure) =>
        unit === 's' ? figure : powerFluxFromField(electric(figure)),
      ),
    ];
    const figure = given.figure('level');
    const other = resultOf(answers, unit === 'e' ? 'h' : 'e');
    return {
      answers,
      says: other && figure !== null ? say`${level(figure, word)} of a plane wave is ${other}.` : null,
      cautions: [],
    };
  },
  holds: [
    'A plane wave only: nearer than λ/2π to a small source E and H do not keep this ratio.',
    'Below 30 MHz a limit in dBµV/m is read off a loop antenna through the same 51.52 dB, whatever the field there is.',
    'Flux density is that of the magnetic field in air.',
  ],
};
