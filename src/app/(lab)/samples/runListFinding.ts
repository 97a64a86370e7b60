import type { FindingRun } from '@/format/finding';
import { capitalised, countInWords } from '@/format/words';
import { verdict as verdictSchema } from '@/schemas/common';
import type { Run, Verdict } from './worstRun';

const SAID: Record<Verdict, [one: string, many: string]> = {
  over: ['is over', 'are over'],
  'needs-final': ['needs a final', 'need a final'],
  inconclusive: ['is inconclusive', 'are inconclusive'],
  'not-covered': ['is not covered', 'are not covered'],
  under: ['is under', 'are under'],
};

/** What the runs on this page say, worst first: `Of the newest 50 runs, two are over; 13 need a final; 35 are under.` */
export function runListFinding(
  runs: readonly Run[],
  newest: boolean,
  whole: boolean,
): { verdict: Verdict; runs: FindingRun[] } {
  if (runs.length === 0)
    return { verdict: 'not-covered', runs: [{ text: newest ? 'No run is kept yet.' : 'No run lies further back.' }] };
  const clauses: string[] = [];
  let worst: Verdict | null = null;
  for (const verdict of verdictSchema.options) {
    const count = runs.filter((run) => run.verdict === verdict && !run.voided).length;
    if (count === 0) continue;
    worst ??= verdict;
    clauses.push(`${countInWords(count)} ${SAID[verdict][count === 1 ? 0 : 1]}`);
  }
  const voided = runs.filter((run) => run.voided).length;
  if (voided > 0) clauses.push(`${countInWords(voided)} ${voided === 1 ? 'is' : 'are'} voided`);
  const many = runs.length > 1;
  const which =
    newest && whole
      ? `${countInWords(runs.length)} ${many ? 'runs are' : 'run is'} kept`
      : `of the ${newest ? 'newest' : 'next'} ${countInWords(runs.length)} runs`;
  const text =
    newest && whole ? `${capitalised(which)}: ${clauses.join('; ')}.` : `${capitalised(which)}, ${clauses.join('; ')}.`;
  return { verdict: worst ?? 'not-covered', runs: [{ text }] };
}
