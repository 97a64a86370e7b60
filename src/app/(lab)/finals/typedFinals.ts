import { parseFrequency } from '@/components/charts/parseFrequency';
import type { LevelUnit, LineDetector } from '@/schemas/common';
import type { AskedFinal, FinalsBody, FinalsSheetView, TypedFinal } from '@/schemas/finals';

/** What is typed in the cells of one row, as it is typed. */
export interface TypedRow {
  /** Absent as long as it is the frequency asked for. */
  frequency?: string;
  levels: Partial<Record<LineDetector, string>>;
  height: string;
  azimuth: string;
  remark: string;
  /** When a level was typed last. */
  readAt: string | null;
}
export type Typed = Readonly<Record<string, TypedRow>>;

export const NOTHING_TYPED: TypedRow = { levels: {}, height: '', azimuth: '', remark: '', readAt: null };

/** `41,2`, `41.2`, `−3.5`; null for nothing, NaN for what is no figure. */
export function typedFigure(text: string): number | null {
  const bare = text.trim().replace('\u2212', '-').replace(',', '.');
  if (bare === '') return null;
  return /^-?(?:\d+\.?\d*|\.\d+)$/.test(bare) ? Number(bare) : NaN;
}

/** The frequency the receiver was tuned to, to the hertz; null for what is none. */
export function tunedHz(row: TypedRow, asked: Pick<AskedFinal, 'frequencyHz'>): number | null {
  const hz = row.frequency === undefined ? asked.frequencyHz : parseFrequency(row.frequency.replace(/\s/g, ''));
  return hz === null ? null : Math.round(hz);
}

/** Cells by what is wrong in them. */
export type WrongCells = Partial<Record<'frequency' | 'height' | 'azimuth' | LineDetector, string>>;

/** What of a row cannot be sent; an empty cell is never wrong. */
export function wrongIn(row: TypedRow, asked: AskedFinal): WrongCells {
  const wrong: WrongCells = {};
  for (const detector of asked.detectors) {
    const level = typedFigure(row.levels[detector] ?? '');
    if (Number.isNaN(level)) wrong[detector] = 'no figure';
    else if (level !== null && (level < -200 || level > 300)) wrong[detector] = 'no level of a receiver';
  }
  if (tunedHz(row, asked) === null) wrong.frequency = 'no frequency; in MHz, or with its unit';
  const height = typedFigure(row.height);
  if (height !== null && !(height >= 0 && height <= 10)) wrong.height = '0 to 10 m';
  const azimuth = typedFigure(row.azimuth);
  if (azimuth !== null && !(azimuth >= 0 && azimuth <= 360)) wrong.azimuth = '0 to 360°';
  return wrong;
}

/** Whether the row holds a reading; where it was read alone keeps nothing. */
export function isRead(row: TypedRow | undefined): boolean {
  return Object.values(row?.levels ?? {}).some((text) => text.trim() !== '');
}

/** Whether anything of the row would be lost. */
export function isTouched(row: TypedRow): boolean {
  return (
    isRead(row) || row.frequency !== undefined || [row.height, row.azimuth, row.remark].some((text) => text !== '')
  );
}

/** The row as it is sent; null without a reading, or while a cell of it is wrong. */
export function finalOf(row: TypedRow | undefined, asked: AskedFinal): TypedFinal | null {
  if (!row || !isRead(row) || Object.keys(wrongIn(row, asked)).length > 0) return null;
  const readings = asked.detectors.flatMap((detector) => {
    const level = typedFigure(row.levels[detector] ?? '');
    return level === null ? [] : [{ detector, level }];
  });
  return {
    retestIds: asked.retests.map(({ id }) => id),
    frequencyHz: tunedHz(row, asked)!,
    readings,
    rbwHz: asked.rbwHz,
    heightM: typedFigure(row.height),
    azimuthDeg: typedFigure(row.azimuth),
    readAt: row.readAt,
    remark: row.remark.trim() || null,
  };
}

/** Why a reading would leave the retest where it is; null where it is tuned to the emission. */
export function tunedApart(row: TypedRow, asked: AskedFinal): string | null {
  const hz = tunedHz(row, asked);
  if (hz === null) return null;
  const apartHz = Math.max(0, asked.fromHz - hz, hz - asked.toHz);
  if (apartHz <= asked.rbwHz / 2) return null;
  return `${asked.kind === 'floor' ? 'outside the stretch asked for' : 'further off than half the bandwidth'}: it settles nothing`;
}

/** How the readings of a sheet are taken, as far as the person may change it. */
export interface Setting {
  pathId: string;
  /** `dBuV`, `dBm` at the receiver, or field strength. */
  reading: ReadingKind;
  operatingMode: string;
  heightSwept: boolean;
}
export const READING_KINDS = ['dBuV', 'dBm', 'field'] as const;
export type ReadingKind = (typeof READING_KINDS)[number];

type Position = FinalsSheetView['positions'][number];

/** The unit of readings that are field strength, as the run that asked had it. */
export function fieldUnit({ valuesHold, unit }: Pick<FinalsBody, 'valuesHold' | 'unit'>): LevelUnit {
  return valuesHold === 'field' ? unit : 'dBuV/m';
}

/** What a position's typed rows ask to be kept as, and which row each of them is; null while none can be sent. */
export function bodyOf(
  sheet: FinalsSheetView,
  { position, finals }: Position,
  typed: Typed,
  setting: Setting,
): { body: FinalsBody; keys: string[] } | null {
  const { proposed, port, state } = sheet;
  if (!proposed) return null;
  const rows = finals.flatMap((asked) => {
    const final = finalOf(typed[asked.key], asked);
    return final ? [{ key: asked.key, final }] : [];
  });
  if (rows.length === 0) return null;
  const field = setting.reading === 'field';
  const samePath = setting.pathId === (proposed.pathId ?? '');
  const body: FinalsBody = {
    stateId: state.id,
    port,
    polarisation: position === 'horizontal' || position === 'vertical' ? position : null,
    line: position === null || position === 'horizontal' || position === 'vertical' ? null : position,
    pathId: setting.pathId || null,
    limitSetId: proposed.limitSet.id,
    distanceM: proposed.distanceM,
    operatingMode: setting.operatingMode.trim(),
    valuesHold: field ? 'field' : 'receiver-input',
    unit: setting.reading === 'field' ? fieldUnit(proposed) : setting.reading,
    alreadyCorrected: !field && samePath ? proposed.alreadyCorrected : [],
    heightSwept: port === 'enclosure' && setting.heightSwept,
    finals: rows.map(({ final }) => final),
  };
  return { body, keys: rows.map(({ key }) => key) };
}
