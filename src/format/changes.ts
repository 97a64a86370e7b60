import type { Verdict } from '@/emc/kinds';
import { capitalised, VERDICT_WORDS } from './words';

/** A field of a record that a change moved, as the audit entry holds it. */
export interface FieldChange {
  name: string;
  before: string | number | boolean | null;
  after: string | number | boolean | null;
}

const NAMES: Record<string, string> = {
  stateReason: 'reason',
  limitSet: 'limit set',
  worstMarginDb: 'worst margin',
};

/** `State: M2, before that M1.` A field that was empty before, such as a reason, is said alone. */
export function changeText({ name, before, after }: FieldChange): string {
  const what = capitalised(NAMES[name] ?? name.replace(/[A-Z]/g, (letter) => ` ${letter.toLowerCase()}`));
  const value = (one: FieldChange['after']) => (name === 'verdict' ? VERDICT_WORDS[one as Verdict] : valueWords(one));
  const now = `${what}: ${value(after)}`;
  return before === null || before === '' ? now : `${now}, before that ${value(before)}`;
}

function valueWords(one: FieldChange['after']): string {
  if (one === null || one === '') return 'nothing';
  if (typeof one === 'boolean') return one ? 'yes' : 'no';
  return String(one);
}
