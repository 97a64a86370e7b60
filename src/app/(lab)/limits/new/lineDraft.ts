import type { LineDetector, LineUnit } from '@/schemas/common';
import type { LimitLinePreview, LimitLineSummary } from '@/schemas/tables';

export interface LineUploadFor {
  /** The line that is revised, by its newest revision; null for a new one. */
  revises: string | null;
  lines: readonly LimitLineSummary[];
  zone: string;
}

/** What a person says of a line; numbers stay as typed until they are sent. */
export interface LineDraft {
  name: string;
  document: string;
  class: string;
  port: string;
  detector: LineDetector | '';
  bandwidthKhz: string;
  distanceM: string;
  source: string;
  basis: string;
  reason: string;
}

export const BASES = ['verified', 'from memory', 'common practice', 'computed', 'as the client states'] as const;
export const PORTS_OF_LINES = ['enclosure', 'AC mains', 'wired network', 'DC supply', 'antenna'] as const;

/** From the revision before, else from what the file states of itself; a new figure needs a new source, so that one stays empty. */
export function lineDraftFrom(before: LimitLineSummary | null, stated: LimitLinePreview['stated']): LineDraft {
  const bandwidthHz = before?.bandwidthHz ?? stated.bandwidthHz;
  const distanceM = before ? before.distanceM : stated.distanceM;
  return {
    name: before?.name ?? stated.name ?? '',
    document: stated.document ?? before?.document ?? '',
    class: before?.class ?? stated.class ?? '',
    port: before?.port ?? stated.port ?? '',
    detector: before?.detector ?? stated.detector ?? '',
    bandwidthKhz: bandwidthHz === null ? '' : String(bandwidthHz / 1e3),
    distanceM: distanceM === null ? '' : String(distanceM),
    source: stated.source ?? before?.source ?? '',
    basis: stated.basis ?? '',
    reason: '',
  };
}

export const typed = (text: string): number | null => {
  const value = Number(text.trim().replace(',', '.'));
  return text.trim() !== '' && Number.isFinite(value) ? value : null;
};

const NEEDED: [keyof LineDraft, string][] = [
  ['name', 'the name'],
  ['document', 'the document'],
  ['class', 'the class'],
  ['port', 'the port'],
  ['detector', 'the detector'],
  ['source', 'the source'],
  ['basis', 'how sure it is'],
  ['reason', 'the reason'],
];

export function missingOfLine(draft: LineDraft, unit: LineUnit | null): string[] {
  const empty = NEEDED.filter(([field]) => draft[field].trim() === '').map(([, word]) => word);
  const field = unit === 'dBuV/m' || unit === 'dBuA/m';
  return [
    ...empty,
    ...((typed(draft.bandwidthKhz) ?? 0) <= 0 ? ['the bandwidth'] : []),
    ...(field && typed(draft.distanceM) === null ? ['the distance'] : []),
  ];
}

/** As the operation takes it. */
export function lineBody(draft: LineDraft) {
  const { bandwidthKhz, distanceM, ...words } = draft;
  // By way of decimals: 0.2 kHz is 200 Hz, not the product of two binary fractions.
  const bandwidthHz = Number((typed(bandwidthKhz)! * 1e3).toPrecision(12));
  return { ...words, bandwidthHz, distanceM: typed(distanceM) };
}
