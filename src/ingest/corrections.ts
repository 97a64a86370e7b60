import { onOrOff, speaksOfDefaults, wordsOnly, type Entry } from './preamble';
import type { Line } from './sample';
import type { Recognition } from './types';

type Correction = Recognition['correctedFor'][number];

/** Things outside the receiver that exporters name when their values hold them already (common practice). */
const THINGS: [RegExp, string][] = [
  [/antenna (?:factors?|correction)|\bant(?:enna)? fact|\baf\b/, 'antenna factor'],
  [/transducers?|\btrd\b/, 'transducer factor'],
  [/limiter|pulse limiter/, 'limiter'],
  [/cable (?:loss|correction|attenuation|factors?)|\bcables?\b/, 'cable loss'],
  [/ext(?:ernal)? ?att(?:en|enuation|enuator)?\b/, 'external attenuation'],
  [
    /ext(?:ernal)? ?(?:gain|pre ?amp(?:lifier)?)|pre ?amp(?:lifier)? (?:gain|correction|factor)|\bpre ?amp(?:lifier)?\b/,
    'preamplifier',
  ],
  [/\b(?:amn|lisn|isn|artificial (?:mains )?network|voltage division)\b/, 'network factor'],
  [/current probe|transfer impedance/, 'transfer impedance'],
  [/absorbing clamp|clamp factor/, 'clamp factor'],
  [/ref(?:erence)? ?(?:level)? ?offset|level offset|amplitude offset/, 'level offset'],
  [/amplitude correction|correction factors?|user correction|^corrections?$/, 'correction'],
];

const APPLIED = /\b(?:corrected|included|incl|applied|compensated|considered)\b/;
const NOT_APPLIED = /\b(?:not|no|without|un(?:corrected|compensated)|excluding|excl)\b/;
/** Settings inside the receiver, which it accounts for itself. */
const INSIDE = /\b(?:state|band|internal|int|marker|noise|valid|azimuth|roll|elevation)\b/;

function thingIn(words: string): string | null {
  return THINGS.find(([pattern]) => pattern.test(words))?.[1] ?? null;
}

/** `Transducer;ANT factor` or `Ext Att;10;dB`: a key of ours with a value that is not off. */
function fromEntry(entry: Entry): Correction | null {
  const what = thingIn(entry.key);
  if (what === null || INSIDE.test(entry.key) || NOT_APPLIED.test(entry.key)) return null;
  const bare = /^pre ?amp(?:lifier)?$/.test(entry.key) || /^(?:antenna|cables?)$/.test(entry.key);
  const value = entry.values.find((cell) => cell !== '') ?? '';
  if (bare || value === '' || onOrOff(value) === false) return null;
  const number = /^([+-]?\d+(?:[.,]\d+)?)\s*(db)?$/i.exec(value);
  if (number) {
    if (Number(number[1]!.replace(',', '.')) === 0) return null;
    const unit = number[2] ? '' : entry.values[1] && /^db/i.test(entry.values[1]) ? ` ${entry.values[1]}` : ' dB';
    return { what: `${what} ${value}${unit}`, evidence: entry.text, line: entry.line };
  }
  if (NOT_APPLIED.test(wordsOnly(value))) return null;
  const said = onOrOff(value) === true || APPLIED.test(wordsOnly(value));
  return { what: said ? what : `${what} ${value}`, evidence: entry.text, line: entry.line };
}

/** `Values corrected for limiter and cable`: a sentence that says so. */
function fromSentence({ line, text }: Line): Correction[] {
  const words = wordsOnly(text);
  if (!APPLIED.test(words) || NOT_APPLIED.test(words)) return [];
  const decibels = /(\d+(?:[.,]\d+)?)\s?dB(?![a-zµ])/.exec(text)?.[1];
  const things = THINGS.filter(
    ([pattern, what]) => what !== 'level offset' && what !== 'correction' && pattern.test(words),
  );
  return things.map(([, what]) => ({
    what: decibels && things.length === 1 ? `${what} ${decibels} dB` : what,
    evidence: text.trim(),
    line,
  }));
}

/** What the preamble says is already in the values, each with the line that says it. */
export function correctionsOf(lines: readonly Line[], entries: readonly Entry[]): Correction[] {
  const found = new Map<string, Correction>();
  const keep = (correction: Correction | null) => {
    if (!correction) return;
    const key = `${correction.line} ${thingIn(wordsOnly(correction.what)) ?? correction.what}`;
    if (!found.has(key)) found.set(key, correction);
  };
  for (const line of lines) if (!speaksOfDefaults(line.text)) fromSentence(line).forEach(keep);
  for (const entry of entries) keep(fromEntry(entry));
  return [...found.values()].sort((a, b) => a.line - b.line);
}
