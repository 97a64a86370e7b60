import type { Detector } from '@/emc/kinds';

/**
 * Detector words as receivers and analysers write them. Common practice, from memory of the trade, not from one
 * document; the meanings are those of CISPR 16-1-1 (peak, quasi-peak, linear average, RMS-average).
 *
 * - `average`, `AVG`, `AV`, `CAV`, `CISPR average`, `voltage average`: the linear average.
 * - `log average`, `video average`, `log-pwr`: an average of decibels, lower than the linear one; proves nothing.
 * - `RMS`, `RMS average`, `CISPR RMS`, `power average`: RMS-average; proves nothing against an average limit.
 * - `normal`, `auto peak`, `rosenfell`, `auto`: alternates between maximum and minimum or picks by itself: unknown.
 */
const WORDS: [RegExp, Detector][] = [
  [/quasi|\bqp\b|\bqpk\b|\bqpeak\b|\bq peak\b|cisprqp/, 'quasi-peak'],
  [/\bauto ?(?:pk|peak)\b|\bautopeak|\bnormal\b|rosenfell|^auto$|\balternat/, 'unknown'],
  [/\bneg|\bmin ?(?:pk|peak)\b|\bminpeak|\bmin(?:imum)?\b/, 'negative-peak'],
  [/\blog|video ?av|\bvid av/, 'log-average'],
  [/\brms|cisprrms|\bpower av|\bpwr av/, 'rms-average'],
  [/\bav\b|\bavg?\b|\baver|\bcav\b|\bcisprav|\bmean\b|\blin(?:ear)? av|voltage av|\bcispr av/, 'average'],
  [/\bsamp/, 'sample'],
  [/peak|\bpk\b|cisprpk|\bpositive\b|\bpos\b|\bmaxp|\bpkmax\b/, 'peak'],
];

function wordsOf(text: string): string {
  const negative = /^\s*[-−]\s*p/i.test(text) ? 'neg ' : '';
  return (
    negative +
    text
      .toLowerCase()
      .replace(/[^a-z]+/g, ' ')
      .trim()
  );
}

/** The detector that a word states; null when the text names none. */
export function detectorIn(text: string): Detector | null {
  const words = wordsOf(text);
  if (words === '') return null;
  return WORDS.find(([pattern]) => pattern.test(words))?.[1] ?? null;
}

/** In a heading only clear words count: `Minimum` or `Normal` may name anything there. */
export function detectorInHeading(text: string): Detector | null {
  const words = wordsOf(text);
  if (!/quasi|\bqp|peak|\bpk|\bav|aver|\bcav|\bcispr|\brms/.test(words)) return null;
  return detectorIn(text);
}

/** What an `Average Type` line makes of a detector written as average. */
export function averageKind(text: string): Detector | null {
  const words = wordsOf(text);
  if (/log|video/.test(words)) return 'log-average';
  if (/rms|power|pwr/.test(words)) return 'rms-average';
  return /volt|lin|cispr/.test(words) ? 'average' : null;
}

/** Trace modes that leave no single detector: averages over sweeps and minimum hold. */
export function modeHidesDetector(mode: string): boolean {
  return /\bav|aver|avg|\bmin/.test(wordsOf(mode));
}
