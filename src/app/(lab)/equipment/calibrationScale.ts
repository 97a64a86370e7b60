import { daysBetween } from '@/format/dates';

/** The stretch of days a strip shows: some months back, more ahead, whole months. */
export interface StripScale {
  fromDay: string;
  toDay: string;
  today: string;
  /** Every fourth month; without a label where it would run into today's flag or over the end. */
  ticks: { percent: number; label: string | null }[];
}

const MONTHS_BACK = 8;
const MONTHS_AHEAD = 14;
const NAMES = 'Jan Feb Mar Apr May Jun Jul Aug Sep Oct Nov Dec'.split(' ');
/** Of a strip as the sheet shows it at 1280 px and more. */
const PERCENT_PER_LETTER = 2.6;
const FLAG_HALF_PERCENT = 8;

/** First day of the month `months` after the one that holds `day`. */
function monthStart(day: string, months: number): string {
  const [year, month] = day.split('-').map(Number) as [number, number];
  return new Date(Date.UTC(year, month - 1 + months, 1)).toISOString().slice(0, 10);
}

/** Around the lab's own day `2026-11-17`: labels at January, May and September, with the year where it is a new one. */
export function stripScale(today: string): StripScale {
  const scale: StripScale = {
    fromDay: monthStart(today, -MONTHS_BACK),
    toDay: monthStart(today, MONTHS_AHEAD),
    today,
    ticks: [],
  };
  const todayPercent = percentOf(today, scale);
  let yearShown = 0;
  let lastEnd = -Infinity;
  for (let months = -MONTHS_BACK; months < MONTHS_AHEAD; months++) {
    const day = monthStart(today, months);
    const [year, month] = day.split('-').map(Number) as [number, number];
    if ((month - 1) % 4 !== 0) continue;
    const percent = percentOf(day, scale);
    const short = NAMES[month - 1]!;
    const fits = (label: string) => {
      const end = percent + label.length * PERCENT_PER_LETTER;
      const clear = end < todayPercent - FLAG_HALF_PERCENT || percent > todayPercent + FLAG_HALF_PERCENT;
      return clear && percent > lastEnd && end <= 100;
    };
    const wanted = year === yearShown ? [short] : [`${short} ${year}`, short];
    const label = wanted.find(fits) ?? null;
    if (label) lastEnd = percent + label.length * PERCENT_PER_LETTER;
    if (label && label !== short) yearShown = year;
    scale.ticks.push({ percent, label });
  }
  return scale;
}

/** Where a day lies, 0 at the left end and 100 at the right; outside the stretch it is below 0 or above 100. */
export function percentOf(day: string, { fromDay, toDay }: Pick<StripScale, 'fromDay' | 'toDay'>): number {
  return (daysBetween(fromDay, day) / daysBetween(fromDay, toDay)) * 100;
}
