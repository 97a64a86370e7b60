import { authorise, type Actor } from '@/auth/actor';
import { signOf } from '@/emc/factorQuantity';
import type { Polarisation } from '@/emc/kinds';
import type { FactorTable, PathTerm } from '@/emc/types';
import { Invalid } from '@/errors';
import { Calibration } from '@/models/calibration';
import { Equipment } from '@/models/equipment';
import { FactorTableRevision } from '@/models/factorTableRevision';
import { SignalPath } from '@/models/signalPath';
import { SignalPathRevision } from '@/models/signalPathRevision';
import type { StoredPathItem } from '@/models/stored';
import { unitOfWork } from '@/models/unitOfWork';
import type { PathView } from '@/schemas/bench';
import type { z } from 'zod';
import type { pathItemView } from '@/schemas/sweep';
import { dueOnDay } from './calibrationState';
import { calibrationOn } from './equipment';
import { dayIn, labSettings } from './lab';
import { olderThan, pageFrom, type PageRequest } from './paging';

export interface LoadedItem {
  stored: StoredPathItem;
  equipment: Equipment;
  calibration: Calibration | null;
  tables: FactorTableRevision[];
}

export interface LoadedPath {
  path: SignalPath;
  revision: SignalPathRevision;
  items: LoadedItem[];
}

/** A revision with the equipment, calibrations (as of a day) and tables along it. */
export async function loadPaths(revisions: SignalPathRevision[], day: string): Promise<LoadedPath[]> {
  const items = revisions.flatMap((revision) => revision.items);
  const equipment = await Equipment.findAll({
    where: { publicId: [...new Set(items.map((item) => item.equipmentId))] },
  });
  const calibrations = await Calibration.findAll({ where: { equipmentId: equipment.map((row) => row.id) } });
  const tableIds = items.flatMap((item) => Object.values(item.tables)).filter((id): id is string => id !== null);
  const tables = await FactorTableRevision.findAll({
    where: { publicId: [...new Set(tableIds)] },
    include: ['calibration'],
  });
  const paths = await SignalPath.findAll({ where: { id: revisions.map((revision) => revision.signalPathId) } });
  return revisions.map((revision) => ({
    path: paths.find((path) => path.id === revision.signalPathId)!,
    revision,
    items: revision.items.map((stored) => {
      const row = equipment.find((candidate) => candidate.publicId === stored.equipmentId)!;
      const own = tables.filter((table) => Object.values(stored.tables).includes(table.publicId));
      return {
        stored,
        equipment: row,
        tables: own,
        calibration: calibrationOn(
          calibrations.filter((calibration) => calibration.equipmentId === row.id),
          day,
        ),
      };
    }),
  }));
}

export function itemView(item: LoadedItem, day: string): z.infer<typeof pathItemView> {
  const { equipment, calibration, stored } = item;
  return {
    role: stored.role,
    identifier: equipment.identifier,
    description: equipment.description,
    calibratedOn: calibration?.calibratedOn ?? null,
    dueOn: calibration?.dueOn ?? null,
    due: dueOnDay(calibration, day),
  };
}

export interface Setup {
  polarisation: Polarisation | null;
  distanceM: number | null;
}

/**
 * The table an item uses for a polarisation and a distance. Invalid when it has one per polarisation and none was
 * named, or when the table was measured for another distance: an antenna factor is not carried over.
 */
function tableFor(item: LoadedItem, { polarisation, distanceM }: Setup): FactorTableRevision | null {
  const { tables } = item.stored;
  if (item.stored.term === null) return null;
  const id = tables.any ?? (polarisation && tables[polarisation]);
  if (!id) {
    const message = `is needed: ${item.equipment.identifier} has a table for each polarisation`;
    throw new Invalid([{ pointer: '/polarisation', message }]);
  }
  const table = item.tables.find(({ publicId }) => publicId === id)!;
  if (table.distanceM !== null && table.distanceM !== distanceM) {
    throw new Invalid([{ pointer: '/distanceM', message: `is not that of ${table.name}, ${table.distanceM} m` }]);
  }
  return table;
}

export interface LoadedTerm {
  term: PathTerm;
  item: LoadedItem;
  table: FactorTableRevision;
}

/**
 * The terms a run through a path adds, in the order of the path. `notApplied` says, by term id, why a term is in the
 * reading already; a term's id is its equipment's identifier.
 */
export function termsOf(path: LoadedPath, setup: Setup, notApplied: Map<string, string>): LoadedTerm[] {
  return path.items.flatMap((item) => {
    const table = tableFor(item, setup);
    if (!table) return [];
    const because = notApplied.get(item.equipment.identifier);
    return [
      {
        item,
        table,
        term: {
          id: item.equipment.identifier,
          name: item.stored.term!,
          table: toCoreTable(table),
          applied: because === undefined,
          ...(because !== undefined && { notAppliedBecause: because }),
          fromHz: item.stored.fromHz ?? null,
          toHz: item.stored.toHz ?? null,
        },
      },
    ];
  });
}

export function toCoreTable(row: FactorTableRevision): FactorTable {
  const { publicId: id, name, quantity, frequenciesHz: frequencyHz, valuesDb: valueDb } = row;
  return { id, name, quantity, frequencyHz, valueDb };
}

/** The newest revision of each path. */
export async function currentRevisions(paths: SignalPath[]): Promise<SignalPathRevision[]> {
  const all = await SignalPathRevision.findAll({
    where: { signalPathId: paths.map((path) => path.id) },
    order: [['revision', 'DESC']],
  });
  return paths.flatMap((path) => all.find((revision) => revision.signalPathId === path.id) ?? []);
}

/**
 * From the lowest to the highest frequency that a path has a factor at, whatever the polarisation: what all its items
 * cover, where those of one quantity that have ranges stand in for each other. There may be gaps between.
 */
function rangeOf(adding: readonly LoadedItem[]): { lowHz: number | null; highHz: number | null } {
  const reach = adding.map(({ stored, tables }) => {
    const ranged = (stored.fromHz ?? stored.toHz ?? null) !== null;
    return {
      // Items with a range in the path stand in for each other; each of the others has to be there by itself.
      as: ranged ? stored.quantity : stored.equipmentId,
      // A gain that is in the path only for a range limits nothing outside of it.
      limits: !(ranged && stored.quantity === 'gain'),
      lowHz: Math.max(stored.fromHz ?? 0, ...tables.map((table) => table.frequenciesHz[0]!)),
      highHz: Math.min(stored.toHz ?? Infinity, ...tables.map((table) => table.frequenciesHz.at(-1)!)),
    };
  });
  const needed = reach.filter(({ limits }) => limits);
  if (needed.length === 0) return { lowHz: null, highHz: null };
  const groups = [...new Set(needed.map(({ as }) => as))].map((as) => needed.filter((one) => one.as === as));
  return {
    lowHz: Math.max(...groups.map((group) => Math.min(...group.map(({ lowHz }) => lowHz)))),
    highHz: Math.min(...groups.map((group) => Math.max(...group.map(({ highHz }) => highHz)))),
  };
}

function pathViewOf(loaded: LoadedPath, day: string): PathView {
  const { path, revision, items } = loaded;
  const adding = items.filter((item) => item.stored.term !== null);
  const { lowHz, highHz } = rangeOf(adding);
  return {
    id: path.publicId,
    code: path.code,
    name: path.name,
    port: path.port,
    position: path.position,
    revision: revision.revision,
    lowHz,
    highHz,
    distanceM: adding.flatMap(({ tables }) => tables).find(({ distanceM }) => distanceM !== null)?.distanceM ?? null,
    items: items.map((item) => itemView(item, day)),
    terms: adding.map((item) => ({
      id: item.equipment.identifier,
      name: item.stored.term!,
      identifier: item.equipment.identifier,
      sign: item.stored.quantity && signOf(item.stored.quantity) < 0 ? ('−' as const) : ('+' as const),
    })),
  };
}

export async function listPaths(actor: Actor | null, page: PageRequest) {
  authorise(actor, 'path.list');
  return unitOfWork(async () => {
    const today = dayIn((await labSettings()).zone, new Date());
    const rows = await SignalPath.findAll({ where: olderThan(page), order: [['id', 'DESC']], limit: page.limit + 1 });
    const loaded = await loadPaths(await currentRevisions(rows), today);
    const views = new Map(loaded.map((path) => [path.path.id, pathViewOf(path, today)]));
    return pageFrom(rows, page, (row) => views.get(row.id)!);
  });
}
