import type { FindingRun } from '@/format/finding';
import { formatQuantity, type Quantity } from '@/format/calculated';
import type { Range } from './typedFigure';

/** One thing a pane asks for. Its name stands in the address. */
export interface FigureField {
  kind: 'figure';
  name: string;
  /** Heading of the fields it stands among; without one it stands with the first. */
  group?: string;
  label: string;
  unit: string;
  range: Range;
  /** Also says what it means to leave the field empty, where that is possible. */
  hint?: string;
  /** Figures that are asked for most, offered beside the field and never taken by themselves. */
  picks?: readonly string[];
}
/** Typed in `unit`, or with kHz, MHz or GHz after it; read in hertz. */
export interface FrequencyField extends Omit<FigureField, 'kind' | 'range' | 'unit'> {
  kind: 'frequency';
  unit: 'kHz' | 'MHz';
}
export interface ChoiceField {
  kind: 'choice';
  name: string;
  group?: string;
  label: string;
  choices: readonly { value: string; word: string }[];
  /** What an answer says it waits for: `unit of the level`. */
  called: string;
  /** Shown as chosen when the address names none; without it a person chooses. */
  first?: string;
  hint?: string;
}
export type PaneField = FigureField | FrequencyField | ChoiceField;

/** A term of a sum or product, or an input that a formula names. */
export interface Term {
  sign: '' | '+' | '−' | '×' | '÷';
  /** Null where nobody gave it: then it is not part of the sum. */
  quantity: Quantity | null;
  name: string;
  /** Where it comes from: typed here, a definition, a rule. */
  source: string | null;
}

/** How a figure came about: what went in, the terms that add up or multiply, and what they make. */
export interface Working {
  /** `20 log10(U / 1 µV)`, where the terms alone do not say it. */
  formula: string | null;
  given: readonly Term[];
  terms: readonly Term[];
  result: Quantity;
  resultName: string;
  source: string;
}

/** A figure of a pane, or why there is none. */
export type Answer = { id: string; name: string } & (
  { working: Working; because: null } | { working: null; because: string }
);

export interface Outcome {
  answers: readonly Answer[];
  /** One sentence with the figures; null while there is none. */
  says: readonly FindingRun[] | null;
  /** What the figures may not be used for, shown beside them. */
  cautions: readonly string[];
  /** What goes with them and cautions nobody. */
  notes?: readonly string[];
  /** Fields that contradict one another, by name. */
  wrong?: Readonly<Record<string, string>>;
}

/** What was typed, read: null where it is empty or refused. */
export interface Given {
  figure: (name: string) => number | null;
  choice: (name: string) => string | null;
  /** Labels of those among these fields that have no value; of a name that ends in `?` only when it is refused. */
  missing: (names: readonly string[]) => string[];
}

export interface Pane {
  id: string;
  title: string;
  /** What it answers, as one line. */
  about: string;
  /** Fields may depend on what is chosen among them. */
  fields: (choice: (name: string) => string | null) => readonly PaneField[];
  compute: (given: Given) => Outcome;
  /** Where the figures hold and what they rest on. */
  holds: readonly string[];
}

export const level = (value: number, unit = 'dB'): Quantity => ({ value, unit, form: 'level' });
export const scaled = (value: number, unit: string): Quantity => ({ value, unit, form: 'scaled' });
export const ratio = (value: number, unit = ''): Quantity => ({ value, unit, form: 'ratio' });
export const hertz = (value: number): Quantity => ({ value, unit: 'Hz', form: 'frequency' });
/** A bandwidth or a step: 120 kHz, 9 kHz. */
export const setting = (value: number): Quantity => ({ value, unit: 'Hz', form: 'setting' });
export const count = (value: number, unit = ''): Quantity => ({ value, unit, form: 'count' });
export const seconds = (value: number): Quantity => ({ value, unit: 's', form: 'duration' });

export const TYPED = 'as typed here';

/** The first term of a sum or product. */
export const start = (quantity: Quantity, name: string, source: string | null = TYPED): Term => ({
  sign: '',
  quantity,
  name,
  source,
});
/** What is added in a sum. Its name is of the figure as it stands: 20 log10(0.5) is added as −6.02. */
export const add = (quantity: Quantity, name: string, source: string | null = TYPED): Term => ({
  sign: '+',
  quantity,
  name,
  source,
});
/** What is taken off a sum. */
export const less = (quantity: Quantity, name: string, source: string | null = TYPED): Term => ({
  sign: '−',
  quantity,
  name,
  source,
});
/** A correction whose name says no sign: it is drawn from the figure. */
export const shift = (quantity: Quantity, name: string, source: string | null): Term =>
  quantity.value < 0 ? less({ ...quantity, value: -quantity.value }, name, source) : add(quantity, name, source);
export const times = (quantity: Quantity, name: string, source: string | null = TYPED): Term => ({
  sign: '×',
  quantity,
  name,
  source,
});
export const over = (quantity: Quantity, name: string, source: string | null = TYPED): Term => ({
  sign: '÷',
  quantity,
  name,
  source,
});
/** A term that nobody gave, named all the same. */
export const left = (name: string, source: string): Term => ({ sign: '', quantity: null, name, source });

/**
 * An answer from what it needs: the figures in their order, or the labels it waits for. A need that ends in `?` may be
 * left empty, but not be refused. `work` may answer a sentence instead, which says why there is no figure.
 */
export function answer(
  id: string,
  name: string,
  given: Given,
  needs: readonly string[],
  work: (...figures: number[]) => Working | string,
): Answer {
  const missing = given.missing(needs);
  if (missing.length > 0) return { id, name, working: null, because: `waits for ${listed(missing)}` };
  // a choice has no figure, and everything needed that has one is given
  const figures = needs.filter((need) => !need.endsWith('?')).flatMap((need) => given.figure(need) ?? []);
  const done = work(...figures);
  if (typeof done === 'string') return { id, name, working: null, because: done };
  return { id, name, working: done, because: null };
}

/** `reading, antenna factor and distance`, in small letters. */
export function listed(labels: readonly string[]): string {
  const words = labels.map((label) =>
    /^[A-Z][a-z]/.test(label) ? label.charAt(0).toLowerCase() + label.slice(1) : label,
  );
  return words.length < 2 ? words.join('') : `${words.slice(0, -1).join(', ')} and ${words.at(-1)}`;
}

/** A sentence with its figures set as figures: say`${level(-68, 'dBm')} is ${level(38.99, 'dBµV')}.` */
export function say(words: TemplateStringsArray, ...figures: (Quantity | string)[]): FindingRun[] {
  return words.flatMap((text, at) => {
    const figure = figures[at];
    const runs: FindingRun[] = text === '' ? [] : [{ text }];
    if (typeof figure === 'string') return [...runs, { text: figure }];
    return figure === undefined ? runs : [...runs, { text: formatQuantity(figure), figure: true }];
  });
}

/** The result of an answer by its id, or null. */
export function resultOf(answers: readonly Answer[], id: string): Quantity | null {
  return answers.find((one) => one.id === id)?.working?.result ?? null;
}
