import { renderToStaticMarkup } from 'react-dom/server';
import { LetterText } from '@/app/(auth)/letters/LetterText';
import { peopleFinding, standsAs, standsBecause } from '@/app/(lab)/people/personWords';
import type { PersonView } from '@/schemas/people';

const PERSON: PersonView = {
  id: 'k3x9v2m1q8w7e6r5',
  version: 1,
  name: 'Odo Fenn',
  email: 'odo@kettlevane.example',
  role: 'designer',
  organisation: { id: 'k3x9v2m1q8w7e6r6', name: 'Kettle & Vane' },
  state: 'active',
  disabledAt: null,
  disabledReason: null,
  lastSignInAt: null,
  invitation: null,
};
const ZONE = 'Europe/London';
const sent = { state: 'sent', attempts: 1, doneAt: '2026-12-01T14:17:00Z', nextTryAt: null, reason: null } as const;
const refused = { ...sent, state: 'refused', reason: '550 no such mailbox' } as const;
const invited = (
  open: boolean,
  mail: NonNullable<PersonView['invitation']>['mail'],
  expiresAt = '2099-12-08T14:16:00Z',
) => ({ ...PERSON, state: 'invited', invitation: { open, mail, expiresAt } }) satisfies PersonView;

test.each([
  [PERSON, 'under', 'active', null],
  [invited(true, sent), 'inconclusive', 'invited', 'e-mail sent 1 Dec 2026, 14:17; link works until 8 Dec 2099, 14:16'],
  [
    invited(false, sent, '2020-01-08T14:16:00Z'),
    'over',
    'invitation ran out',
    'e-mail sent 1 Dec 2026, 14:17; link ended 8 Jan 2020, 14:16',
  ],
  [invited(true, refused), 'over', 'invitation refused', 'e-mail refused 1 Dec 2026, 14:17: 550 no such mailbox'],
  [{ ...PERSON, state: 'invited' }, 'inconclusive', 'no password yet', null],
  [
    { ...PERSON, state: 'disabled', disabledAt: '2026-12-01T14:17:00Z', disabledReason: 'left the client' },
    'not-covered',
    'disabled',
    'since 1 Dec 2026: left the client',
  ],
] as [PersonView, string, string, string | null][])('%#: %j', (person, verdict, word, because) => {
  expect(standsAs(person)).toEqual({ verdict, word });
  expect(standsBecause(person, ZONE)).toBe(because);
});

const said = (people: PersonView[], mail: Parameters<typeof peopleFinding>[1] = 'smtp') => {
  const { verdict, runs } = peopleFinding(people, mail);
  return [verdict, runs.map(({ text }) => text).join('')];
};

test('the sheet opens with what asks for somebody first', () => {
  expect(said([PERSON, PERSON])).toEqual(['under', 'Two people can sign in.']);
  expect(said([invited(true, sent), PERSON])).toEqual([
    'inconclusive',
    'One invitation waits for an answer; one person can sign in.',
  ]);
  expect(said([invited(true, refused), invited(true, refused)])).toEqual(['over', 'Two invitations were refused.']);
});

test('a manager is told that e-mail waits while there is no mail server', () => {
  const waits = invited(true, { ...sent, state: 'queued', doneAt: null, attempts: 0 });
  expect(said([waits], 'nowhere')).toEqual([
    'over',
    'No mail server is configured, so e-mail waits: set SMTP_URL on the lab’s server. One invitation waits for an answer.',
  ]);
});

test('a letter is text: its addresses become links and nothing else is markup', () => {
  const html = renderToStaticMarkup(
    <LetterText
      text={'See http://a.example/x#y\n<script>alert(1)</script> javascript:alert(1) "https://b.example/?q=1&r=2"\n'}
    />,
  );
  expect([...html.matchAll(/href="([^"]*)"/g)].map(([, href]) => href)).toEqual([
    'http://a.example/x#y',
    'https://b.example/?q=1&amp;r=2',
  ]);
  expect(html).not.toContain('<script');
  expect(html).toContain('&lt;script&gt;');
});
