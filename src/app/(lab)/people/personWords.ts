import { formatDay, formatDayTime } from '@/format/dates';
import { mailStateWords } from '@/format/mailState';
import { capitalised, countInWords } from '@/format/words';
import type { PersonView } from '@/schemas/people';

type Verdict = 'under' | 'inconclusive' | 'over' | 'not-covered';

/** How somebody stands: in, still to answer, or with an invitation that did not arrive. */
export function standsAs(person: PersonView): { verdict: Verdict; word: string } {
  const { state, invitation } = person;
  if (state === 'disabled') return { verdict: 'not-covered', word: 'disabled' };
  if (state === 'active') return { verdict: 'under', word: 'active' };
  if (invitation?.mail?.state === 'refused') return { verdict: 'over', word: 'invitation refused' };
  if (!invitation) return { verdict: 'inconclusive', word: 'no password yet' };
  return invitation.open
    ? { verdict: 'inconclusive', word: 'invited' }
    : { verdict: 'over', word: 'invitation ran out' };
}

/** What became of the invitation, or why somebody is out: the second line of a row. Null for who simply works here. */
export function standsBecause(person: PersonView, zone: string): string | null {
  const { state, invitation, disabledAt, disabledReason } = person;
  if (state === 'disabled') {
    const since = disabledAt ? `since ${formatDay(disabledAt, zone)}` : '';
    return [since, disabledReason].filter(Boolean).join(': ') || null;
  }
  if (state === 'active' || !invitation) return null;
  const mail = invitation.mail ? mailStateWords(invitation.mail, zone) : null;
  const until = `link ${invitation.open ? 'works until' : 'ended'} ${formatDayTime(invitation.expiresAt, zone)}`;
  const link = invitation.open || new Date(invitation.expiresAt) < new Date() ? until : 'link was ended';
  return [mail && `e-mail ${mail}`, invitation.mail?.state === 'refused' ? null : link].filter(Boolean).join('; ');
}

/** The sentence the sheet opens with: what asks for somebody first. */
export function peopleFinding(people: readonly PersonView[], mail: 'smtp' | 'caught' | 'nowhere') {
  const count = (word: string) => people.filter((person) => standsAs(person).word === word).length;
  const say = (many: number, one: string, more: string) =>
    many > 0 ? [`${countInWords(many)} ${many === 1 ? one : more}`] : [];
  const refused = say(count('invitation refused'), 'invitation was refused', 'invitations were refused');
  const over = say(count('invitation ran out'), 'invitation ran out', 'invitations ran out');
  const open = say(count('invited'), 'invitation waits for an answer', 'invitations wait for an answer');
  const active = say(count('active'), 'person can sign in', 'people can sign in');
  const waits = mail === 'nowhere' && people.some(({ invitation }) => invitation?.mail?.state === 'queued');
  const clauses = [...refused, ...over, ...open, ...active];
  const sentence = `${capitalised(clauses.join('; '))}.`;
  const verdict: Verdict =
    refused.length > 0 || over.length > 0 || waits ? 'over' : open.length > 0 ? 'inconclusive' : 'under';
  const no = 'No mail server is configured, so e-mail waits: set SMTP_URL on the lab’s server.';
  const text = [mail === 'nowhere' ? no : '', clauses.length > 0 ? sentence : ''].filter(Boolean).join(' ');
  return { verdict, runs: [{ text: text || 'Nobody is entered here.' }] };
}
