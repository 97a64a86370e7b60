import type { Detector, LineDetector, MainsLine, Polarisation, Port, Purpose, Verdict } from '@/emc/kinds';
import { formatCount } from './quantities';

/** The words of the trade for what the core calls by a code. */

export const VERDICT_WORDS: Record<Verdict, string> = {
  over: 'over',
  'needs-final': 'needs a final',
  inconclusive: 'inconclusive',
  'not-covered': 'not covered',
  under: 'under',
};

export const DETECTOR_WORDS: Record<Detector, string> = {
  peak: 'peak',
  'quasi-peak': 'quasi-peak',
  average: 'average',
  'rms-average': 'RMS-average',
  'log-average': 'log average',
  sample: 'sample',
  'negative-peak': 'negative peak',
  unknown: 'detector not stated',
};

/** For a table cell. */
export const DETECTOR_MARKS: Record<Detector, string> = {
  peak: 'Peak',
  'quasi-peak': 'QP',
  average: 'AV',
  'rms-average': 'RMS',
  'log-average': 'Log AV',
  sample: 'Sample',
  'negative-peak': 'Neg. peak',
  unknown: '–',
};

export const LINE_WORDS: Record<LineDetector, string> = {
  'quasi-peak': 'quasi-peak limit',
  average: 'average limit',
  peak: 'peak limit',
};

export const PORT_WORDS: Record<Port, string> = {
  enclosure: 'enclosure',
  'ac-mains': 'AC mains',
  'wired-network': 'wired network',
};

/** How the port is measured, for the identity line. */
export const PORT_METHODS: Record<Port, string> = {
  enclosure: 'radiated',
  'ac-mains': 'conducted',
  'wired-network': 'conducted',
};

export const PURPOSE_WORDS: Record<Purpose, string> = { prescan: 'prescan', final: 'final', ambient: 'ambient' };

export const POLARISATION_MARKS: Record<Polarisation, string> = { horizontal: 'H', vertical: 'V' };

export const MAINS_LINE_WORDS: Record<MainsLine, string> = {
  L: 'line L',
  N: 'neutral N',
  L1: 'line L1',
  L2: 'line L2',
  L3: 'line L3',
};

const NUMBERS = 'no one two three four five six seven eight nine ten eleven twelve'.split(' ');

/** A count inside a sentence: in words up to twelve, in figures beyond. @throws RangeError when it is no count */
export function countInWords(count: number): string {
  if (!Number.isSafeInteger(count) || count < 0) throw new RangeError(`${count} is no count`);
  return NUMBERS[count] ?? formatCount(count);
}

/** For the start of a sentence. */
export function capitalised(text: string): string {
  return text.charAt(0).toUpperCase() + text.slice(1);
}
