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
