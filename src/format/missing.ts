import type { Missing } from '@/emc/port';
import { formatFrequency } from './frequencies';
import { formatHeight } from './quantities';
import { capitalised, MAINS_LINE_WORDS } from './words';

const BECAUSE: Record<NonNullable<Missing['because']>, string> = {
  'no-trace': 'not swept',
  'no-factor': 'no factor in the signal path',
  'no-uncertainty': 'no uncertainty stated',
  partial: 'read from a partial run only',
  gap: 'a gap in the sweep, or steps wider than the RBW',
};

function place(position: Missing['position']): string {
  if (position === null) return 'The port';
  if (position === 'horizontal' || position === 'vertical') return `${capitalised(position)} polarisation`;
  return capitalised(MAINS_LINE_WORDS[position]);
}

/** What is missing for a verdict on a port, in one sentence: `Vertical polarisation is not measured.` */
export function missingText(missing: Missing): string {
  const where = place(missing.position);
  switch (missing.what) {
    case 'position':
      return `${where} is not measured.`;
    case 'partial':
      return `${where} is measured only in part: its file breaks off. Measure it again.`;
    case 'height':
      return missing.heightM === null
        ? `${where}: no other antenna height is stated.`
        : `${where}: only one antenna height, ${formatHeight(missing.heightM)} m.`;
    case 'no-line':
      return `${where}: no limit line is chosen.`;
    case 'comparison':
      return `${where} is not compared with ${missing.lineName}.`;
    case 'range': {
      const range = `${formatFrequency(missing.fromHz!)} to ${formatFrequency(missing.toHz!)}`;
      return `${where}: ${range} of ${missing.lineName}, ${BECAUSE[missing.because!]}.`;
    }
  }
}
