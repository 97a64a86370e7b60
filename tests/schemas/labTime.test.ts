import fc from 'fast-check';
import { addDays, dayBounds, instantsAt, utcDays, wallMs, wallOf } from '@/schemas/labTime';

/* Summer time in the United Kingdom begins on the last Sunday of March and ends on the last Sunday of October, at
 * 01:00 UTC (The Summer Time Order 2002, SI 2002/262; from memory): 2026-03-29 and 2026-10-25. */
const LONDON = 'Europe/London';
const at = (day: string, time: string, zone = LONDON) =>
  instantsAt({ day, time }, zone).map((one) => one.toISOString());

describe('wall times in Europe/London, SI 2002/262', () => {
  test.each([
    ['a winter day', '2026-12-01', '13:00', ['2026-12-01T13:00:00.000Z']],
    ['a summer day', '2026-07-01', '13:00', ['2026-07-01T12:00:00.000Z']],
    ['the last minute before the clocks go forward', '2026-03-29', '00:59', ['2026-03-29T00:59:00.000Z']],
    ['a time that is left out', '2026-03-29', '01:30', []],
    ['the first time after it', '2026-03-29', '02:00', ['2026-03-29T01:00:00.000Z']],
    ['a time that comes twice', '2026-10-25', '01:30', ['2026-10-25T00:30:00.000Z', '2026-10-25T01:30:00.000Z']],
    ['the first time after it', '2026-10-25', '02:00', ['2026-10-25T02:00:00.000Z']],
  ])('%s: %s %s', (_what, day, time, instants) => expect(at(day, time)).toEqual(instants));

  test.each([
    ['2026-03-29', 23, '2026-03-29T00:00:00.000Z'],
    ['2026-10-25', 25, '2026-10-24T23:00:00.000Z'],
    ['2026-12-01', 24, '2026-12-01T00:00:00.000Z'],
  ])('%s has %i hours', (day, hours, begins) => {
    const { from, to } = dayBounds(day, LONDON);
    expect([from.toISOString(), (to.getTime() - from.getTime()) / 3_600_000]).toEqual([begins, hours]);
  });
});

test('a day begins with the first quarter there is where midnight is left out: America/Santiago, 6 September 2026', () => {
  expect(wallOf(dayBounds('2026-09-06', 'America/Santiago').from, 'America/Santiago')).toEqual({
    day: '2026-09-06',
    time: '01:00',
  });
});

test('every instant is among those of its own wall time, in zones east and west, whole and half hours', () => {
  const zones = [
    LONDON,
    'America/New_York',
    'Asia/Kolkata',
    'Asia/Kathmandu',
    'Australia/Lord_Howe',
    'Pacific/Auckland',
  ];
  const minute = fc.integer({ min: Date.UTC(2024, 0, 1) / 60_000, max: Date.UTC(2034, 0, 1) / 60_000 });
  fc.assert(
    fc.property(minute, fc.constantFrom(...zones), (minutes, zone) => {
      const instant = new Date(minutes * 60_000);
      const wall = wallOf(instant, zone);
      expect(instantsAt(wall, zone).map(Number)).toContain(instant.getTime());
      const { from, to } = dayBounds(wall.day, zone);
      expect(from <= instant && instant < to).toBe(true);
    }),
    { numRuns: 400 },
  );
});

test('overlapping spans share a UTC day; an end at midnight does not reach into the next', () => {
  expect(utcDays(new Date('2026-12-01T22:00Z'), new Date('2026-12-02T00:00Z'))).toEqual(['2026-12-01']);
  const quarter = fc.integer({ min: 0, max: 96 * 30 });
  const length = fc.integer({ min: 1, max: 96 * 10 });
  const span = (from: number, quarters: number): [Date, Date] => [
    new Date(Date.UTC(2026, 2, 20) + from * 900_000),
    new Date(Date.UTC(2026, 2, 20) + (from + quarters) * 900_000),
  ];
  fc.assert(
    fc.property(quarter, length, quarter, length, (a, aLong, b, bLong) => {
      const [one, other] = [span(a, aLong), span(b, bLong)];
      if (one[0] >= other[1] || other[0] >= one[1]) return;
      const days = utcDays(...other);
      expect(utcDays(...one).some((day) => days.includes(day))).toBe(true);
    }),
  );
});

test('days are counted on the calendar, and what is no wall time throws', () => {
  expect([addDays('2026-12-31', 1), addDays('2026-03-01', -1)]).toEqual(['2027-01-01', '2026-02-28']);
  expect(() => wallMs({ day: '2026-02-30x', time: '10:00' })).toThrow(RangeError);
});
