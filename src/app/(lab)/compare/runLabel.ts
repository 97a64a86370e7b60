import { MAINS_LINE_WORDS, PORT_WORDS, PURPOSE_WORDS } from '@/format/words';
import type { z } from 'zod';
import type { sweepListItem } from '@/schemas/sweep';

export type ListedRun = z.infer<typeof sweepListItem>;

/** `M2, enclosure, horizontal, final, R-26-032`; a trial says what was tried, a voided run that it is. */
export function runLabel(run: ListedRun): string {
  const { state, trial, port, line, polarisation, purpose, number, voided, partial } = run;
  const position = line ? MAINS_LINE_WORDS[line] : polarisation;
  const parts = [
    trial === null ? state : `${state} with ${trial}`,
    PORT_WORDS[port],
    position,
    PURPOSE_WORDS[purpose],
    number,
    voided && 'voided',
    partial && 'partial',
  ];
  return parts.filter(Boolean).join(', ');
}

/** Whether two runs read the same port at the same position. */
export function sameReading(one: ListedRun, other: ListedRun): boolean {
  return one.port === other.port && one.line === other.line && one.polarisation === other.polarisation;
}

/** The run that another is most likely laid over: the newest of the same reading and purpose, not voided. */
export function likest(run: ListedRun, others: readonly ListedRun[]): ListedRun {
  const rank = (other: ListedRun) =>
    (other.id === run.id ? 8 : 0) +
    (sameReading(other, run) ? 0 : 4) +
    (other.purpose === run.purpose ? 0 : 2) +
    (other.voided ? 1 : 0);
  return [...others].sort((one, other) => rank(one) - rank(other))[0]!;
}
