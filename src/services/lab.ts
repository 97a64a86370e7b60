import { Setting } from '@/models/setting';
import { unitOfWork } from '@/models/unitOfWork';

export interface LabSettings {
  name: string;
  /** IANA zone in which due dates and days are judged. */
  zone: string;
  jobPrefix: string;
}

const DEFAULTS: LabSettings = { name: 'EMC bench', zone: 'UTC', jobPrefix: 'J' };

/** The lab's own settings; call inside a unit of work. */
export async function labSettings(): Promise<LabSettings> {
  const row = await Setting.findOne({ where: { name: 'lab' } });
  return { ...DEFAULTS, ...((row?.value as Partial<LabSettings> | undefined) ?? {}) };
}

/** The calendar day (`2026-12-01`) of an instant in a zone. */
export function dayIn(zone: string, at: Date): string {
  return new Intl.DateTimeFormat('en-CA', { timeZone: zone, year: 'numeric', month: '2-digit', day: '2-digit' }).format(
    at,
  );
}

/** The lab's zone, for a page that shows times. */
export function labZone(): Promise<string> {
  return unitOfWork(async () => (await labSettings()).zone);
}
