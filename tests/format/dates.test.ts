import {
  dayOf,
  daysBetween,
  formatDay,
  formatDayTime,
  formatDue,
  formatShortDay,
  formatTime,
  formatWeekday,
} from '@/format/dates';

const LONDON = 'Europe/London';

test('a calendar day needs no zone', () => {
  expect(formatDay('2026-11-17')).toBe('17 Nov 2026');
  expect(formatDay('2026-02-01')).toBe('1 Feb 2026');
  expect(formatShortDay('2026-11-03')).toBe('3 Nov');
  expect(formatWeekday('2026-11-17')).toBe('Tuesday 17 November');
});

test('an instant is shown on the wall of the lab', () => {
  expect(formatDayTime('2026-11-17T10:42:09Z', LONDON)).toBe('17 Nov 2026, 10:42');
  expect(formatDayTime('2026-07-01T10:42:00Z', LONDON)).toBe('1 Jul 2026, 11:42');
  expect(formatDayTime(new Date('2026-11-17T23:30:00Z'), 'Europe/Berlin')).toBe('18 Nov 2026, 00:30');
  expect(formatDay('2026-11-17T23:30:00Z', 'Europe/Berlin')).toBe('18 Nov 2026');
  expect(formatTime('2026-11-17T00:05:00Z', LONDON)).toBe('00:05');
});

test('September is Sep, and midnight is 00:00, whatever the locale data say', () => {
  expect(formatDayTime('2026-09-01T00:00:00Z', 'UTC')).toBe('1 Sep 2026, 00:00');
});

test('the hour that runs twice and the hour that does not exist (Europe/London, 2026)', () => {
  expect(formatTime('2026-10-25T00:30:00Z', LONDON)).toBe('01:30');
  expect(formatTime('2026-10-25T01:30:00Z', LONDON)).toBe('01:30');
  expect(formatTime('2026-03-29T01:00:00Z', LONDON)).toBe('02:00');
});

test('the day of an instant, which due dates are compared with', () => {
  expect(dayOf('2026-06-30T23:30:00Z', LONDON)).toBe('2026-07-01');
  expect(dayOf('2026-06-30T23:30:00Z', 'UTC')).toBe('2026-06-30');
});

test('days between calendar days do not feel summer time', () => {
  expect(daysBetween('2026-03-28', '2026-03-30')).toBe(2);
  expect(daysBetween('2026-11-17', '2026-11-08')).toBe(-9);
});

test.each([
  ['2026-11-26', 'due in 9 days'],
  ['2026-11-18', 'due in 1 day'],
  ['2026-11-17', 'due today'],
  ['2026-11-16', 'lapsed 1 day'],
  ['2026-10-02', 'lapsed 46 days'],
])('due %s on 17 Nov 2026 reads %s', (due, text) => expect(formatDue(due, '2026-11-17')).toBe(text));

test.each(['2026-02-30', '17 Nov 2026', '', '2026-11-17T10:00:00Z'])('%p is no day and throws', (day) =>
  expect(() => formatDay(day)).toThrow(RangeError),
);
test('neither an instant nor a zone is guessed', () => {
  expect(() => formatTime('soon', LONDON)).toThrow(RangeError);
  expect(() => formatTime('2026-11-17T10:00:00Z', 'Nowhere/Land')).toThrow(RangeError);
});
