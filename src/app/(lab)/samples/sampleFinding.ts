import type { FindingRun } from '@/format/finding';
import { formatFrequency } from '@/format/frequencies';
import { formatDb, formatUncertainty, marginText } from '@/format/quantities';
import { capitalised, PORT_WORDS, VERDICT_WORDS } from '@/format/words';
import { worstFirst, type Port, type Verdict } from './worstRun';

/** What the sentence needs of a standing. */
export interface Stands {
  port: Port;
  /** The state it was measured in, `M2`. */
  state: string;
  /** Of the port over all its runs. */
  verdict: Verdict;
  /** What the port's verdict still lacks, one sentence each. */
  missing: readonly string[];
  worst: { frequencyHz: number; marginDb: number; uncertaintyDb: number } | null;
  /** The same port at the first state, measured for the same purpose. */
  first?: { state: string; marginDb: number } | null;
}

const plain = (text: string): FindingRun => ({ text });
const figure = (text: string): FindingRun => ({ text, figure: true });
const strong = (text: string): FindingRun => ({ text, figure: true, strong: true });

/** The sentence of a sample: its governing port with the figure, then the others. */
export function sampleFinding(standings: readonly Stands[]): { verdict: Verdict; runs: FindingRun[] } {
  const [worst, ...others] = [...standings].sort(worstFirst);
  if (!worst) {
    return {
      verdict: 'not-covered',
      runs: [plain('Nothing is measured yet.')],
    };
  }
  const runs = [...opening(worst), plain('.')];
  if (worst.verdict === 'not-covered') runs.push(...uncovered(worst));
  const rest = others.map(
    ({ port, verdict, state }) =>
      `${PORT_WORDS[port]} ${isOrNeeds(verdict)}${state === worst.state ? '' : ` in ${state}`}`,
  );
  if (rest.length > 0) runs.push(plain(` ${capitalised(rest.join('; '))}.`));
  return { verdict: worst.verdict, runs };
}

/** `is over`, `needs a final`. */
export function isOrNeeds(verdict: Verdict): string {
  return verdict === 'needs-final' ? VERDICT_WORDS[verdict] : `is ${VERDICT_WORDS[verdict]}`;
}

function opening({ port, state, verdict, worst, first }: Stands): FindingRun[] {
  const where = `${PORT_WORDS[port]} in ${state}`;
  if (!worst || verdict === 'not-covered')
    return [plain(capitalised(`${PORT_WORDS[port]} ${isOrNeeds(verdict)} in ${state}`))];
  const { figure: size, word } = marginText(worst.marginDb);
  const onLimit = word === 'on the limit';
  const at = [plain(' at '), figure(formatFrequency(worst.frequencyHz)), plain(`, ${where}`)];
  if (verdict === 'over' || verdict === 'under') {
    const lead = onLimit
      ? [plain(`${capitalised(verdict)}, on the limit`)]
      : [plain(`${capitalised(verdict)} by `), strong(`${size} dB`)];
    return [...lead, ...at, ...better(worst.marginDb, state, first)];
  }
  const lead = onLimit ? [plain('On the limit')] : [strong(`${size} dB`), plain(` ${word}`)];
  if (verdict === 'needs-final') return [...lead, ...at, plain(': this needs a final')];
  return [...lead, ...at, plain(', within '), figure(formatUncertainty(worst.uncertaintyDb)), plain(': inconclusive')];
}

/** `, 5.2 dB better than M0`: what the modifications did to the worst emission of this port. */
function better(marginDb: number, state: string, first: Stands['first']): FindingRun[] {
  if (!first || first.state === state) return [];
  const gainedDb = marginDb - first.marginDb;
  const size = formatDb(Math.abs(gainedDb));
  if (Number(size) === 0) return [];
  return [plain(', '), figure(`${size} dB`), plain(` ${gainedDb > 0 ? 'better' : 'worse'} than ${first.state}`)];
}

/** Why it is not covered, and how near the line the measured part comes. */
function uncovered({ missing, worst }: Stands): FindingRun[] {
  const runs = missing[0] ? [plain(` ${missing[0]}`)] : [];
  if (!worst) return runs;
  const { figure: size, word } = marginText(worst.marginDb);
  const amount = word === 'on the limit' ? [plain(word)] : [strong(`${size} dB`), plain(` ${word}`)];
  return [
    ...runs,
    plain(' What was measured is closest at '),
    figure(formatFrequency(worst.frequencyHz)),
    plain(', '),
    ...amount,
    plain('.'),
  ];
}
