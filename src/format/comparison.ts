import type { Detector, LevelUnit, MainsLine, Polarisation, Verdict } from '@/emc/kinds';
import type { FindingRun } from './finding';
import { formatBandwidth, formatFrequency, formatFrequencyRange } from './frequencies';
import { formatDb, formatDistance, formatHeight, unitLabel } from './quantities';
import { DETECTOR_WORDS, MAINS_LINE_WORDS, VERDICT_WORDS } from './words';

/** What a comparison is called by: a run by its state, or by its trial, or by its number where both are alike. */
export interface NamedRun {
  number: string;
  trial: string | null;
  state: { label: string };
}

/** `M2` and `M1`; of one state `M2 with foil on lid` and `M2`; of one state and no trial the numbers of the runs. */
export function namesBeside(a: NamedRun, b: NamedRun): { a: string; b: string } {
  const name = ({ state, trial }: NamedRun) => (trial === null ? state.label : `${state.label} with ${trial}`);
  return name(a) === name(b) ? { a: a.number, b: b.number } : { a: name(a), b: name(b) };
}

/** `6.1 lower`, `0.3 higher`, `0.0 the same`: never a bare sign. @param movedDb how much higher it is, dB */
export function formatMove(movedDb: number): string {
  const { figure, word } = moveText(movedDb);
  return `${figure} ${word}`;
}

/** The word follows the rounded figure. */
export function moveText(movedDb: number): { figure: string; word: 'lower' | 'higher' | 'the same' } {
  const figure = formatDb(Math.abs(movedDb));
  if (Number(figure) === 0) return { figure, word: 'the same' };
  return { figure, word: movedDb < 0 ? 'lower' : 'higher' };
}

/** `M2 is over, and so is M1.`, `M2 is inconclusive, M1 is over.` */
export function verdictsBeside(names: { a: string; b: string }, verdicts: { a: Verdict; b: Verdict }): string {
  const said = (verdict: Verdict) => (verdict === 'needs-final' ? '' : 'is ') + VERDICT_WORDS[verdict];
  if (verdicts.a === verdicts.b) {
    const too = verdicts.b === 'needs-final' ? 'does' : 'is';
    return `${names.b} ${said(verdicts.b)}, and so ${too} ${names.a}.`;
  }
  return `${names.b} ${said(verdicts.b)}, ${names.a} ${said(verdicts.a)}.`;
}

interface Moved {
  frequencyHz: number;
  movedDb: number | null;
}

/**
 * `M2 beside M1: 6.1 dB lower at 144.018 MHz; 0.3 dB higher at 0.585 MHz.` The largest move either way, of the emissions
 * that both runs read.
 */
export function comparisonFinding(names: { a: string; b: string }, emissions: readonly Moved[]): FindingRun[] {
  const lead = { text: `${names.b} beside ${names.a}: ` };
  const moved = emissions.flatMap(({ frequencyHz, movedDb }) => (movedDb === null ? [] : [{ frequencyHz, movedDb }]));
  if (moved.length === 0) return [lead, { text: 'no emission was read in both, so nothing moved.' }];
  const lowest = moved.reduce((most, one) => (one.movedDb < most.movedDb ? one : most));
  const highest = moved.reduce((most, one) => (one.movedDb > most.movedDb ? one : most));
  const told = [lowest, highest].filter(
    ({ movedDb }, at) => moveText(movedDb).word === (at === 0 ? 'lower' : 'higher'),
  );
  if (told.length === 0) return [lead, { text: 'no emission moved by 0.1 dB.' }];
  return [
    lead,
    ...told.flatMap(({ frequencyHz, movedDb }, at): FindingRun[] => {
      const { figure, word } = moveText(movedDb);
      return [
        ...(at > 0 ? [{ text: '; ' }] : []),
        { text: `${figure} dB`, figure: true, strong: true },
        { text: ` ${word} at ` },
        { text: formatFrequency(frequencyHz), figure: true },
      ];
    }),
    { text: '.' },
  ];
}

type Told = string | number | null;
export interface ToldCaution {
  what: string;
  a: Told;
  b: Told;
}

/** Why a difference holds more than the modification, in one sentence. `names` are those of `namesBeside`. */
export function cautionText({ what, a, b }: ToldCaution, names: { a: string; b: string }): string {
  const both = (say: (value: Told) => string) => `${names.a} ${say(a)}, ${names.b} ${say(b)}`;
  switch (what) {
    case 'unit':
      return `${both((value) => `in ${unitWords(value)}`)}: levels in different units have no difference.`;
    case 'no-overlap':
      return 'They have no frequency in common.';
    case 'overlap':
      return `Both cover ${formatFrequencyRange(Number(a), Number(b))} only; beside it there is no difference.`;
    case 'detector':
      return `${both((value) => `in ${DETECTOR_WORDS[value as Detector]}`)}: the difference holds that of the detectors too.`;
    case 'no-counterpart':
      return a === null ? `${b} of ${names.b} has no counterpart.` : `${a} of ${names.a} has no counterpart.`;
    case 'rbw':
      return `${both((value) => (value === null ? 'with an RBW not stated' : `with RBW ${formatBandwidth(Number(value))}`))}: broadband levels differ by that alone.`;
    case 'step':
      return a === b
        ? `Both ${stepWords(a)} on axes of their own: compared in stretches that hold points of both.`
        : `${both(stepWords)}: compared in stretches that hold points of both.`;
    case 'position':
      return `${both(positionWords)}: not the same position.`;
    case 'height':
      return `${both(heightWords)}: the field is another at another height.`;
    case 'distance':
      return `${both((value) => (value === null ? 'at a distance not stated' : `at ${formatDistance(Number(value))}`))}: levels differ by the distance alone.`;
    case 'path':
      return `${both((value) => (value === null ? 'without a path' : `through ${value}`))}: the corrections differ.`;
    case 'limits':
      return `${both((value) => `against ${value}`)}: margins are to different limits, the difference is of levels.`;
    case 'mode':
      return `${both((value) => `in “${value}”`)}: not the same operating mode.`;
    case 'partial':
      return `${listed(a, b)} was kept up to a broken line of its file.`;
    case 'voided':
      return `${listed(a, b)} is voided and speaks for nothing.`;
    default:
      throw new RangeError(`${what} is no caution`);
  }
}

function unitWords(value: Told): string {
  return String(value)
    .split(', ')
    .map((unit) => unitLabel(unit as LevelUnit))
    .join(' and ');
}

function stepWords(value: Told): string {
  return value === null ? 'in uneven steps' : `in steps of ${formatBandwidth(Number(value))}`;
}

function positionWords(value: Told): string {
  if (value === null) return 'at no stated position';
  return MAINS_LINE_WORDS[value as MainsLine] ? `on ${MAINS_LINE_WORDS[value as MainsLine]}` : (value as Polarisation);
}

function heightWords(value: Told): string {
  if (value === 'swept') return 'with the height varied';
  return value === null ? 'at a height not stated' : `at ${formatHeight(Number(value))} m`;
}

const listed = (a: Told, b: Told): string => [a, b].filter((one) => one !== null).join(' and ');
