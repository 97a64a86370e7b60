import type { Problem } from '@/components/forms/problem';
import { formatCount } from '@/format/quantities';
import { MAINS_LINE_WORDS } from '@/format/words';
import type { MainsLine, Polarisation } from '@/schemas/common';

/** `horizontal polarisation`, `line L1`, `the port`. */
export function positionWords(position: Polarisation | MainsLine | null): string {
  if (position === null) return 'the port';
  if (position === 'horizontal' || position === 'vertical') return `${position} polarisation`;
  return MAINS_LINE_WORDS[position];
}

export const finalsCount = (count: number) => (count === 1 ? '1 final' : `${formatCount(count)} finals`);

const ROW = /^\/finals\/(\d+)(?:\/|$)/;

const CELL_WORDS: [RegExp, string][] = [
  [/frequencyHz$/, 'frequency'],
  [/heightM$/, 'height'],
  [/azimuthDeg$/, 'azimuth'],
  [/readings/, 'reading'],
  [/remark$/, 'remark'],
  [/retestIds/, 'retest'],
];

/** What a problem says of each row, by the key of the row that was sent in its place. */
export function issuesOfRows({ errors }: Problem, keys: readonly string[]): Record<string, string> {
  const found: Record<string, string> = {};
  for (const { pointer, message } of errors) {
    const key = keys[Number(ROW.exec(pointer)?.[1] ?? NaN)];
    if (key === undefined) continue;
    const cell = CELL_WORDS.find(([pattern]) => pattern.test(pointer))?.[1] ?? 'row';
    found[key] ??= `is not kept: its ${cell} ${message}`;
  }
  return found;
}

const FIELD_WORDS: Record<string, string> = {
  pathId: 'The signal path',
  limitSetId: 'The limit set',
  distanceM: 'The distance',
  operatingMode: 'The operating mode',
  alreadyCorrected: 'What the readings hold already',
  stateId: 'The state',
  polarisation: 'The polarisation',
  line: 'The conductor',
  traces: 'The unit of the readings',
};

/** What a problem says of anything but the rows, as sentences. */
export function issuesOfSheet({ errors }: Problem): string[] {
  const said = errors
    .filter(({ pointer }) => !ROW.test(pointer) && pointer !== '')
    .map(({ pointer, message }) => `${FIELD_WORDS[pointer.split('/')[1]!] ?? 'The sheet'} ${message}.`);
  return [...new Set(said)];
}
