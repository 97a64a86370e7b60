import { invitationMail } from '@/mail/invitationMail';
import { letter, oneLine } from '@/mail/letter';
import { resetMail } from '@/mail/resetMail';

const GIVEN = {
  lab: 'Harrow Lane EMC Bench',
  zone: 'Europe/London',
  to: { name: 'Teo Lind', address: 'teo.lind@pellorrin.example' },
  url: 'https://stillfield.harrowlane.example/reset#token',
  expiresAt: new Date('2026-12-03T14:32:00Z'),
};

test('a reset says which lab, what to do, until when, and that nobody asks for the password', () => {
  const { subject, text, html, to } = resetMail(GIVEN);
  expect(to).toEqual(GIVEN.to);
  for (const words of [subject, text]) expect(words).toContain(GIVEN.lab);
  expect(text).toContain(`\n${GIVEN.url}\n`);
  expect(text).toContain('3 Dec 2026, 14:32 (Europe/London time)');
  expect(text).toContain('Nobody at Harrow Lane EMC Bench asks for your password');
  expect(text).not.toContain('!');
  expect(html).toContain(`href="${GIVEN.url.replaceAll('/', '/')}"`);
});

test.each(['designer', 'technician', 'manager'] as const)('an invitation to a %s says what they will be', (role) => {
  const { text } = invitationMail({ ...GIVEN, role, organisation: 'Pell & Orrin Lighting' });
  expect(text).toContain(`entered you as ${role}`);
  expect(text.includes('Pell & Orrin Lighting')).toBe(role === 'designer');
  expect(text).toContain('Nobody at');
});

test('names are text in the html, whatever they hold', () => {
  const name = `<script>alert(1)</script>"'&`;
  const { html } = resetMail({ ...GIVEN, lab: name, to: { ...GIVEN.to, name } });
  expect(html).not.toMatch(/<script|"'&/);
  expect(html).toContain('&#60;script&#62;alert(1)&#60;/script&#62;');
});

test('one line is one line', () => {
  expect(oneLine(' a\r\nBcc: b\u2028c\u0000d ')).toBe('a Bcc: b c d');
});

test('both parts say the same words in the same order', () => {
  const { text, html } = letter(['First.', { link: 'https://a.example/x', says: 'Open' }, { lines: ['1', '2'] }]);
  expect(text).toBe('First.\n\nOpen:\nhttps://a.example/x\n\n1\n2\n');
  expect(html.indexOf('First.')).toBeLessThan(html.indexOf('https://a.example/x'));
  expect(html).toContain('1<br>2');
});
