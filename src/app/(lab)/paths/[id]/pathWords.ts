import { formatFrequencyRange } from '@/format/frequencies';
import type { FindingRun } from '@/format/finding';
import { formatUncertainty } from '@/format/quantities';
import type { CorrectionView, PathRecord, UncertaintyView } from '@/schemas/paths';

type Verdict = 'over' | 'inconclusive' | 'under' | 'not-covered';

/** What one correction can serve, and which item ends it where. Nothing is carried beyond a table. */
export function reachWords({ stretches, polarisation }: CorrectionView): string {
  const which = polarisation ? `${polarisation}: ` : '';
  if (stretches.length === 0) return 'No item of this path adds anything; a reading is its level.';
  const known = stretches.filter(({ missing }) => missing.length === 0);
  const without = stretches.filter(({ missing }) => missing.length > 0);
  const says = known.map(({ fromHz, toHz }) => formatFrequencyRange(fromHz, toHz)).join(' and ');
  const lead = says ? `${which}corrected over ${says}` : `${which}corrected nowhere`;
  const rest = without.map(({ fromHz, toHz, missing }) => {
    const none = missing.length === 1 ? 'has no factor' : 'have no factor';
    return `${missing.join(' and ')} ${none} over ${formatFrequencyRange(fromHz, toHz)}`;
  });
  return `${[lead, ...rest].join('; ')}.`;
}

/** `±3.4 dB`, or the smallest and the largest of several ranges. */
function rangeOfU(uncertainty: readonly UncertaintyView[], purpose: UncertaintyView['purpose']): string | null {
  const figures = uncertainty.filter((one) => one.purpose === purpose).map(({ expandedDb }) => expandedDb);
  if (figures.length === 0) return null;
  const [least, most] = [Math.min(...figures), Math.max(...figures)].map(formatUncertainty);
  return least === most ? least! : `${least} to ${most}`;
}

/** What stands in the way of a new run, then what the path serves: the sheet opens with it. */
export function pathFinding(path: PathRecord): { verdict: Verdict; runs: FindingRun[] } {
  const barred = path.items.filter(({ due, state }) => due === 'lapsed' || state !== 'in-use');
  const soon = path.items.filter(({ due }) => due === 'due-soon');
  const known = path.corrections.flatMap(({ stretches }) => stretches.filter(({ missing }) => missing.length === 0));
  const runs: FindingRun[] = [];
  for (const item of barred) {
    const why = item.state === 'in-use' ? 'has lapsed' : `is ${item.state}`;
    runs.push({ text: item.identifier, figure: true, strong: true }, { text: ` ${why}: no new run takes this path. ` });
  }
  if (known.length > 0) {
    const [low, high] = [Math.min(...known.map((one) => one.fromHz)), Math.max(...known.map((one) => one.toHz))];
    runs.push({ text: 'It corrects ' }, { text: formatFrequencyRange(low, high), figure: true }, { text: '; ' });
  }
  const [final, prescan] = [rangeOfU(path.uncertainty, 'final'), rangeOfU(path.uncertainty, 'prescan')];
  if (final === null && prescan === null) {
    runs.push({ text: 'no uncertainty is stated, so nothing measured through it concludes.' });
    return { verdict: barred.length > 0 ? 'over' : 'not-covered', runs };
  }
  runs.push({ text: 'U is ' });
  if (final) runs.push({ text: final, figure: true, strong: true }, { text: ' for a final' });
  if (final && prescan) runs.push({ text: ' and ' });
  if (prescan) runs.push({ text: prescan, figure: true, strong: true }, { text: ' for a prescan' });
  const computed = path.uncertainty.every(({ budget }) => budget !== null);
  runs.push({ text: computed ? ', from its budget.' : ', stated without a budget.' });
  return { verdict: barred.length > 0 ? 'over' : soon.length > 0 ? 'inconclusive' : 'under', runs };
}
