import type { z } from 'zod';
import type { dueState } from '@/schemas/sweep';

export type Due = z.infer<typeof dueState>;
const SOON_DAYS = 30;

/** Whole days from `from` to `to`, both calendar days. */
export function daysBetween(from: string, to: string): number {
  return Math.round((Date.parse(`${to}T00:00:00Z`) - Date.parse(`${from}T00:00:00Z`)) / 86_400_000);
}

/** How a calibration stands on a day: it covers its due day; without a due date it stays in date. */
export function dueOnDay(calibration: { calibratedOn: string; dueOn: string | null } | null, day: string): Due {
  if (!calibration) return 'not-calibrated';
  if (!calibration.dueOn) return 'in-date';
  const left = daysBetween(day, calibration.dueOn);
  if (left < 0) return 'lapsed';
  return left <= SOON_DAYS ? 'due-soon' : 'in-date';
}
