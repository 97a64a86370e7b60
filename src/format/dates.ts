/** Days and times for readers: `17 Nov 2026`, `10:42`. The server's own language and zone never show through. */

const MONTHS = 'January February March April May June July August September October November December'.split(' ');
const WEEKDAYS = 'Sunday Monday Tuesday Wednesday Thursday Friday Saturday'.split(' ');

interface CalendarParts {
  year: number;
  month: number;
  day: number;
  hour: number;
  minute: number;
}

const clocks = new Map<string, Intl.DateTimeFormat>();

/** @throws RangeError for an unknown zone */
function clock(zone: string): Intl.DateTimeFormat {
  let known = clocks.get(zone);
  if (!known) {
    known = new Intl.DateTimeFormat('en-GB', {
      timeZone: zone,
      calendar: 'gregory',
      numberingSystem: 'latn',
      hourCycle: 'h23',
      year: 'numeric',
      month: 'numeric',
      day: 'numeric',
      hour: 'numeric',
      minute: 'numeric',
    });
    clocks.set(zone, known);
  }
  return known;
}

/** What the wall of that zone shows at an instant. @throws RangeError when it is no instant */
function partsIn(instant: string | Date, zone: string): CalendarParts {
  const at = instant instanceof Date ? instant : new Date(instant);
  if (Number.isNaN(at.getTime())) throw new RangeError(`${String(instant)} is no instant`);
  const found: Record<string, number> = {};
  for (const part of clock(zone).formatToParts(at)) found[part.type] = Number(part.value);
  const { year, month, day, hour, minute } = found as unknown as CalendarParts;
  return { year, month, day, hour, minute };
}

/** @throws RangeError when it is no calendar day `YYYY-MM-DD` */
function partsOfDay(isoDay: string): CalendarParts & { weekday: number } {
  const match = /^(\d{4})-(\d{2})-(\d{2})$/.exec(isoDay);
  const at = new Date(`${isoDay}T00:00:00Z`);
  if (!match || Number.isNaN(at.getTime()) || at.toISOString().slice(0, 10) !== isoDay)
    throw new RangeError(`${isoDay} is no day`);
  return {
    year: at.getUTCFullYear(),
    month: at.getUTCMonth() + 1,
    day: at.getUTCDate(),
    hour: 0,
    minute: 0,
    weekday: at.getUTCDay(),
  };
}

const two = (value: number) => String(value).padStart(2, '0');
const monthName = (month: number) => MONTHS[month - 1] ?? '';
const shortDay = (parts: CalendarParts) => `${parts.day} ${monthName(parts.month).slice(0, 3)}`;

/** The calendar day of an instant in a zone, as `2026-11-17`: what due dates are compared with. */
export function dayOf(instant: string | Date, zone: string): string {
  const { year, month, day } = partsIn(instant, zone);
  return `${String(year).padStart(4, '0')}-${two(month)}-${two(day)}`;
}

/** A calendar day `2026-11-17`, or an instant with its zone: `17 Nov 2026`. */
export function formatDay(day: string): string;
export function formatDay(instant: string | Date, zone: string): string;
export function formatDay(when: string | Date, zone?: string): string {
  const parts = zone === undefined ? partsOfDay(String(when)) : partsIn(when, zone);
  return `${shortDay(parts)} ${parts.year}`;
}

/** Without the year, where the year is plain: `17 Nov`. */
export function formatShortDay(day: string): string {
  return shortDay(partsOfDay(day));
}

/** The head of a day sheet: `Tuesday 17 November`. */
export function formatWeekday(day: string): string {
  const parts = partsOfDay(day);
  return `${WEEKDAYS[parts.weekday] ?? ''} ${parts.day} ${monthName(parts.month)}`;
}

/** 24 h: `10:42`. */
export function formatTime(instant: string | Date, zone: string): string {
  const { hour, minute } = partsIn(instant, zone);
  return `${two(hour)}:${two(minute)}`;
}

/** `17 Nov 2026, 10:42`. */
export function formatDayTime(instant: string | Date, zone: string): string {
  return `${formatDay(instant, zone)}, ${formatTime(instant, zone)}`;
}

/** Whole days from one calendar day to another; negative when it has gone by. */
export function daysBetween(fromDay: string, toDay: string): number {
  partsOfDay(fromDay);
  partsOfDay(toDay);
  return Math.round((Date.parse(`${toDay}T00:00:00Z`) - Date.parse(`${fromDay}T00:00:00Z`)) / 86_400_000);
}

/** How a due date stands to today: `due in 9 days`, `due today`, `lapsed 46 days`. */
export function formatDue(dueDay: string, today: string): string {
  const days = daysBetween(today, dueDay);
  if (days === 0) return 'due today';
  const count = Math.abs(days) === 1 ? '1 day' : `${Math.abs(days)} days`;
  return days > 0 ? `due in ${count}` : `lapsed ${count}`;
}
