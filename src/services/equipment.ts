import { authorise, type Actor } from '@/auth/actor';
import { Calibration } from '@/models/calibration';
import { Equipment } from '@/models/equipment';
import { FactorTableRevision } from '@/models/factorTableRevision';
import { unitOfWork } from '@/models/unitOfWork';
import type { EquipmentView } from '@/schemas/bench';
import { dueOnDay } from './calibrationState';
import { dayIn, labSettings } from './lab';
import { olderThan, pageFrom, type PageRequest } from './paging';

/** The newest calibration made on or before a day, or null. */
export function calibrationOn(calibrations: Calibration[], day: string): Calibration | null {
  const made = calibrations.filter((calibration) => calibration.calibratedOn <= day);
  return made.sort((a, b) => (a.calibratedOn < b.calibratedOn ? 1 : -1))[0] ?? null;
}

export async function listEquipment(actor: Actor | null, page: PageRequest) {
  authorise(actor, 'equipment.list');
  return unitOfWork(async () => {
    const today = dayIn((await labSettings()).zone, new Date());
    const rows = await Equipment.findAll({ where: olderThan(page), order: [['id', 'DESC']], limit: page.limit + 1 });
    const equipmentId = rows.map((row) => row.id);
    const calibrations = await Calibration.findAll({ where: { equipmentId } });
    const tables = await FactorTableRevision.findAll({
      where: { equipmentId },
      attributes: [
        'publicId',
        'equipmentId',
        'name',
        'revision',
        'quantity',
        'polarisation',
        'frequenciesHz',
        'source',
      ],
      order: [['id', 'ASC']],
    });
    return pageFrom(rows, page, (row): EquipmentView => {
      const last = calibrationOn(
        calibrations.filter((calibration) => calibration.equipmentId === row.id),
        today,
      );
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
        tables: tables
          .filter((table) => table.equipmentId === row.id)
          .map((table) => ({
            id: table.publicId,
            name: table.name,
            revision: table.revision,
            quantity: table.quantity,
            polarisation: table.polarisation,
            rows: table.frequenciesHz.length,
            source: table.source,
          })),
      };
    });
  });
}
