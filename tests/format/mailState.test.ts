import { mailStateWords } from '@/format/mailState';

const AT = '2026-12-03T14:02:00Z';
const NONE = { attempts: 0, doneAt: null, nextTryAt: AT, reason: null };

test.each([
  [{ ...NONE, state: 'queued' }, 'queued'],
  [{ ...NONE, state: 'queued', reason: 'No mail server is configured' }, 'queued: No mail server is configured'],
  [
    { ...NONE, state: 'queued', attempts: 1, reason: '451 come back' },
    'queued, tried once, next try 3 Dec 2026, 14:02: 451 come back',
  ],
  [
    { ...NONE, state: 'queued', attempts: 3, reason: 'ECONNREFUSED' },
    'queued, tried 3 times, next try 3 Dec 2026, 14:02: ECONNREFUSED',
  ],
  [{ ...NONE, state: 'sending', attempts: 1, nextTryAt: null }, 'sending'],
  [{ ...NONE, state: 'sending', attempts: 3, nextTryAt: null }, 'sending, tried 2 times before'],
  [{ ...NONE, state: 'sent', attempts: 1, doneAt: AT, nextTryAt: null }, 'sent 3 Dec 2026, 14:02'],
  [
    { ...NONE, state: 'refused', attempts: 1, doneAt: AT, nextTryAt: null, reason: '550 no such mailbox' },
    'refused 3 Dec 2026, 14:02: 550 no such mailbox',
  ],
] as const)('%j is told as: %s', (stands, words) => expect(mailStateWords(stands, 'Europe/London')).toBe(words));
