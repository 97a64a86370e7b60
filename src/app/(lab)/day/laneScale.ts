import { QUARTER_MS, wallOf } from '@/schemas/labTime';
import type { DayView } from '@/schemas/day';

/** The stretch of a day that is drawn, and where its hours lie. Instants are milliseconds. */
export interface LaneScale {
  fromMs: number;
  toMs: number;
  /** Whole hours of the lab's wall with their percent; on the days summer time changes one is missing or comes twice. */
  hours: { percent: number; label: string }[];
  quarters: number[];
}

const FIRST_HOUR = '08:00';
const LAST_HOUR = '18:00';
/** More labels would touch each other at the narrowest sheet. */
const MOST_LABELS = 13;

type Drawn = Pick<DayView, 'day' | 'from' | 'to' | 'zone'> & {
  bookings: readonly { startsAt: string; endsAt: string }[];
};

/** 8 to 18 as on the wall, or further where something is booked, from one whole hour to another. */
export function laneScale({ from, to, zone, bookings }: Drawn): LaneScale {
  const [dayFrom, dayTo] = [Date.parse(from), Date.parse(to)];
  const marks = hourMarks(dayFrom, dayTo, zone);
  const wanted = (time: string, otherwise: number) =>
    marks.find((mark) => mark.label === time.slice(0, 2))?.ms ?? otherwise;
  const first = Math.min(wanted(FIRST_HOUR, dayFrom), ...bookings.map(({ startsAt }) => Date.parse(startsAt)));
  const last = Math.max(wanted(LAST_HOUR, dayTo), ...bookings.map(({ endsAt }) => Date.parse(endsAt)));
  const fromMs = Math.max(dayFrom, marks.findLast(({ ms }) => ms <= first)?.ms ?? dayFrom);
  const toMs = Math.min(dayTo, marks.find(({ ms }) => ms >= last)?.ms ?? dayTo);
  const percent = (ms: number) => ((ms - fromMs) / (toMs - fromMs)) * 100;
  const shown = [
    ...marks.filter(({ ms }) => ms >= fromMs && ms <= toMs),
    ...(toMs === dayTo ? [{ ms: dayTo, label: '24' }] : []),
  ];
  const every = Math.ceil(shown.length / MOST_LABELS);
  const quarters: number[] = [];
  for (let ms = fromMs; ms <= toMs; ms += QUARTER_MS) quarters.push(percent(ms));
  return {
    fromMs,
    toMs,
    hours: shown.map(({ ms, label }, i) => ({ percent: percent(ms), label: i % every === 0 ? label : '' })),
    quarters,
  };
}

function hourMarks(dayFrom: number, dayTo: number, zone: string): { ms: number; label: string }[] {
  const marks: { ms: number; label: string }[] = [];
  for (let ms = dayFrom; ms < dayTo; ms += QUARTER_MS) {
    const { time } = wallOf(new Date(ms), zone);
    if (time.endsWith(':00')) marks.push({ ms, label: time.slice(0, 2) });
  }
  return marks;
}

/** Where an instant lies, in percent of what is drawn; outside it the nearer edge. */
export function percentAt(instant: string | number, { fromMs, toMs }: LaneScale): number {
  const ms = typeof instant === 'number' ? instant : Date.parse(instant);
  return Math.min(100, Math.max(0, ((ms - fromMs) / (toMs - fromMs)) * 100));
}
