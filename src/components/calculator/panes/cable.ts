import {
  halfWaveCurrentAt,
  halfWaveFieldPerAmpere,
  shortCableCurrentAt,
  shortFormExcessDb,
  uniformCurrentFieldPerAmpere,
  type CablePlace,
} from '@/emc/cableRadiation';
import { wavelengthM } from '@/emc/freeSpace';
import { dbuvFromMicrovolts, microvoltsFromDbuv } from '@/emc/units';
import { formatFrequency } from '@/format/frequencies';
import { formatSignificant } from '@/format/calculated';
import {
  answer,
  hertz,
  less,
  level,
  over,
  ratio,
  resultOf,
  say,
  scaled,
  start,
  type Given,
  type Pane,
  type Term,
} from '../pane';

const FORMS = [
  { value: 'free-space', word: 'free space' },
  { value: 'ground-plane-doubled', word: 'doubled by a ground plane' },
] as const;
const BOOK = 'Electromagnetic Compatibility Engineering (Wiley 2009), common-mode radiation';
/** From µA to dBµA as from µV to dBµV: 20 log10. */
const dbuaFromMicroamperes = dbuvFromMicrovolts;

/** The common-mode current on a cable that just makes a limit, by two forms, each with where it holds. */
export const cable: Pane = {
  id: 'cable',
  title: 'Common-mode current on a cable',
  about: 'How much common-mode current a cable may carry before its field just makes the limit.',
  fields: () => [
    { kind: 'figure', name: 'limit', label: 'Limit', unit: 'dBµV/m', range: 'level' },
    { kind: 'figure', name: 'd', label: 'Limit stands at', unit: 'm', range: 'above-zero', picks: ['3', '10'] },
    { kind: 'frequency', name: 'f', label: 'Frequency', unit: 'MHz' },
    { kind: 'figure', name: 'length', label: 'Cable length', unit: 'm', range: 'above-zero' },
    {
      kind: 'choice',
      name: 'form',
      label: 'Ground',
      called: 'ground',
      choices: FORMS,
      hint: 'A reflecting plane adds at most 6.02 dB; published constants differ by it.',
    },
  ],
  compute: (given) => {
    const place = placeOf(given);
    const limitV = given.figure('limit') === null ? null : microvoltsFromDbuv(given.figure('limit')!) / 1e6;
    const long = ['limit', 'd', 'f', 'form'];
    const short = [...long, 'length'];
    const answers = [
      answer('short', 'Short cable, at most', given, short, () => {
        const { currentA, because } = shortCableCurrentAt(place!, limitV!);
        return currentA === null
          ? inTrade(because!, place!)
          : product(given, currentA, uniformCurrentFieldPerAmpere(place!), 'short');
      }),
      answer('short-db', 'Short cable, as a level', given, short, () => {
        const { currentA, because } = shortCableCurrentAt(place!, limitV!);
        return currentA === null
          ? inTrade(because!, place!)
          : sum(given, currentA, uniformCurrentFieldPerAmpere(place!));
      }),
      answer('half', 'Half a wave of cable, at most', given, long, () => {
        const { currentA, because } = halfWaveCurrentAt(place!, limitV!);
        return currentA === null
          ? inTrade(because!, place!)
          : product(given, currentA, halfWaveFieldPerAmpere(place!), 'half');
      }),
      answer('half-db', 'Half a wave, as a level', given, long, () => {
        const { currentA, because } = halfWaveCurrentAt(place!, limitV!);
        return currentA === null ? inTrade(because!, place!) : sum(given, currentA, halfWaveFieldPerAmpere(place!));
      }),
      answer('excess', 'Short form above an open-ended cable', given, ['f', 'length'], (f, length) => {
        const excess = shortFormExcessDb(f!, length!);
        if (excess === null) return 'the cable is longer than half a wave, where no form here holds';
        return {
          formula: '20 log10((kL / 2) / tan(kL / 4))',
          given: [
            start(hertz(f!), 'frequency f'),
            start(scaled(length!, 'm'), 'cable length L'),
            start(scaled(wavelengthM(f!), 'm'), 'wavelength 2π/k', 'c / f'),
          ],
          terms: [],
          result: level(excess),
          resultName: 'by so much the short form lies above a sinusoidal current',
          source: 'sinusoidal current on a centre-fed dipole, antenna theory texts',
        };
      }),
    ];
    const [first, second] = [resultOf(answers, 'short'), resultOf(answers, 'half')];
    const excess = resultOf(answers, 'excess');
    const parts =
      given.figure('f') !== null && given.figure('length') !== null
        ? given.figure('length')! / wavelengthM(given.figure('f')!)
        : null;
    return {
      answers,
      says: first
        ? say`At most ${first} on the cable, by the short form.`
        : second
          ? say`At most ${second} on half a wave of cable.`
          : null,
      cautions:
        parts !== null && parts > 0.5
          ? ['Beyond half a wave neither form bounds the field: a whole wave reaches 6 dB more.']
          : [],
      notes: [
        ...(parts === null
          ? []
          : [
              `The cable is ${formatSignificant(parts)} of a wavelength long; the short form is answered up to a quarter.`,
            ]),
        ...(excess && first
          ? [
              'The short form takes the current as even along the cable. A real one falls to none at an open end, so the figure is on the safe side.',
            ]
          : []),
      ],
    };
  },
  holds: [
    'Short form: current even along a straight cable, broadside, no farther than a quarter of a wavelength, outside λ/2π. ' +
      BOOK +
      ', from memory.',
    'Half wave: the largest current along a resonant half wave; 60/r in free space, 120/r doubled. Antenna theory texts; holding the short form at it is common practice.',
    'An estimate for the next step at the bench, no verdict: only the field decides.',
  ],
};

function placeOf(given: Given): CablePlace | null {
  const [frequencyHz, lengthM, distanceM, form] = [
    given.figure('f'),
    given.figure('length'),
    given.figure('d'),
    given.choice('form'),
  ];
  if (frequencyHz === null || distanceM === null || form === null) return null;
  // The half-wave form takes no length.
  return { form: form as CablePlace['form'], frequencyHz, distanceM, lengthM: lengthM ?? NaN };
}

/** The core names a frequency in hertz; here it is named as elsewhere on the page. */
function inTrade(because: string, { frequencyHz }: CablePlace): string {
  return because.replace(`${frequencyHz} Hz`, formatFrequency(frequencyHz)).replace(/\.$/, '');
}

function product(given: Given, currentA: number, perAmpere: number, form: 'short' | 'half') {
  const doubled = given.choice('form') === 'ground-plane-doubled';
  const inputs: Term[] = [
    start(level(given.figure('limit')!, 'dBµV/m'), 'limit'),
    start(scaled(given.figure('d')!, 'm'), 'distance r'),
    ...(form === 'short'
      ? [start(hertz(given.figure('f')!), 'frequency f'), start(scaled(given.figure('length')!, 'm'), 'cable length L')]
      : []),
  ];
  const [short, half] = doubled ? ['E c r / (Z0 L f)', 'π r E / Z0'] : ['2 E c r / (Z0 L f)', '2π r E / Z0'];
  return {
    formula: `I = ${form === 'short' ? short : half}`,
    given: inputs,
    terms: [
      start(scaled(currentA * perAmpere, 'V/m'), 'limit as a field', '1 µV/m × 10^(limit / 20)'),
      over(
        ratio(perAmpere, 'V/m per A'),
        `field per ampere, ${doubled ? 'doubled' : 'free space'}`,
        form === 'short' ? `${BOOK}, from memory` : 'half-wave dipole, antenna theory texts',
      ),
    ],
    result: scaled(currentA, 'A'),
    resultName: 'common-mode current that just makes the limit',
    source: form === 'short' ? `${BOOK}, from memory` : 'half-wave dipole, antenna theory texts',
  };
}

function sum(given: Given, currentA: number, perAmpere: number) {
  return {
    formula: null,
    given: [],
    terms: [
      start(level(given.figure('limit')!, 'dBµV/m'), 'limit'),
      less(level(dbuvFromMicrovolts(perAmpere * 1e6)! - 120), '20 log10 of the field per ampere', 'worked out above'),
    ],
    result: level(dbuaFromMicroamperes(currentA * 1e6)!, 'dBµA'),
    resultName: 'common-mode current that just makes the limit',
    source: 'definition of dBµA',
  };
}
