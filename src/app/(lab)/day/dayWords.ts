import type { Verdict } from '@/app/(lab)/samples/worstRun';
import { formatTime, formatWeekday, formatShortDay, dayOf } from '@/format/dates';
import type { FindingRun } from '@/format/finding';
import { capitalised, countInWords } from '@/format/words';
import type { DayBooking, DayView } from '@/schemas/day';

/** How a booking stands to now: `next` is the first to come, a technician's own before anybody's. */
export type Standing = 'done' | 'now' | 'next' | 'later';
type Timed = Pick<DayBooking, 'id' | 'startsAt' | 'endsAt' | 'own'>;

/** @param nowMs on the day itself; a day that is not today has nothing next on it */
export function standings(bookings: readonly Timed[], nowMs: number, today: boolean): Map<string, Standing> {
  const coming = bookings.filter(({ startsAt }) => Date.parse(startsAt) > nowMs);
  const next = today ? (coming.find(({ own }) => own) ?? coming[0]) : undefined;
  return new Map(
    bookings.map((booking) => {
      if (Date.parse(booking.endsAt) <= nowMs) return [booking.id, 'done'];
      if (Date.parse(booking.startsAt) <= nowMs) return [booking.id, 'now'];
      return [booking.id, booking === next ? 'next' : 'later'];
    }),
  );
}

/** The booking a sheet opens with: what runs now (the reader's own first), else what is next, else the first. */
export function opensWith(bookings: readonly DayBooking[], stands: Map<string, Standing>): DayBooking | null {
  const running = bookings.filter(({ id }) => stands.get(id) === 'now');
  return (
    running.find(({ own }) => own) ??
    bookings.find(({ id }) => stands.get(id) === 'next') ??
    running[0] ??
    bookings[0] ??
    null
  );
}

/** `13:00 to 15:30`; what begins or ends on another day says which. */
export function spanWords({ startsAt, endsAt }: Pick<Timed, 'startsAt' | 'endsAt'>, day: string, zone: string): string {
  const at = (instant: string) => {
    const own = dayOf(instant, zone);
    return own === day ? formatTime(instant, zone) : `${formatShortDay(own)}, ${formatTime(instant, zone)}`;
  };
  return `${at(startsAt)} to ${at(endsAt)}`;
}

const plain = (text: string): FindingRun => ({ text });
const figure = (text: string, strong = false): FindingRun => ({ text, figure: true, strong });

/** `in 50 min`, `in 2 h 10`. */
export function untilWords(ms: number): string {
  const minutes = Math.max(0, Math.round(ms / 60_000));
  if (minutes < 60) return `${minutes} min`;
  return `${Math.floor(minutes / 60)} h ${String(minutes % 60).padStart(2, '0')}`;
}

/** What the day opens with: what runs, what is next, how many there are, and which verdicts of the day still wait. */
export function dayFinding(
  view: DayView,
  nowMs: number,
  stands: Map<string, Standing>,
): { verdict: Verdict; runs: FindingRun[] } {
  const { bookings, day, today, zone } = view;
  const judged = bookings.flatMap(({ verdict }) => verdict ?? []);
  const waiting: [Verdict, string, string][] = [
    ['over', 'is over', 'are over'],
    ['needs-final', 'needs a final', 'need a final'],
    ['inconclusive', 'is inconclusive', 'are inconclusive'],
    ['not-covered', 'is not covered', 'are not covered'],
  ];
  const open = waiting.find(([verdict]) => judged.includes(verdict));
  const count = open ? judged.filter((verdict) => verdict === open[0]).length : 0;
  const said = open
    ? [plain(` Of the day’s verdicts ${countInWords(count)} ${count === 1 ? open[1] : open[2]}.`)]
    : judged.length > 0
      ? [plain(' All of the day’s verdicts are under.')]
      : [];
  const verdict = open?.[0] ?? (judged.length > 0 ? 'under' : 'not-covered');
  const clashing = bookings.filter(({ clashes }) => clashes.length > 0).length;
  const clash = clashing > 0 ? [plain(` ${capitalised(countInWords(clashing))} cannot go on as booked.`)] : [];
  return { verdict, runs: [...(day === today ? todays() : another()), ...clash, ...said] };

  function todays(): FindingRun[] {
    if (bookings.length === 0) return [plain('Nothing is booked today.')];
    const running = bookings.filter(({ id }) => stands.get(id) === 'now');
    const now = running.find(({ own }) => own) ?? running[0];
    const next = bookings.find(({ id }) => stands.get(id) === 'next');
    const runs: FindingRun[] = [];
    if (now) {
      runs.push(
        ...what(now, now.own ? 'Yours now is ' : 'Now '),
        plain(' until '),
        figure(formatTime(now.endsAt, zone)),
      );
      runs.push(plain(running.length > 1 ? `, and ${countInWords(running.length - 1)} more beside it.` : '.'));
    }
    if (next) {
      const lead = next.own ? 'Next for you is ' : 'Next is ';
      runs.push(
        ...what(next, `${now ? ' ' : ''}${lead}`),
        plain(' at '),
        figure(formatTime(next.startsAt, zone), true),
      );
      runs.push(plain(`, in ${untilWords(Date.parse(next.startsAt) - nowMs)}.`));
    }
    if (!now && !next) runs.push(plain(`${counted()} today; ${bookings.length === 1 ? 'it is' : 'all are'} done.`));
    return runs;
  }

  function another(): FindingRun[] {
    if (bookings.length === 0) return [plain(`Nothing is booked on ${formatWeekday(day)}.`)];
    const own = bookings.filter((booking) => booking.own).length;
    const yours = own > 0 && own < bookings.length ? `, ${countInWords(own)} of them yours` : '';
    return [
      plain(`${counted()}${yours}; the first is `),
      ...what(bookings[0]!, ''),
      plain(' at '),
      figure(formatTime(bookings[0]!.startsAt, zone)),
      plain('.'),
    ];
  }

  function counted(): string {
    return `${capitalised(countInWords(bookings.length))} ${bookings.length === 1 ? 'booking' : 'bookings'}`;
  }

  function what({ product, state, position }: DayBooking, lead: string): FindingRun[] {
    const named = `${product.code}${state ? ` ${state.label}` : ''}`;
    return [plain(lead), figure(named, true), plain(` at position ${position.code}, ${position.name},`)];
  }
}
