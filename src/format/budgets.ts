import { formatFrequencyRange } from './frequencies';
import { formatDb, formatFigure, formatTrimmed } from './quantities';

/** Words for an uncertainty budget and what it comes to. */

type Distribution = { shape: 'normal'; k: number } | { shape: 'rectangular' | 'triangular' | 'U-shaped' };

/** `normal, k = 2`; `rectangular`. */
export function distributionWords(distribution: Distribution): string {
  return distribution.shape === 'normal' ? `normal, k = ${formatTrimmed(distribution.k, 3)}` : distribution.shape;
}

/** How the divisor comes about: `k = 2`, `the root of 3`. */
export function divisorWords(distribution: Distribution): string {
  const roots = { rectangular: 'the root of 3', triangular: 'the root of 6', 'U-shaped': 'the root of 2' };
  return distribution.shape === 'normal' ? `k = ${formatTrimmed(distribution.k, 3)}` : roots[distribution.shape];
}

/** Part of the combined variance: `34 %`, `less than 1 %`; empty where nothing is uncertain. */
export function shareWords(share: number | null): string {
  if (share === null) return '';
  if (share === 0) return '0 %';
  return share < 0.005 ? 'less than 1 %' : `${formatFigure(share * 100, 0)} %`;
}

interface BesideUcispr {
  fromHz: number;
  toHz: number;
  measurement: string;
  edition: string;
  ucisprDb: number;
  excessDb: number;
}

/** `over 30–1000 MHz U of 4.90 dB is at most Ucispr, 6.3 dB …`: what the rule of CISPR 16-4-2 makes of it. */
export function ucisprWords(expandedDb: number, beside: BesideUcispr): string {
  const { fromHz, toHz, measurement, edition, ucisprDb, excessDb } = beside;
  const of = `Ucispr, ${formatDb(ucisprDb)} dB for ${measurement} (${edition}, from memory)`;
  const where = `over ${formatFrequencyRange(fromHz, toHz)} U of ${formatFigure(expandedDb, 2)} dB is`;
  if (Number(formatFigure(excessDb, 2)) === 0)
    return `${where} at most ${of}: the rule of CISPR 16-4-2 adds nothing to a level.`;
  const excess = `${formatFigure(excessDb, 2)} dB`;
  return `${where} ${excess} above ${of}: the rule of CISPR 16-4-2 adds ${excess} to every level.`;
}

/** `from 30 to 300 MHz the prescan states 3.90 dB and the final 4.90 dB` */
export function belowFinalWords(below: { fromHz: number; toHz: number; prescanDb: number; finalDb: number }): string {
  const { fromHz, toHz, prescanDb, finalDb } = below;
  const [prescan, final] = [prescanDb, finalDb].map((db) => formatFigure(db, 2));
  return `over ${formatFrequencyRange(fromHz, toHz)} the prescan states ${prescan} dB and the final ${final} dB`;
}

export const INSTRUMENTATION_ONLY =
  'U covers the instrumentation along this path. How the set-up and the sample change the reading is not in it.';
