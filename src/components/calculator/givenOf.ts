import { parseFrequency } from '@/components/charts/parseFrequency';
import type { Given, Pane, PaneField } from './pane';
import { outside, readFigure, type Typed } from './typedFigure';

/** What stands in the fields, by their names, as it was typed. */
export type Entries = Readonly<Record<string, string>>;

export interface ReadPane {
  fields: readonly PaneField[];
  given: Given;
  /** What is wrong with a field, by its name. */
  problems: Readonly<Record<string, string>>;
}

/** Reads what was typed into a pane. An empty field has no value and no problem; a choice nobody made has none. */
export function readPane(pane: Pane, entries: Entries): ReadPane {
  const chosen = (field: PaneField | undefined): string | null => {
    if (field?.kind !== 'choice') return null;
    const value = entries[field.name];
    return field.choices.some((one) => one.value === value) ? value! : (field.first ?? null);
  };
  // Choices stand before what depends on them, so the fields are found with the choices that are always there.
  const always = pane.fields(() => null);
  const fields = pane.fields((name) => chosen(always.find((field) => field.name === name)));
  const read = new Map<string, Typed | null>();
  for (const field of fields)
    if (field.kind !== 'choice') read.set(field.name, readField(field, entries[field.name] ?? ''));
  const figure = (name: string) => {
    const typed = read.get(name);
    return typed && 'value' in typed ? typed.value : null;
  };
  const named = (name: string) => fields.find((field) => field.name === name);
  const choice = (name: string) => chosen(named(name));
  const given: Given = {
    figure,
    choice,
    missing: (names) =>
      [...new Set(names)].flatMap((need) => {
        const name = need.replace(/\?$/, '');
        const refused = read.get(name) !== undefined && read.get(name) !== null && figure(name) === null;
        const empty = (named(name)?.kind === 'choice' ? choice(name) : figure(name)) === null;
        return refused || (empty && name === need) ? [calledOf(named(name), name)] : [];
      }),
  };
  const problems = Object.fromEntries(
    [...read].flatMap(([name, typed]) => (typed && 'problem' in typed ? [[name, typed.problem]] : [])),
  );
  return { fields, given, problems };
}

function calledOf(field: PaneField | undefined, name: string): string {
  return field === undefined ? name : field.kind === 'choice' ? field.called : field.label;
}

function readField(field: Exclude<PaneField, { kind: 'choice' }>, text: string): Typed | null {
  if (text.trim() === '') return null;
  if (field.kind === 'figure') return readFigure(text, field.range);
  const plain = text.replace(/\u202f/g, '').trim();
  const hz = parseFrequency(/[a-z]/i.test(plain) ? plain : `${plain} ${field.unit}`);
  if (hz === null) {
    const figure = readFigure(plain.replace(/\s*[kmg]?hz$/i, ''), 'above-zero');
    const problem = 'problem' in figure ? figure.problem : `${text.trim()} is no frequency.`;
    return { problem };
  }
  const problem = outside(hz, 'above-zero', text.trim());
  return problem === null ? { value: hz } : { problem };
}
