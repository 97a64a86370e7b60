import type { EquipmentRecord } from '@/schemas/bench';
import type { Polarisation } from '@/schemas/common';
import type { FactorQuantity, FactorTablePreview, FactorTableSummary } from '@/schemas/tables';

/** What an upload sheet knows of its item. */
export interface UploadFor {
  item: EquipmentRecord;
  /** The newest revision of each name of this item. */
  named: readonly FactorTableSummary[];
  today: string;
  zone: string;
}

/** One table of the file as a person means to enter it. */
export interface ChosenDraft {
  index: number;
  use: boolean;
  /** The name it revises; empty for a new one. */
  revises: string;
  newName: string;
  quantity: FactorQuantity | '';
  polarisation: Polarisation | '';
  distanceM: string;
}

export interface CalibrationDraft {
  /** Of one that is entered already, or `new`. */
  id: string;
  certificate: string;
  laboratory: string;
  calibratedOn: string;
  dueOn: string;
}

type InFile = FactorTablePreview['tablesInFile'][number];

/** The name a table of a file most likely revises: the stated one, else the only one of its quantity and polarisation. */
function proposedName(table: InFile, named: readonly FactorTableSummary[]): string {
  const { name, polarisation } = table.proposed;
  if (name !== null && named.some((one) => one.name === name)) return name;
  const alike = named.filter(
    (one) =>
      (table.quantity === null || one.quantity === table.quantity) &&
      (polarisation === null || one.polarisation === polarisation),
  );
  return name === null && alike.length === 1 ? alike[0]!.name : '';
}

export function draftsFor(
  tables: readonly InFile[],
  named: readonly FactorTableSummary[],
  item: EquipmentRecord,
): ChosenDraft[] {
  return tables.map((table, i) => {
    const revises = proposedName(table, named);
    const before = named.find(({ name }) => name === revises);
    const { polarisation, distanceM, name } = table.proposed;
    return {
      index: table.index,
      use: tables.length === 1 || (tables.length === 2 && table.quantity === 'antenna-factor') || i === 0,
      revises,
      newName: name ?? `${item.identifier} ${tables.length > 1 ? table.heading : ''}`.trim(),
      // What the table says of itself stands; only what it leaves open is taken from the revision before.
      quantity: table.quantity === null ? (before?.quantity ?? '') : '',
      polarisation: before ? (before.polarisation ?? '') : (polarisation ?? ''),
      distanceM: String(distanceM ?? before?.distanceM ?? ''),
    };
  });
}

export const nameOf = ({ revises, newName }: ChosenDraft): string => (revises === '' ? newName.trim() : revises);

export const numberOr = (text: string): number | null => {
  const value = Number(text.trim().replace(',', '.'));
  return text.trim() !== '' && Number.isFinite(value) ? value : null;
};

/** What is asked of the server about a draft. */
export function choiceTables(drafts: readonly ChosenDraft[]) {
  return drafts
    .filter((draft) => draft.use && nameOf(draft) !== '')
    .map((draft) => ({
      index: draft.index,
      name: nameOf(draft),
      quantity: draft.quantity === '' ? null : draft.quantity,
      polarisation: draft.polarisation === '' ? null : draft.polarisation,
      distanceM: numberOr(draft.distanceM),
    }));
}

export function missingOf(calibration: CalibrationDraft, source: string, reason: string): string[] {
  const own = calibration.id === 'new';
  return [
    ...(calibration.id === '' ? ['the calibration'] : []),
    ...(own && calibration.certificate.trim() === '' ? ['the certificate'] : []),
    ...(own && calibration.laboratory.trim() === '' ? ['the laboratory'] : []),
    ...(own && calibration.calibratedOn === '' ? ['the day of calibration'] : []),
    ...(source.trim() === '' ? ['the source'] : []),
    ...(reason.trim() === '' ? ['the reason'] : []),
  ];
}
