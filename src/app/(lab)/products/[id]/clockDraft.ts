import { parseFrequency } from '@/components/charts/parseFrequency';
import { formatBandwidth } from '@/format/frequencies';
import { formatTrimmed } from '@/format/quantities';
import type { ClockKind, ClockView } from '@/schemas/clock';

/** A declared clock as somebody types it. */
export interface ClockDraft {
  name: string;
  kind: ClockKind;
  frequency: string;
  tolerancePpm: string;
  /** Percent; empty where it is not spread. */
  spreadPct: string;
  spreadKind: 'down' | 'centre';
  note: string;
}

/** A crystal's usual tolerance over temperature and age; common practice. */
export const NEW_CLOCK: ClockDraft = {
  name: '',
  kind: 'clock',
  frequency: '',
  tolerancePpm: '100',
  spreadPct: '',
  spreadKind: 'down',
  note: '',
};

/** What stands in the form when a declared clock is corrected; no digit of its frequency is lost. */
export function draftOf({ name, kind, frequencyHz, tolerancePpm, spread, note }: ClockView): ClockDraft {
  return {
    name,
    kind,
    frequency:
      parseFrequency(clockFrequency(frequencyHz)) === frequencyHz
        ? clockFrequency(frequencyHz)
        : `${frequencyHz / 1e6} MHz`,
    tolerancePpm: String(tolerancePpm),
    spreadPct: spread ? String(spread.pct) : '',
    spreadKind: spread?.kind ?? 'down',
    note,
  };
}

function numberIn(text: string): number | null {
  const value = Number(text.trim().replace(',', '.'));
  return text.trim() !== '' && Number.isFinite(value) ? value : null;
}

export type ClockErrors = Partial<Record<keyof ClockDraft, string>>;

/** The body to send, or what is wrong at which field. */
export function clockBody(draft: ClockDraft) {
  const errors: ClockErrors = {};
  const frequencyHz = parseFrequency(draft.frequency);
  if (frequencyHz === null) errors.frequency = 'The frequency is a figure with its unit, such as 12 MHz or 65 kHz.';
  const tolerancePpm = numberIn(draft.tolerancePpm);
  if (tolerancePpm === null) errors.tolerancePpm = 'The tolerance is a figure in ppm.';
  const pct = numberIn(draft.spreadPct);
  if (pct === null && draft.spreadPct.trim() !== '') errors.spreadPct = 'The spread is a figure in percent, or empty.';
  if (Object.keys(errors).length > 0) return { errors };
  const { name, kind, note, spreadKind } = draft;
  const spread = pct === null ? null : { kind: spreadKind, pct };
  return { body: { name, kind, frequencyHz: frequencyHz!, tolerancePpm: tolerancePpm!, spread, note } };
}

export const KIND_WORDS: Record<ClockKind, string> = { clock: 'clock', converter: 'converter' };

/** `100 ppm`, `1 %` from 0.1 % on. */
export function toleranceText({ tolerancePpm, spread }: Pick<ClockView, 'tolerancePpm' | 'spread'>): string {
  const own =
    tolerancePpm >= 1000 ? `${formatTrimmed(tolerancePpm / 1e4, 2)} %` : `${formatTrimmed(tolerancePpm, 1)} ppm`;
  if (!spread) return `±${own}`;
  const side = spread.kind === 'down' ? 'down' : 'about the centre';
  return `±${own}, spread ${formatTrimmed(spread.pct, 2)} % ${side}`;
}

/** `12 MHz`; digits beyond the third are kept. */
export function clockFrequency(frequencyHz: number): string {
  const short = parseFrequency(formatBandwidth(frequencyHz));
  return short === frequencyHz ? formatBandwidth(frequencyHz) : `${formatTrimmed(frequencyHz / 1e6, 6)} MHz`;
}
