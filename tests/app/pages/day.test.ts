import { CAPABILITY_WORDS, cautionsFor } from '@/app/(lab)/day/cautions';
import { dayFinding, opensWith, spanWords, standings, untilWords } from '@/app/(lab)/day/dayWords';
import { laneScale, percentAt } from '@/app/(lab)/day/laneScale';
import { instantOf, typedOf, withStart } from '@/app/(lab)/day/typedSpan';
import { DAY_WRITES } from '@/app/(lab)/day/writes';
import { mailWords } from '@/app/(lab)/samples/[id]/mailWords';
import { CUSTODY_WRITES } from '@/app/(lab)/custody/writes';
import { RESULT_MAIL_WRITES } from '@/app/(lab)/samples/[id]/SendResult';
import { findingText } from '@/format/finding';
import { CAPABILITIES } from '@/schemas/booking';
import type { DayBooking, DayView } from '@/schemas/day';
import { dayBounds } from '@/schemas/labTime';
import { OPERATIONS } from '@/schemas/operations';

const LONDON = 'Europe/London';
const ref = (name: string) => ({ id: name.padEnd(16, '0'), name });

function booking(id: string, startsAt: string, endsAt: string, more: Partial<DayBooking> = {}): DayBooking {
  return {
    id,
    version: 1,
    position: { ...ref('a'), code: 'A', name: '3 m chamber' },
    technician: ref('mira'),
    sample: { id: 's', code: 'S-050', serial: '1' },
    state: { id: 't', label: 'M0', description: 'as received', planned: false },
    product: { ...ref('p'), code: 'TP-9' },
    organisation: ref('Tidewater Pumps'),
    job: { id: 'j', number: 'HL-2614' },
    work: 'radiated prescan',
    startsAt,
    endsAt,
    cancelled: null,
    own: false,
    verdict: null,
    runs: 0,
    openRetests: 0,
    clashes: [],
    place: null,
    ...more,
  };
}
function day(bookings: DayBooking[], date = '2026-12-01', today = '2026-12-01'): DayView {
  const { from, to } = dayBounds(date, LONDON);
  const span = { from: from.toISOString(), to: to.toISOString() };
  return { day: date, zone: LONDON, now: '', today, before: '', after: '', ...span, positions: [], bookings };
}
const at = (time: string) => Date.parse(`2026-12-01T${time}:00Z`);
const morning = booking('1', '2026-12-01T09:00:00Z', '2026-12-01T10:30:00Z');
const noon = booking('2', '2026-12-01T13:00:00Z', '2026-12-01T15:30:00Z');
const own = booking('3', '2026-12-01T14:00:00Z', '2026-12-01T15:00:00Z', { own: true });

describe('how a booking stands to now', () => {
  const stand = (time: string, today = true) => [...standings([morning, noon, own], at(time), today).values()];
  test.each([
    ['08:00', ['later', 'later', 'next']],
    ['09:00', ['now', 'later', 'next']],
    ['10:30', ['done', 'later', 'next']],
    ['14:15', ['done', 'now', 'now']],
    ['15:00', ['done', 'now', 'done']],
    ['16:00', ['done', 'done', 'done']],
  ])('at %s, the reader’s own is next before anybody’s', (time, stands) => expect(stand(time)).toEqual(stands));
  test('a day that is not today has nothing next', () =>
    expect(stand('08:00', false)).toEqual(['later', 'later', 'later']));
  test('the sheet opens with what is the reader’s own now, else what is next, else what runs', () => {
    const opened = (time: string) =>
      opensWith([morning, noon, own], standings([morning, noon, own], at(time), true))?.id;
    expect([opened('08:00'), opened('14:15'), opened('15:10'), opened('17:00')]).toEqual(['3', '3', '2', '1']);
    expect(opensWith([], new Map())).toBeNull();
  });
});

describe('the sentence of the day', () => {
  const said = (view: DayView, time: string) =>
    findingText(dayFinding(view, at(time), standings(view.bookings, at(time), view.day === view.today)).runs);
  test.each([
    ['nothing', day([]), '12:10', 'Nothing is booked today.'],
    ['next', day([noon]), '12:10', 'Next is TP-9 M0 at position A, 3 m chamber, at 13:00, in 50 min.'],
    [
      'a booking that does not hold any more',
      day([{ ...noon, clashes: ['Job HL-2614 is closed.'] }]),
      '12:10',
      'Next is TP-9 M0 at position A, 3 m chamber, at 13:00, in 50 min. One cannot go on as booked.',
    ],
    [
      'now and next for the reader',
      day([noon, own]),
      '13:10',
      'Now TP-9 M0 at position A, 3 m chamber, until 15:30. Next for you is TP-9 M0 at position A, 3 m chamber, at 14:00, in 50 min.',
    ],
    ['done', day([morning]), '12:00', 'One booking today; it is done.'],
    [
      'verdicts of the day',
      day([
        { ...morning, verdict: 'inconclusive', runs: 2 },
        { ...noon, verdict: 'under', runs: 1 },
      ]),
      '16:00',
      'Two bookings today; all are done. Of the day’s verdicts one is inconclusive.',
    ],
    ['another day', day([], '2026-12-02'), '12:00', 'Nothing is booked on Wednesday 2 December.'],
    [
      'another day with bookings',
      day([booking('9', '2026-12-02T09:00:00Z', '2026-12-02T10:00:00Z', { own: true }), noon], '2026-12-02'),
      '12:00',
      'Two bookings, one of them yours; the first is TP-9 M0 at position A, 3 m chamber, at 09:00.',
    ],
  ])('%s', (_what, view, time, sentence) => expect(said(view, time)).toBe(sentence));
  test('spans of several days say which, and waiting is said in hours', () => {
    expect(spanWords(noon, '2026-12-01', LONDON)).toBe('13:00 to 15:30');
    expect(spanWords({ startsAt: '2026-11-30T22:00:00Z', endsAt: '2026-12-01T02:00:00Z' }, '2026-12-01', LONDON)).toBe(
      '30 Nov, 22:00 to 02:00',
    );
    expect([untilWords(50 * 60_000), untilWords(130 * 60_000), untilWords(-5)]).toEqual(['50 min', '2 h 10', '0 min']);
  });
});

describe('the hours that are drawn', () => {
  const labels = (view: DayView) => laneScale(view).hours.map(({ label }) => label);
  test('are 8 to 18, or as far as something is booked', () => {
    expect(labels(day([noon]))).toEqual(['08', '09', '10', '11', '12', '13', '14', '15', '16', '17', '18']);
    const late = booking('4', '2026-12-01T06:30:00Z', '2026-12-01T18:15:00Z');
    expect(labels(day([late])).filter(Boolean)).toEqual(['06', '08', '10', '12', '14', '16', '18']);
    const scale = laneScale(day([late]));
    expect([new Date(scale.fromMs).toISOString(), new Date(scale.toMs).toISOString()]).toEqual([
      '2026-12-01T06:00:00.000Z',
      '2026-12-01T19:00:00.000Z',
    ]);
  });
  test('a booking that crosses midnight is drawn to the edge of the day', () => {
    const night = booking('5', '2026-12-01T20:00:00Z', '2026-12-02T04:00:00Z');
    const scale = laneScale(day([night]));
    expect(new Date(scale.toMs).toISOString()).toBe('2026-12-02T00:00:00.000Z');
    expect(percentAt(night.endsAt, scale)).toBe(100);
  });
  // The Summer Time Order 2002, SI 2002/262 (from memory): 01:00 UTC on 29 March and 25 October 2026.
  test.each([
    ['2026-03-29', 23, ['00', '02', '03']],
    ['2026-10-25', 25, ['00', '01', '01']],
  ])('on %s %i hours are drawn, each as long as the others', (date, hours, first) => {
    const { from, to } = dayBounds(date, LONDON);
    const whole = booking('6', from.toISOString(), to.toISOString());
    const { hours: marks } = laneScale(day([whole], date, date));
    expect(marks.length).toBe(hours + 1);
    const steps = marks.slice(1).map(({ percent }, i) => percent - marks[i]!.percent);
    for (const step of steps) expect(step).toBeCloseTo(100 / hours, 9);
    const { hours: narrow } = laneScale({
      ...day([whole], date, date),
      to: new Date(from.getTime() + 3 * 3_600_000).toISOString(),
    });
    expect(narrow.slice(0, 3).map(({ label }) => label)).toEqual(first);
  });
});

describe('times as they are typed', () => {
  const typed = (date: string, time: string, second = false) => ({ day: date, time, second });
  test('the hour that is left out is refused with a way on, the one that comes twice asks which', () => {
    expect(instantOf(typed('2026-03-29', '01:30'), LONDON)).toEqual({
      instant: null,
      problem: '01:30 is left out that night: the clocks go forward. Choose the hour after it.',
      twice: false,
    });
    expect(instantOf(typed('2026-10-25', '01:30'), LONDON)).toMatchObject({
      instant: '2026-10-25T00:30:00.000Z',
      twice: true,
    });
    expect(instantOf(typed('2026-10-25', '01:30', true), LONDON).instant).toBe('2026-10-25T01:30:00.000Z');
    expect(instantOf(typed('', '01:30'), LONDON).instant).toBeNull();
  });
  test('an instant is typed back to itself, in the second of the two hours too', () => {
    for (const instant of ['2026-10-25T00:30:00.000Z', '2026-10-25T01:30:00.000Z', '2026-07-01T08:15:00.000Z']) {
      expect(instantOf(typedOf(instant, LONDON), LONDON).instant).toBe(instant);
    }
  });
  test('a new start takes the end along, over midnight too', () => {
    const span = { start: typed('2026-12-01', '22:00'), end: typed('2026-12-02', '01:00') };
    expect(withStart(span, typed('2026-12-03', '23:30')).end).toEqual(typed('2026-12-04', '02:30'));
  });
});

test('mains, the chamber and RF fields carry their caution, which defers to local rules; every word has one in plain English', () => {
  expect(cautionsFor(['radiated', 'mains-network', 'shielded-room', 'rf-field']).map(({ title }) => title)).toEqual([
    'Mains and protective earth',
    'Chamber door',
    'RF fields',
  ]);
  expect(cautionsFor(['conducted'])).toEqual([]);
  expect(Object.keys(CAPABILITY_WORDS).sort()).toEqual([...CAPABILITIES].sort());
});

test('what became of an e-mail is said with its time, or in the mail server’s words', () => {
  const mail = { state: 'sent' as const, attempts: 1, doneAt: '2026-12-01T14:02:00Z', nextTryAt: null, reason: null };
  const words = (more: object) => mailWords({ ...mail, ...more }, LONDON, new Date('2026-12-01T18:00:00Z'));
  expect([
    words({}),
    words({ doneAt: '2026-11-26T15:40:00Z' }),
    words({ state: 'refused', reason: '550 5.1.1 no such mailbox' }),
    words({ state: 'queued', doneAt: null, attempts: 0 }),
    words({ state: 'queued', doneAt: null, attempts: 2, reason: 'no answer' }),
    words({ state: 'sending', doneAt: null }),
    mailWords(null, LONDON),
  ]).toEqual([
    'sent 14:02',
    'sent 26 Nov 2026, 15:40',
    'refused: 550 5.1.1 no such mailbox',
    'queued',
    'queued, tried 2 times: no answer',
    'sending',
    'no longer known',
  ]);
});

test('the forms of the day sheet and of the result e-mail send what the API declares', () => {
  for (const [id, write] of Object.entries({ ...DAY_WRITES, ...CUSTODY_WRITES, ...RESULT_MAIL_WRITES })) {
    expect(OPERATIONS.find((op) => op.id === id)).toMatchObject(write);
  }
});
