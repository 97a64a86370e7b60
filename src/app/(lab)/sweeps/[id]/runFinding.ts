import type { SweepView } from '@/schemas/sweep';
import { formatDay } from '@/format/dates';
import { findingOf, type FindingRun } from '@/format/finding';
import { formatFrequency } from '@/format/frequencies';
import { formatCount } from '@/format/quantities';
import { strayedText } from '@/format/setup';

/** The sentence a run opens with; before it, when it is voided, and after it, when it is a trial, what it speaks for. */
export function runFinding(
  sweep: SweepView,
  zone: string,
): { verdict: SweepView['evaluation']['verdict']; runs: FindingRun[] } {
  const { evaluation, traces, limitSet, voided, trial, state, partial } = sweep;
  const runs = findingOf(evaluation, traces, limitSet.lines);
  const strayed = strayedText(sweep.setup.eutStayed === 'no' ? sweep.setup.whatHappened : null);
  if (strayed) runs.push({ text: ` ${strayed}`, remark: true });
  if (partial) runs.push(...partialWords(partial));
  if (trial !== null) runs.push({ text: ` A trial under ${state.label}, ${trial}: it speaks for nothing but itself.` });
  if (!voided) return { verdict: evaluation.verdict, runs };
  const reason = /[.!?]$/.test(voided.reason) ? voided.reason : `${voided.reason}.`;
  const lead = `Voided on ${formatDay(voided.at, zone)} by ${voided.by.name}, so it speaks for nothing: ${reason} It read: `;
  return { verdict: 'not-covered', runs: [{ text: lead }, ...lowered(runs)] };
}

/** A broken file shows what is over and no more; where it broke, so that the line can be looked at. */
function partialWords({ line, readToHz }: NonNullable<SweepView['partial']>): FindingRun[] {
  return [
    { text: ' Partial: its file breaks off at line ' },
    { text: formatCount(line), figure: true },
    { text: ', after ' },
    { text: formatFrequency(readToHz), figure: true },
    { text: '; nothing of it is under.' },
  ];
}

/** What follows a colon goes on in small letters. */
function lowered([first, ...rest]: FindingRun[]): FindingRun[] {
  if (!first || first.figure) return [first, ...rest].filter((run) => run !== undefined);
  return [{ ...first, text: first.text.charAt(0).toLowerCase() + first.text.slice(1) }, ...rest];
}

/** `Lumen strip driver LD-40`, with what sets the run apart. */
export function runTitle({ sample, trial, voided, partial }: SweepView): string {
  const marks = [trial !== null && `trial ${trial}`, partial && 'partial', voided && 'voided'].filter(Boolean);
  return [sample.product, ...marks].join(', ');
}
