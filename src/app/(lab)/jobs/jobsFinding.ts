import type { FindingRun } from '@/format/finding';
import { formatFrequency } from '@/format/frequencies';
import { marginText } from '@/format/quantities';
import { capitalised, countInWords } from '@/format/words';
import { worstFirst, type Verdict } from '@/app/(lab)/samples/worstRun';

/** How an open job stands: its governing port, null while nothing is measured. */
export interface JobStands {
  number: string;
  stands: { verdict: Verdict; state: string; worst: { frequencyHz: number; marginDb: number } | null } | null;
}

const TELLING: Partial<Record<Verdict, [one: string, many: string]>> = {
  'needs-final': ['needs a final', 'need a final'],
  inconclusive: ['is inconclusive', 'are inconclusive'],
  'not-covered': ['is not covered', 'are not covered'],
};

/**
 * `Three jobs are open. HL-2611 is over by 6.2 dB at 144.018 MHz in M2; one is not covered.` On a page that is not the
 * whole list the count says so.
 */
export function jobsFinding(
  open: readonly JobStands[],
  shown: number,
  whole: boolean,
): { verdict: Verdict; runs: FindingRun[] } {
  const runs: FindingRun[] = [{ text: `${capitalised(counting(open.length, shown, whole))}.` }];
  const measured = open.filter((job) => job.stands !== null).sort((a, b) => worstFirst(a.stands!, b.stands!));
  const over = measured.filter((job) => job.stands!.verdict === 'over');
  const clauses: FindingRun[][] = over.slice(0, 2).map(overClause);
  if (over.length > 2)
    clauses.push([{ text: `${countInWords(over.length - 2)} more ${over.length === 3 ? 'is' : 'are'} over` }]);
  for (const [verdict, [one, many]] of Object.entries(TELLING)) {
    const count = measured.filter((job) => job.stands!.verdict === verdict).length;
    if (count > 0) clauses.push([{ text: `${countInWords(count)} ${count === 1 ? one : many}` }]);
  }
  const idle = open.length - measured.length;
  if (idle > 0) clauses.push([{ text: `${countInWords(idle)} ${idle === 1 ? 'is' : 'are'} not measured yet` }]);
  if (measured.length > 0 && over.length === 0) clauses.unshift([{ text: 'none is over' }]);
  const first = clauses[0]?.[0];
  if (first && !first.figure) clauses[0]![0] = { text: capitalised(first.text) };
  clauses.forEach((clause, at) => runs.push({ text: at === 0 ? ' ' : '; ' }, ...clause));
  if (clauses.length > 0) runs.push({ text: '.' });
  return { verdict: measured[0]?.stands?.verdict ?? 'not-covered', runs };
}

function counting(open: number, shown: number, whole: boolean): string {
  const are = open === 1 ? 'job is' : 'jobs are';
  if (whole) return `${countInWords(open)} ${are} open`;
  return `of these ${countInWords(shown)} jobs ${countInWords(open)} ${open === 1 ? 'is' : 'are'} open`;
}

function overClause({ number, stands }: JobStands): FindingRun[] {
  const id = { text: number, figure: true };
  if (!stands?.worst) return [id, { text: ` is over in ${stands?.state}` }];
  const { figure, word } = marginText(stands.worst.marginDb);
  const amount =
    word === 'on the limit'
      ? [{ text: ' is over, on the limit' }]
      : [{ text: ' is over by ' }, { text: `${figure} dB`, figure: true, strong: true }];
  return [
    id,
    ...amount,
    { text: ' at ' },
    { text: formatFrequency(stands.worst.frequencyHz), figure: true },
    { text: ` in ${stands.state}` },
  ];
}
