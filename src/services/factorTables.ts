import { Op } from 'sequelize';
import { authorise, type Actor } from '@/auth/actor';
import { factorDifference } from '@/emc/revisionDifference';
import { NotFound } from '@/errors';
import { factorTableText } from '@/ingest/tableText';
import type { Calibration } from '@/models/calibration';
import { Equipment } from '@/models/equipment';
import { FactorTableRevision } from '@/models/factorTableRevision';
import { unitOfWork } from '@/models/unitOfWork';
import type { User } from '@/models/user';
import type { FactorTableSummary, FactorTableView } from '@/schemas/tables';
import { labSettings } from './lab';
import { olderThan, pageFrom, type PageRequest } from './paging';
import { toCoreTable } from './signalPaths';
import { outdatedSince, pathRevisionsWith, runsWithTable } from './tableUse';
import { wordsIn } from './tradeWords';

type Whole = FactorTableRevision & { equipment: Equipment; calibration: Calibration | null; user: User | null };
export const TABLE_INCLUDE = ['equipment', 'calibration', 'user'];

export function tableSummary(row: FactorTableRevision, newest: boolean): FactorTableSummary {
  const { equipment, calibration, user } = row as Whole;
  return {
    id: row.publicId,
    name: row.name,
    revision: row.revision,
    newest,
    equipment: { id: equipment.publicId, identifier: equipment.identifier, description: equipment.description },
    quantity: row.quantity,
    polarisation: row.polarisation,
    distanceM: row.distanceM,
    rows: row.frequenciesHz.length,
    firstHz: row.frequenciesHz[0]!,
    lastHz: row.frequenciesHz.at(-1)!,
    source: row.source,
    reason: row.reason,
    calibration: calibration && {
      id: calibration.publicId,
      certificate: calibration.certificate,
      laboratory: calibration.laboratory,
      calibratedOn: calibration.calibratedOn,
      dueOn: calibration.dueOn,
    },
    file: row.fileName !== null && row.fileSha256 !== null ? { name: row.fileName, sha256: row.fileSha256 } : null,
    enteredAt: row.createdAt.toISOString(),
    enteredBy: user && { id: user.publicId, name: user.name },
  };
}

/** Row ids of the highest revision of each name, for the items that some rows belong to. */
async function newestIds(rows: readonly FactorTableRevision[]): Promise<Set<number>> {
  const all = await FactorTableRevision.findAll({
    where: { equipmentId: [...new Set(rows.map((row) => row.equipmentId))] },
    attributes: ['id', 'equipmentId', 'name', 'revision'],
    order: [['revision', 'ASC']],
  });
  const newest = new Map(all.map((row) => [`${row.equipmentId} ${row.name}`, row.id]));
  return new Set(newest.values());
}

interface TablePage extends PageRequest {
  equipmentId?: string;
  find?: string;
}

export async function listFactorTables(actor: Actor | null, page: TablePage) {
  authorise(actor, 'equipment.list');
  return unitOfWork(async () => {
    const item = page.equipmentId ? await findEquipment(page.equipmentId) : null;
    const searched = ['FactorTableRevision.name', 'equipment.identifier', 'equipment.role', 'equipment.description'];
    const rows = await FactorTableRevision.findAll({
      where: {
        [Op.and]: [
          olderThan(page),
          item ? { equipmentId: item.id } : {},
          page.find
            ? wordsIn(
                page.find,
                searched.map((column) => `$${column}$`),
              )
            : {},
        ],
      },
      include: TABLE_INCLUDE,
      order: [['id', 'DESC']],
      limit: page.limit + 1,
      subQuery: false,
    });
    const newest = await newestIds(rows);
    return pageFrom(rows, page, (row) => tableSummary(row, newest.has(row.id)));
  });
}

export async function findEquipment(publicId: string): Promise<Equipment> {
  const row = await Equipment.findOne({ where: { publicId } });
  if (!row) throw new NotFound('item of equipment');
  return row;
}

async function findTable(publicId: string): Promise<FactorTableRevision> {
  const row = await FactorTableRevision.findOne({ where: { publicId }, include: TABLE_INCLUDE });
  if (!row) throw new NotFound('factor table');
  return row;
}

/** One revision with its rows, what uses it, how it differs from the one before, and what it leaves to do. */
export async function readFactorTable(actor: Actor | null, publicId: string): Promise<FactorTableView> {
  authorise(actor, 'equipment.list');
  return unitOfWork(async () => {
    const row = (await findTable(publicId)) as Whole;
    const named = await FactorTableRevision.findAll({
      where: { equipmentId: row.equipmentId, name: row.name },
      order: [['revision', 'DESC']],
    });
    const newest = named[0]!.id === row.id;
    const older = named.filter(({ revision }) => revision < row.revision);
    const before = older[0] ?? null;
    const { calibration } = row;
    const { zone } = await labSettings();
    return {
      ...tableSummary(row, newest),
      frequencyHz: row.frequenciesHz,
      valueDb: row.valuesDb,
      paths: (await pathRevisionsWith([row.publicId])).map(({ path, revision, current }) => {
        const { publicId: id, code, name } = path;
        return { id, code, name, revision: revision.revision, current };
      }),
      runs: await runsWithTable(row.publicId),
      outdated: newest && calibration ? await outdatedSince(older, calibration.calibratedOn, zone) : null,
      before: before && {
        id: before.publicId,
        revision: before.revision,
        difference: factorDifference(toCoreTable(before), toCoreTable(row)),
      },
    };
  });
}

/** As CSV under a name that says what it is; what is uploaded of it is the same table. */
export async function downloadFactorTable(
  actor: Actor | null,
  publicId: string,
): Promise<{ name: string; text: string }> {
  authorise(actor, 'equipment.list');
  return unitOfWork(async () => {
    const row = await findTable(publicId);
    const { name, quantity, polarisation, distanceM, frequenciesHz: frequencyHz, valuesDb: valueDb, source } = row;
    const text = factorTableText({ name, quantity, polarisation, distanceM, frequencyHz, valueDb, source });
    return { name: `${name}, revision ${row.revision}.csv`, text };
  });
}
