import { Op } from 'sequelize';
import { authorise, type Actor } from '@/auth/actor';
import { NotFound } from '@/errors';
import { Calibration } from '@/models/calibration';
import { Equipment } from '@/models/equipment';
import { FactorTableRevision } from '@/models/factorTableRevision';
import { SignalPath } from '@/models/signalPath';
import { SignalPathRevision } from '@/models/signalPathRevision';
import { unitOfWork } from '@/models/unitOfWork';
import type { EquipmentRecord, EquipmentView } from '@/schemas/bench';
import { dueOnDay } from './calibrationState';
import { dayIn, labSettings } from './lab';
import { olderThan, pageFrom, type PageRequest } from './paging';
import { wordsIn } from './tradeWords';

/** The newest calibration made on or before a day, or null. */
export function calibrationOn(calibrations: Calibration[], day: string): Calibration | null {
  const made = calibrations.filter((calibration) => calibration.calibratedOn <= day);
  return made.sort((a, b) => (a.calibratedOn < b.calibratedOn ? 1 : -1))[0] ?? null;
}

type ListedTable = Pick<
  FactorTableRevision,
  'publicId' | 'equipmentId' | 'name' | 'revision' | 'quantity' | 'polarisation' | 'frequenciesHz' | 'source'
>;

function view(row: Equipment, last: Calibration | null, tables: ListedTable[], today: string): EquipmentView {
  return {
    id: row.publicId,
    identifier: row.identifier,
    role: row.role,
    description: row.description,
    state: row.state,
    certificate: last?.certificate ?? null,
    laboratory: last?.laboratory ?? null,
    calibratedOn: last?.calibratedOn ?? null,
    dueOn: last?.dueOn ?? null,
    due: dueOnDay(last, today),
    tables: tables.map((table) => ({
      id: table.publicId,
      name: table.name,
      revision: table.revision,
      quantity: table.quantity,
      polarisation: table.polarisation,
      rows: table.frequenciesHz.length,
      source: table.source,
    })),
  };
}

const LISTED = ['publicId', 'equipmentId', 'name', 'revision', 'quantity', 'polarisation', 'frequenciesHz', 'source'];

export async function listEquipment(actor: Actor | null, page: PageRequest & { find?: string }) {
  authorise(actor, 'equipment.list');
  return unitOfWork(async () => {
    const today = dayIn((await labSettings()).zone, new Date());
    const words = page.find ? wordsIn(page.find, ['identifier', 'role', 'description']) : {};
    const where = { [Op.and]: [olderThan(page), words] };
    const rows = await Equipment.findAll({ where, order: [['id', 'DESC']], limit: page.limit + 1 });
    const equipmentId = rows.map((row) => row.id);
    const calibrations = await Calibration.findAll({ where: { equipmentId } });
    const tables = await FactorTableRevision.findAll({
      where: { equipmentId },
      attributes: LISTED,
      order: [['id', 'ASC']],
    });
    const of = <T extends { equipmentId: number }>(all: T[], row: Equipment) =>
      all.filter((one) => one.equipmentId === row.id);
    return pageFrom(rows, page, (row) =>
      view(row, calibrationOn(of(calibrations, row), today), of(tables, row), today),
    );
  });
}

/** An item with every calibration, newest first, every table, and the paths it is part of now. */
export async function readEquipment(actor: Actor | null, publicId: string): Promise<EquipmentRecord> {
  authorise(actor, 'equipment.list');
  return unitOfWork(async () => {
    const row = await Equipment.findOne({ where: { publicId } });
    if (!row) throw new NotFound('item of equipment');
    const today = dayIn((await labSettings()).zone, new Date());
    const order: [string, string][] = [
      ['calibratedOn', 'DESC'],
      ['id', 'DESC'],
    ];
    const calibrations = await Calibration.findAll({ where: { equipmentId: row.id }, order });
    const tables = await FactorTableRevision.findAll({ where: { equipmentId: row.id }, order: [['id', 'ASC']] });
    const paths = await SignalPath.findAll();
    const newest = await SignalPathRevision.findAll({ order: [['revision', 'DESC']] });
    return {
      ...view(row, calibrationOn([...calibrations], today), tables, today),
      version: row.version,
      calibrations: calibrations.map((one) => ({
        id: one.publicId,
        certificate: one.certificate,
        laboratory: one.laboratory,
        calibratedOn: one.calibratedOn,
        dueOn: one.dueOn,
        enteredAt: one.createdAt.toISOString(),
      })),
      paths: paths.flatMap((path) => {
        const revision = newest.find(({ signalPathId }) => signalPathId === path.id);
        if (!revision?.items.some(({ equipmentId }) => equipmentId === publicId)) return [];
        return [{ id: path.publicId, code: path.code, name: path.name, revision: revision.revision }];
      }),
    };
  });
}
