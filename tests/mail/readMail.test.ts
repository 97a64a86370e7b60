import fc from 'fast-check';
import nodemailer from 'nodemailer';
import { decodeWords, readMail } from '@/mail/readMail';

const write = async (subject: string, text: string, name = 'Harrow Lane EMC Bench') => {
  const transport = nodemailer.createTransport({ streamTransport: true, buffer: true });
  const sent = await transport.sendMail({
    messageId: '<one@lab.example>',
    from: { name, address: 'no-reply@lab.example' },
    to: { name: 'Teo', address: 'teo@pellorrin.example' },
    subject,
    text,
    html: '<p>the same</p>',
  });
  return readMail(sent.message as Buffer);
};

test('what nodemailer writes is read back: subject, names, text with its long link whole', async () => {
  const link = `https://stillfield.harrowlane.example/reset#${'aB3-_'.repeat(9)}`;
  const text = `Grüße, µ ± Ω ≤ 10 dB\n\n${link}\n\n${'a long line of words '.repeat(20)}\n.\n--not-a-boundary\n`;
  const mail = await write(
    'Ünïcode subject that is long enough to be folded over more than one line, 6.2 dB',
    text,
    'Bench, "A" Ü',
  );
  expect(mail.subject).toBe('Ünïcode subject that is long enough to be folded over more than one line, 6.2 dB');
  expect(mail.text).toBe(text);
  expect(mail.from).toContain('Bench, "A" Ü');
  expect(mail.messageId).toBe('<one@lab.example>');
});

test('property: any subject of one line and any text come back', async () => {
  const line = fc
    .string({ unit: 'grapheme', minLength: 1, maxLength: 60 })
    .map((s) => s.replace(/[\p{Cc}\p{Cs}\p{Z}\u200b-\u200f\ufeff?=_]+/gu, 'x'));
  const words = fc.array(line, { maxLength: 6 }).map((lines) => `${lines.join('\n')}\n`);
  await fc.assert(
    fc.asyncProperty(line, words, async (subject, text) => {
      const mail = await write(subject, text);
      expect(mail.subject).toBe(subject);
      expect(mail.text).toBe(text);
    }),
    { numRuns: 60 },
  );
});

// RFC 2047 section 8, the printed examples
test.each([
  ['=?ISO-8859-1?Q?a?=', 'a'],
  ['=?ISO-8859-1?Q?a?= b', 'a b'],
  ['=?ISO-8859-1?Q?a?= =?ISO-8859-1?Q?b?=', 'ab'],
  ['=?ISO-8859-1?Q?a?=  =?ISO-8859-1?Q?b?=', 'ab'],
  ['=?ISO-8859-1?Q?a_b?=', 'a b'],
  ['=?ISO-8859-1?Q?a?= =?ISO-8859-2?Q?_b?=', 'a b'],
  ['=?US-ASCII?Q?Keith_Moore?= <moore@cs.utk.edu>', 'Keith Moore <moore@cs.utk.edu>'],
  ['=?ISO-8859-1?Q?Andr=E9?= Pirard', 'André Pirard'],
  ['=?ISO-8859-1?B?SWYgeW91IGNhbiByZWFkIHRoaXMgeW8=?=', 'If you can read this yo'],
])('RFC 2047 8: %s is displayed as %s', (header, shown) => expect(decodeWords(header)).toBe(shown));

test.each([
  ['', ''],
  ['no headers at all', ''],
  ['Subject: x\r\n\r\nplain', 'plain'],
  ['Content-Type: multipart/mixed; boundary="b"\r\n\r\n--b\r\n\r\nfirst\r\n--b--\r\n', 'first'],
  ['Content-Type: multipart/mixed; boundary=b\r\n\r\nno part', ''],
  ['Content-Type: text/plain; charset=nobody-knows\r\n\r\nplain', 'plain'],
])('%j is read without a fall', (raw, text) => expect(readMail(Buffer.from(raw)).text).toBe(text));
