import type { SeenEmissionView, SourcesView } from '@/schemas/sources';
import { formatBandwidth, formatFrequency } from '@/format/frequencies';
import { formatCount, formatMargin, formatTrimmed } from '@/format/quantities';
import { countInWords } from '@/format/words';

/** `36.006 MHz, 2.6 under` */
export function emissionText({ frequencyHz, marginDb }: SeenEmissionView): string {
  return `${formatFrequency(frequencyHz)}, ${formatMargin(marginDb)}`;
}

/** What the part folds to. */
export function sourcesSummary({ looked, explained }: SourcesView): string {
  if (looked === 0) return 'no emission to place';
  return `${explained} of ${looked} explained`;
}

/** A probability as the trade says it: `one in 200`, `one in a million`. */
export function oneIn(probability: number): string {
  if (probability < 1e-6) return 'one in a million';
  const many = 1 / probability;
  const digits = 10 ** Math.max(0, Math.floor(Math.log10(many)) - 1);
  return `one in ${formatCount(Math.max(1, Math.floor(many / digits) * digits))}`;
}

/** Above this a match is worth a doubt. */
const DOUBTFUL = 0.1;

/** How often an emission from elsewhere would lie on a harmonic as well; null where that is seldom. */
export function chanceText(harmonics: SourcesView['clocks'][number]['harmonics']): string | null {
  const most = harmonics.reduce((highest, { byChance }) => Math.max(highest, byChance), 0);
  if (most < DOUBTFUL) return null;
  return `Its harmonics lie close together: up to ${formatTrimmed(most * 100, 0)} % of emissions from elsewhere would fit too.`;
}

export function untellingText(untelling: number): string | null {
  if (untelling === 0) return null;
  return `Too close together to say anything of ${countInWords(untelling)} ${untelling === 1 ? 'emission' : 'emissions'}.`;
}

/** `16.0016 MHz`: a fundamental that the spacing supports to a few digits more than a reading. */
export function fundamentalText({ lowestHz, highestHz }: SourcesView['families'][number]): string {
  const unit = highestHz >= 150e3 ? { hz: 1e6, name: 'MHz' } : { hz: 1e3, name: 'kHz' };
  const [from, to] = [lowestHz, highestHz].map((hz) => formatTrimmed(hz / unit.hz, 4));
  return from === to ? `${from} ${unit.name}` : `${from} to ${to} ${unit.name}`;
}

/** `×2 of 65 kHz above 151.400 MHz` */
export function sidebandText({ order, carrier }: SourcesView['sidebands'][number], converterHz: number): string {
  const times = Math.abs(order) === 1 ? '' : `${Math.abs(order)} × `;
  const side = order > 0 ? 'above' : 'below';
  return `${times}${formatBandwidth(converterHz)} ${side} ${formatFrequency(carrier.frequencyHz)}`;
}
