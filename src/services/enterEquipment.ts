import { authorise, type Actor } from '@/auth/actor';
import type { FactorQuantity, Polarisation } from '@/emc/kinds';
import { checkFactorTable } from '@/emc/factorTable';
import { Calibration } from '@/models/calibration';
import { Equipment } from '@/models/equipment';
import { FactorTableRevision } from '@/models/factorTableRevision';
import { newPublicId } from '@/models/publicId';
import { unitOfWork } from '@/models/unitOfWork';
import { recordChange } from './audit';

export interface NewEquipment {
  identifier: string;
  role: string;
  description: string;
  state: 'in-use' | 'quarantined' | 'retired';
}

export async function enterEquipment(actor: Actor | null, item: NewEquipment, at = new Date()): Promise<Equipment> {
  authorise(actor, 'equipment.enter');
  return unitOfWork(async () => {
    const row = await Equipment.create({ publicId: newPublicId(), ...item, createdAt: at });
    const after = { ...item };
    recordChange(actor, {
      scope: 'lab',
      action: 'equipment entered',
      subjectType: 'equipment',
      subjectId: row.publicId,
      before: null,
      after,
      at,
    });
    return row;
  });
}

export interface NewCalibration {
  certificate: string;
  laboratory: string;
  calibratedOn: string;
  dueOn: string | null;
  tables: {
    name: string;
    quantity: FactorQuantity;
    polarisation: Polarisation | null;
    distanceM: number | null;
    frequenciesHz: number[];
    valuesDb: number[];
    source: string;
  }[];
}

/** Enters a calibration with its tables; a table of a name that exists becomes its next revision, nothing is replaced. */
export async function enterCalibration(
  actor: Actor | null,
  equipment: Equipment,
  calibration: NewCalibration,
  at = new Date(),
): Promise<FactorTableRevision[]> {
  authorise(actor, 'equipment.enter');
  const { tables, ...rest } = calibration;
  for (const { name, quantity, frequenciesHz: frequencyHz, valuesDb: valueDb } of tables) {
    checkFactorTable({ id: name, name, quantity, frequencyHz, valueDb });
  }
  return unitOfWork(async () => {
    const row = await Calibration.create({
      publicId: newPublicId(),
      equipmentId: equipment.id,
      ...rest,
      createdAt: at,
    });
    const entered: FactorTableRevision[] = [];
    for (const table of tables) {
      const earlier = await FactorTableRevision.count({ where: { equipmentId: equipment.id, name: table.name } });
      entered.push(
        await FactorTableRevision.create({
          publicId: newPublicId(),
          equipmentId: equipment.id,
          calibrationId: row.id,
          revision: earlier + 1,
          ...table,
          userId: actor.userId,
          createdAt: at,
        }),
      );
    }
    recordChange(actor, {
      scope: 'lab',
      action: `calibration ${rest.certificate} entered`,
      subjectType: 'equipment',
      subjectId: equipment.publicId,
      before: null,
      after: { calibration: row.publicId, ...rest, tables: entered.map((table) => table.publicId) },
      at,
    });
    return entered;
  });
}
