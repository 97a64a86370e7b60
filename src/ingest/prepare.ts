import { cleanSteps, type CleanBytes } from './bytes';
import { linesFrom, sampleLines, type Line } from './sample';
import { findTemplate, type Template } from './template';
import type { FrequencyUnit } from './units';

/** `# HZ S DB R 50`: unit, parameter and number format of a network-parameter file. */
export interface OptionLine {
  line: number;
  text: string;
  unit: FrequencyUnit;
  parameter: string;
  format: 'DB' | 'MA' | 'RI';
}

export interface Prepared {
  clean: CleanBytes;
  sample: Line[];
  /** Delimiter that a `sep=` line announces. */
  announced: string | null;
  option: OptionLine | null;
  template: Template | null;
}

/** IEEE 488.2 definite-length block: `#`, one digit n, n digits of length. It precedes the first row on its line. */
function withoutBlockPrefix(clean: CleanBytes): CleanBytes {
  const { bytes } = clean;
  const digits = bytes[0] === 35 ? bytes[1]! - 48 : 0;
  if (!(digits >= 1 && digits <= 9)) return clean;
  for (let i = 2; i < 2 + digits; i++) if (!(bytes[i]! >= 48 && bytes[i]! <= 57)) return clean;
  return { ...clean, bytes: bytes.subarray(2 + digits) };
}

/** Option line with the defaults of the published format: GHz, S, MA, R 50; words in any order and case. */
export function optionLineIn({ line, text }: Line): OptionLine | null {
  const words = /^\s*#\s*(.*)$/.exec(text)?.[1]?.trim().toUpperCase().split(/\s+/) ?? [];
  if (words.length < 2) return null;
  const option: OptionLine = { line, text: text.trim(), unit: 'GHz', parameter: 'S', format: 'MA' };
  for (let i = 0; i < words.length; i++) {
    const word = words[i]!;
    if (/^[KMG]?HZ$/.test(word)) option.unit = { HZ: 'Hz', KHZ: 'kHz', MHZ: 'MHz', GHZ: 'GHz' }[word] as FrequencyUnit;
    else if (/^[SYZGH]$/.test(word)) option.parameter = word;
    else if (word === 'DB' || word === 'MA' || word === 'RI') option.format = word;
    else if (word === 'R' && /^\d/.test(words[i + 1] ?? '')) i++;
    else return null;
  }
  return option;
}

/** JSON, XML and HTML open with a bracket; figures stand in them too, but not as rows of a trace. */
export function isMarkup(sample: readonly { text: string }[]): boolean {
  const first = sample.find(({ text }) => text.trim() !== '')?.text.trim() ?? '';
  return /^[{<]|^\[\s*[[{]?\s*$|^\[\s*[{["]/.test(first);
}

/** Byte level, announcements and row shape: what recognising and reading both start from. */
export function* prepareSteps(raw: Uint8Array): Generator<void, Prepared> {
  const clean = withoutBlockPrefix(yield* cleanSteps(raw));
  const sample = sampleLines(clean);
  yield;
  const announced = /^\s*"?sep=(.)"?\s*$/i.exec(sample[0]?.text ?? '')?.[1] ?? null;
  let option: OptionLine | null = null;
  for (const line of linesFrom(clean, 0, 1, 200, 65_536)) {
    if (!/^\s*[#!]/.test(line.text) && line.text.trim() !== '') break;
    option = optionLineIn(line);
    if (option) break;
  }
  const template = clean.controlShare > 0.1 || isMarkup(sample) ? null : findTemplate(sample, announced);
  yield;
  return { clean, sample, announced, option, template };
}
