import { formatFrequency } from '@/format/frequencies';
import { missingText } from '@/format/missing';
import { formatCount, formatMarginDb, formatUncertainty, marginText } from '@/format/quantities';
import { capitalised, countInWords, PORT_METHODS, PORT_WORDS, VERDICT_WORDS } from '@/format/words';
import type { PortResult, StateResult } from '@/schemas/resultMail';
import { letter, oneLine, type LetterPart } from './letter';

/** How many of a port's missing parts are written out; the sheet has the rest. */
const MISSING_SHOWN = 6;

const RULE =
  'Decision rule: with expanded uncertainty U, an emission is under when its margin to the limit is larger than U, ' +
  'over when it lies above the limit by more than U, and inconclusive between. Needs a final: the reading cannot ' +
  'decide. Not covered: something is missing.';
const RECORD = 'This is a pre-compliance record of one sample in the state named, not a certificate.';

/** The result of one modification state in plain words: subject, text and the same as html. */
export function resultMail(result: StateResult): { subject: string; text: string; html: string } {
  const { lab, sender, product, sample, state, job, ports, note, link } = result;
  const parts: LetterPart[] = [
    {
      lines: [
        `${product.name} ${product.code}, state ${state.label}: ${state.description}.`,
        identity(sample, job),
      ].map(oneLine),
    },
    finding(ports),
    ...(note === '' ? [] : [{ lines: [`${sender} adds:`, ...note.split(/\r?\n/)].map(oneLine) }]),
    ...ports.map((port) => ({ lines: portLines(port).map(oneLine) })),
    ...aside(result),
    RULE,
    RECORD,
    { link, says: `The whole record of ${state.label}, with its charts (sign in to see it)` },
    oneLine(`${sender}, ${lab}`),
  ];
  return { subject: oneLine(`Result of ${product.code} ${state.label}, job ${job.number}`), ...letter(parts) };
}

function identity(sample: StateResult['sample'], job: StateResult['job']): string {
  return `Sample ${sample.code}, serial ${sample.serial}. Job ${job.number}, ${job.title}.`;
}

/** The governing port with its figure, then how the others stand. */
export function finding(ports: readonly PortResult[]): string {
  const [worst, ...others] = ports;
  if (!worst) return 'Nothing is measured yet.';
  const rest = others.map(({ port, verdict }) => `${PORT_WORDS[port]} ${isOrNeeds(verdict)}`);
  return [governing(worst), ...(rest.length > 0 ? [`${capitalised(rest.join('; '))}.`] : [])].join(' ');
}

const isOrNeeds = (verdict: PortResult['verdict']) =>
  verdict === 'needs-final' ? VERDICT_WORDS[verdict] : `is ${VERDICT_WORDS[verdict]}`;

function governing({ port, verdict, worst }: PortResult): string {
  const name = PORT_WORDS[port];
  if (verdict === 'not-covered') {
    const closest = worst ? ` What was measured is closest ${place(worst)}, ${amount(worst.marginDb)}.` : '';
    return `${capitalised(name)} is not covered.${closest}`;
  }
  if (!worst) return `${capitalised(name)} ${isOrNeeds(verdict)}.`;
  const at = `${place(worst)}, ${name}`;
  if (verdict === 'inconclusive') {
    return `${capitalised(amount(worst.marginDb))} ${at}, within ${formatUncertainty(worst.uncertaintyDb)}: inconclusive.`;
  }
  if (verdict === 'needs-final') return `${capitalised(amount(worst.marginDb))} ${at}: this needs a final.`;
  const { figure, word } = marginText(worst.marginDb);
  const by = word === 'on the limit' ? ', on the limit' : ` by ${figure} dB`;
  return `${capitalised(VERDICT_WORDS[verdict])}${by} ${at}.`;
}

type Worst = NonNullable<PortResult['worst']>;

function amount(marginDb: number): string {
  const { word } = marginText(marginDb);
  return word === 'on the limit' ? word : formatMarginDb(marginDb);
}

function place({ kind, frequencyHz, fromHz, toHz }: Worst): string {
  if (kind === 'peak') return `at ${formatFrequency(frequencyHz)}`;
  return `in the noise floor from ${formatFrequency(fromHz)} to ${formatFrequency(toHz)}`;
}

function portLines({ port, verdict, worst, limitSets, missing, runs }: PortResult): string[] {
  const sets = limitSets.map(({ name, revision, lines }) => {
    const each = lines.map((line) => `${line.name}, revision ${line.revision}`).join('; ');
    return `Limits: ${name}, revision ${revision} (${each})`;
  });
  const lacking = missing.slice(0, MISSING_SHOWN).map((one) => `Missing: ${missingText(one)}`);
  const more = missing.length - lacking.length;
  return [
    `${capitalised(PORT_WORDS[port])}, ${PORT_METHODS[port]}: ${VERDICT_WORDS[verdict]}`,
    worst
      ? `Worst margin: ${amount(worst.marginDb)} ${place(worst)}, against ${worst.lineName}, run ${worst.run}, ` +
        `U ${formatUncertainty(worst.uncertaintyDb)}`
      : 'Worst margin: no emission stood out',
    ...sets,
    ...lacking,
    ...(more > 0 ? [`Missing: ${formatCount(more)} more, on the sheet.`] : []),
    `Rests on ${runs.length === 1 ? 'run' : 'runs'} ${runs.join(', ')}`,
  ];
}

/** What does not speak here, and what is only part of a file. */
function aside({ leftOut, partial }: StateResult): LetterPart[] {
  const { trials, voided } = leftOut;
  const counted = [
    ...(trials > 0 ? [`${countInWords(trials)} trial ${trials === 1 ? 'run' : 'runs'}`] : []),
    ...(voided > 0 ? [`${countInWords(voided)} voided ${voided === 1 ? 'run' : 'runs'}`] : []),
  ];
  const lines = [
    ...(counted.length > 0 ? [`Left out: ${counted.join(' and ')}.`] : []),
    ...partial.map(({ run, readToHz }) => `Partial: run ${run} was kept up to ${formatFrequency(readToHz)} only.`),
  ];
  return lines.length > 0 ? [{ lines }] : [];
}
