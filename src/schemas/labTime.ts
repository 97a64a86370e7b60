/**
 * Wall times of the lab's zone and the instants behind them, for forms, pages and services alike: bookings are typed and
 * shown in the lab's zone and stored in UTC. Summer time is whatever the zone's own rules say (IANA, through Intl).
 */

export const QUARTER_MS = 15 * 60_000;
const DAY_MS = 86_400_000;

export interface WallTime {
  /** `2026-12-01` */
  day: string;
  /** `13:00` */
  time: string;
}

const clocks = new Map<string, Intl.DateTimeFormat>();

/** @throws RangeError for an unknown zone */
function clock(zone: string): Intl.DateTimeFormat {
  let known = clocks.get(zone);
  if (!known) {
    known = new Intl.DateTimeFormat('en-CA', {
      timeZone: zone,
      calendar: 'gregory',
      numberingSystem: 'latn',
      hourCycle: 'h23',
      year: 'numeric',
      month: '2-digit',
      day: '2-digit',
      hour: '2-digit',
      minute: '2-digit',
    });
    clocks.set(zone, known);
  }
  return known;
}

/** What the wall of a zone shows at an instant. @throws RangeError when it is no instant */
export function wallOf(instant: Date | string, zone: string): WallTime {
  const at = instant instanceof Date ? instant : new Date(instant);
  const part: Record<string, string> = {};
  for (const { type, value } of clock(zone).formatToParts(at)) part[type] = value;
  return { day: `${part.year}-${part.month}-${part.day}`, time: `${part.hour}:${part.minute}` };
}

/** A wall time as if it were UTC, in milliseconds: the difference of two is what a reader of the wall counts. */
export function wallMs({ day, time }: WallTime): number {
  const at = Date.parse(`${day}T${time}:00Z`);
  if (Number.isNaN(at)) throw new RangeError(`${day} ${time} is no wall time`);
  return at;
}

/**
 * The instants at which the wall shows a time: one on most days, two in the hour that comes twice when summer time ends
 * (the earlier first), none in the hour that is left out when it begins.
 */
export function instantsAt(wall: WallTime, zone: string): Date[] {
  const asUtc = wallMs(wall);
  const offsetAt = (ms: number) => wallMs(wallOf(new Date(ms), zone)) - Math.floor(ms / 60_000) * 60_000;
  const offsets = new Set([offsetAt(asUtc - DAY_MS), offsetAt(asUtc + DAY_MS)]);
  return [...offsets]
    .map((offset) => asUtc - offset)
    .filter((ms) => wallMs(wallOf(new Date(ms), zone)) === asUtc)
    .sort((a, b) => a - b)
    .map((ms) => new Date(ms));
}

/** Another calendar day. @throws RangeError when it is no day */
export function addDays(day: string, days: number): string {
  return new Date(wallMs({ day, time: '00:00' }) + days * DAY_MS).toISOString().slice(0, 10);
}

/** The first instant of a calendar day in a zone and of the next: 23, 24 or 25 hours apart. */
export function dayBounds(day: string, zone: string): { from: Date; to: Date } {
  return { from: firstInstant(day, zone), to: firstInstant(addDays(day, 1), zone) };
}

/** Summer time may begin at midnight: then the day begins with the first quarter that there is. */
function firstInstant(day: string, zone: string): Date {
  for (let quarter = 0; quarter < 96; quarter++) {
    const time = new Date(quarter * QUARTER_MS).toISOString().slice(11, 16);
    const [first] = instantsAt({ day, time }, zone);
    if (first) return first;
  }
  throw new RangeError(`${day} does not exist in ${zone}`);
}

/** Every UTC day that a span shares an instant with, its end not included. Overlapping spans have one in common. */
export function utcDays(startsAt: Date, endsAt: Date): string[] {
  const days: string[] = [];
  for (let at = Math.floor(startsAt.getTime() / DAY_MS) * DAY_MS; at < endsAt.getTime(); at += DAY_MS) {
    days.push(new Date(at).toISOString().slice(0, 10));
  }
  return days;
}
