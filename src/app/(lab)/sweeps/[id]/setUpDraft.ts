import type { SetupRecordView } from '@/schemas/setup';
import { typedNumber } from '../new/typedNumber';

/** What stands in the fields of the form. */
export interface SetUpDraft {
  operatingMode: string;
  supplyKind: '' | 'ac' | 'dc';
  supplyV: string;
  supplyFrequencyHz: string;
  supplySource: string;
  cableLayout: string;
  ancillary: string;
  temperatureC: string;
  humidityPct: string;
  deviations: string;
  eutStayed: '' | 'yes' | 'no' | 'not-watched';
  whatHappened: string;
  reason: string;
}

const typed = (value: number | null) => (value === null ? '' : String(value).replace('-', '\u2212'));

/** A record as it stands in the form; `mode` is what was said when the run was kept. */
export function draftOf(record: SetupRecordView | null, mode: string): SetUpDraft {
  return {
    operatingMode: record ? (record.operatingMode ?? '') : mode,
    supplyKind: record?.supplyKind ?? '',
    supplyV: typed(record?.supplyV ?? null),
    supplyFrequencyHz: typed(record?.supplyFrequencyHz ?? null),
    supplySource: record?.supplySource ?? '',
    cableLayout: record?.cableLayout ?? '',
    ancillary: record?.ancillary ?? '',
    temperatureC: typed(record?.temperatureC ?? null),
    humidityPct: typed(record?.humidityPct ?? null),
    deviations: record?.deviations ?? '',
    eutStayed: record?.eutStayed ?? '',
    whatHappened: record?.whatHappened ?? '',
    reason: '',
  };
}

/** Everything of another run but what has to be seen anew each time: whether the EUT stayed in its mode. */
export function sameAs(last: SetupRecordView, now: SetUpDraft): SetUpDraft {
  return { ...draftOf(last, ''), eutStayed: now.eutStayed, whatHappened: now.whatHappened, reason: now.reason };
}

export type NumberField = 'supplyV' | 'supplyFrequencyHz' | 'temperatureC' | 'humidityPct';
const NUMBERS: readonly NumberField[] = ['supplyV', 'supplyFrequencyHz', 'temperatureC', 'humidityPct'];

/** The body to send, or the figures that are none. */
export function bodyOf(draft: SetUpDraft, corrects: number | null): { body: object } | { wrong: NumberField[] } {
  const dc = draft.supplyKind === 'dc';
  const figures = { ...draft, ...(dc && { supplyFrequencyHz: '' }) };
  const wrong = NUMBERS.filter((name) => figures[name].trim() !== '' && typedNumber(figures[name]) === null);
  if (wrong.length > 0) return { wrong };
  const numbers = Object.fromEntries(NUMBERS.map((name) => [name, typedNumber(figures[name])]));
  return {
    body: {
      ...draft,
      ...numbers,
      supplyKind: draft.supplyKind || null,
      eutStayed: draft.eutStayed || null,
      whatHappened: draft.eutStayed === 'no' ? draft.whatHappened : null,
      reason: corrects === null ? null : draft.reason,
      corrects,
    },
  };
}
