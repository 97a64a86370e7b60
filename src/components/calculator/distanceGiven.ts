import { distanceTerm, type Conversion, type DistanceTerm, type Doubt } from '@/emc/distance';
import { formatDistance } from '@/format/quantities';
import { level, shift, type Given, type PaneField, type Term } from './pane';

const RULES = [
  { value: '20', word: '20 dB per decade' },
  { value: '47cfr', word: '47 CFR 15.31(f)' },
] as const;

/** The rule and, once one is chosen, what it needs. `optional` offers to convert nothing, and starts with that. */
export function conversionFields(rule: string | null, optional: boolean): PaneField[] {
  const choose: PaneField = {
    kind: 'choice',
    name: 'rule',
    label: 'Distance correction',
    called: 'rule',
    choices: optional ? [{ value: 'none', word: 'none' }, ...RULES] : RULES,
    ...(optional && { first: 'none' }),
    hint: '47 CFR 15.31(f): 20 dB per decade from 30 MHz on, 40 dB below.',
  };
  if (optional && (rule === null || rule === 'none')) return [choose];
  return [
    choose,
    { kind: 'frequency', name: 'f', label: 'Frequency', unit: 'MHz' },
    { kind: 'figure', name: 'from', label: 'Measured at', unit: 'm', range: 'above-zero', picks: ['1', '3', '10'] },
    { kind: 'figure', name: 'to', label: 'Wanted at', unit: 'm', range: 'above-zero', picks: ['3', '10', '30'] },
    {
      kind: 'figure',
      name: 'extent',
      label: 'Largest extent of the source',
      unit: 'm',
      range: 'above-zero',
      hint: 'With its cables. Left empty, only the boundary of a small source is looked at.',
    },
  ];
}

/** The conversion that was asked for, or null while something it needs is missing. */
export function conversionOf(given: Given): Conversion | null {
  if (given.missing(['rule', 'f', 'from', 'to', 'extent?']).length > 0 || given.choice('rule') === 'none') return null;
  return {
    frequencyHz: given.figure('f')!,
    fromM: given.figure('from')!,
    toM: given.figure('to')!,
    rule: given.choice('rule') === '47cfr' ? '47 CFR 15.31(f)' : 'inverse-distance',
    extentM: given.figure('extent'),
  };
}

export const RULE_SOURCE: Readonly<Record<Conversion['rule'], string>> = {
  'inverse-distance': 'inverse-distance law',
  '47 CFR 15.31(f)': '47 CFR 15.31(f)',
};

/** The correction as a term: `− 10.46 dB distance, 3 m to 10 m, 20 dB per decade`. */
export function conversionTerm(conversion: Conversion): Term {
  const { correctionDb, dbPerDecade, fromM, toM, rule } = distanceTerm(conversion);
  const from = `${formatDistance(fromM)} to ${formatDistance(toM)}`;
  return shift(
    level(correctionDb),
    `distance correction, ${from}`,
    `${dbPerDecade} dB per decade, ${RULE_SOURCE[rule]}`,
  );
}

interface Standing {
  cautions: string[];
  notes: string[];
}

/** What a converted level may conclude, as sentences: what it may not in `cautions`, what it may in `notes`. */
export function standingSays({ standing, fromM, toM, extentM }: DistanceTerm): Standing {
  if (fromM === toM) return { cautions: [], notes: ['Both distances are the same; nothing is converted.'] };
  if (standing.shows === 'at-most-over') {
    const doubts = standing.doubts.map((doubt) => doubtSays(doubt, fromM, toM));
    return { cautions: [...doubts, 'A level converted so may show over; it never shows under.'], notes: [] };
  }
  const small = extentM === null ? ' as far as a small source goes; its extent was not given' : '';
  const far = `Both distances lie in the far field${small}, so the level may show under and over.`;
  return { cautions: [], notes: [far, 'A limit tabulated at the measured distance is better still.'] };
}

function doubtSays(doubt: Doubt, fromM: number, toM: number): string {
  if (doubt.because === 'starts-at-1-m') {
    return `${formatDistance(fromM)} is too close: from 1 m or closer no law of distance is taken to hold.`;
  }
  const distance = formatDistance(doubt.because === 'starts-in-near-field' ? fromM : toM);
  const border = doubt.border === 'lambda/2pi' ? 'a wavelength over 2π' : '2D²/λ';
  return `${distance} lies in the near field, which reaches to ${formatDistance(doubt.boundaryM)} (${border}).`;
}
