import { distanceTerm } from '@/emc/distance';
import { wavelengthM } from '@/emc/freeSpace';
import { largeSourceBoundaryM, smallSourceBoundaryHz, smallSourceBoundaryM } from '@/emc/nearField';
import { formatDistance } from '@/format/quantities';
import { conversionFields, conversionOf, conversionTerm, RULE_SOURCE, standingSays } from '../distanceGiven';
import { answer, hertz, level, ratio, resultOf, say, scaled, start, type Pane } from '../pane';

/** A level at one distance as a level at another, and where the far field begins. */
export const distance: Pane = {
  id: 'distance',
  title: 'Distance and far field',
  about: 'A level carried from one distance to another, and where the far field begins.',
  fields: (choice) => [
    ...conversionFields(choice('rule'), false),
    {
      kind: 'figure',
      name: 'level',
      label: 'Level where measured',
      unit: 'dBµV/m',
      range: 'level',
      hint: 'Left empty, only the correction is told.',
    },
  ],
  compute: (given) => {
    const conversion = conversionOf(given);
    const needs = ['f', 'from', 'to', 'rule', 'extent?'];
    const answers = [
      answer('correction', 'Correction', given, needs, () => {
        const { correctionDb, dbPerDecade, fromM, toM, rule } = distanceTerm(conversion!);
        return {
          formula: `${dbPerDecade} log10(from / to)`,
          given: [
            start(scaled(fromM, 'm'), 'measured at'),
            start(scaled(toM, 'm'), 'wanted at'),
            start(hertz(conversion!.frequencyHz), 'frequency'),
            start(ratio(dbPerDecade, 'dB'), 'per decade of distance', RULE_SOURCE[rule]),
          ],
          terms: [],
          result: level(correctionDb),
          resultName: 'to be added to the level',
          source: RULE_SOURCE[rule],
        };
      }),
      answer('level', 'Level where wanted', given, [...needs, 'level'], () => {
        const from = given.figure('level')!;
        const term = conversionTerm(conversion!);
        return {
          formula: null,
          given: [],
          terms: [start(level(from, 'dBµV/m'), `level at ${formatDistance(conversion!.fromM)}`), term],
          result: level(from + distanceTerm(conversion!).correctionDb, 'dBµV/m'),
          resultName: `level at ${formatDistance(conversion!.toM)}`,
          source: RULE_SOURCE[conversion!.rule],
        };
      }),
      answer('small', 'Far field of a small source from', given, ['f'], (frequencyHz) => ({
        formula: 'λ / 2π',
        given: [
          start(hertz(frequencyHz!), 'frequency'),
          start(scaled(wavelengthM(frequencyHz!), 'm'), 'wavelength λ', 'c / f'),
        ],
        terms: [],
        result: scaled(smallSourceBoundaryM(frequencyHz!), 'm'),
        resultName: 'boundary of a source small against the wavelength',
        source: 'field of a short dipole',
      })),
      answer('large', 'Far field of a source so large from', given, ['f', 'extent'], (frequencyHz, extentM) => ({
        formula: '2 D² / λ',
        given: [
          start(scaled(extentM!, 'm'), 'largest extent D'),
          start(scaled(wavelengthM(frequencyHz!), 'm'), 'wavelength λ', 'c / f'),
        ],
        terms: [],
        result: scaled(largeSourceBoundaryM(frequencyHz!, extentM!), 'm'),
        resultName: 'boundary of a source of that extent',
        source: 'outer parts no more than λ/16 farther away than the middle',
      })),
      answer('lowest', 'Measuring distance in the far field from', given, ['from'], (fromM) => ({
        formula: 'c / (2π d)',
        given: [start(scaled(fromM!, 'm'), 'measuring distance d')],
        terms: [],
        result: hertz(smallSourceBoundaryHz(fromM!)),
        resultName: 'where the distance is λ/2π',
        source: 'field of a short dipole',
      })),
    ];
    const correction = resultOf(answers, 'correction');
    const found = resultOf(answers, 'level');
    return {
      answers,
      says: !conversion || !correction ? null : sentence(conversion, correction.value, found),
      ...(conversion && correction ? standingSays(distanceTerm(conversion)) : { cautions: [] }),
    };
  },
  holds: [
    'A limit tabulated at the measured distance is preferred: tables do not follow a law of distance.',
    'From the near field, or from 1 m, a converted level never concludes under.',
  ],
};

function sentence(
  { fromM, toM }: { fromM: number; toM: number },
  correctionDb: number,
  found: ReturnType<typeof resultOf>,
) {
  const [from, to] = [scaled(fromM, 'm'), scaled(toM, 'm')];
  if (found) return say`The level at ${to} is ${found}.`;
  if (correctionDb === 0) return say`From ${from} to ${to} nothing changes.`;
  const size = level(Math.abs(correctionDb));
  return correctionDb > 0
    ? say`From ${from} to ${to} a level rises by ${size}.`
    : say`From ${from} to ${to} a level falls by ${size}.`;
}
