import { calibrationOn, itemOf } from '@fixtures/demo/equipment';
import { paths as demoPaths } from '@fixtures/demo/paths';
import type { DemoContribution, DemoEquipment, DemoPath, DemoTable } from '@fixtures/demo/types';
import type { Actor } from '@/auth/actor';
import type { Equipment } from '@/models/equipment';
import type { FactorTableRevision } from '@/models/factorTableRevision';
import type { StoredPathItem } from '@/models/stored';
import { enterCalibration, enterEquipment } from '@/services/enterEquipment';
import { enterSignalPath } from '@/services/enterSignalPath';

export interface SeededItem {
  row: Equipment;
  /** Tables by the key the demo gives them. */
  tables: Map<string, FactorTableRevision>;
}

export async function seedEquipment(
  actor: Actor,
  equipment: DemoEquipment[],
  dayOf: (offset: number) => string,
  at: (day: number) => Date,
): Promise<Map<string, SeededItem>> {
  const seeded = new Map<string, SeededItem>();
  for (const item of equipment) {
    const { identifier, role, description, status: state } = item;
    const row = await enterEquipment(actor, { identifier, role, description, state }, at(-390));
    const tables = new Map<string, FactorTableRevision>();
    for (const calibration of item.calibrations) {
      const own = calibration.tables;
      const entered = await enterCalibration(
        actor,
        row,
        {
          certificate: calibration.certificate,
          laboratory: calibration.by,
          calibratedOn: dayOf(calibration.onDay),
          dueOn: dayOf(calibration.dueDay),
          tables: own.map(({ name, quantity, polarisation, distanceM, rows }) => ({
            name,
            quantity,
            polarisation,
            distanceM,
            frequenciesHz: rows.map(([frequencyHz]) => frequencyHz),
            valuesDb: rows.map(([, valueDb]) => valueDb),
            source: calibration.certificate,
          })),
        },
        at(calibration.onDay),
      );
      own.forEach((table, i) => tables.set(table.key, entered[i]!));
    }
    seeded.set(identifier, { row, tables });
  }
  return seeded;
}

/** Each path, once from the first day and again after every later calibration of an item on it. */
export async function seedPaths(
  actor: Actor,
  items: Map<string, SeededItem>,
  at: (day: number) => Date,
): Promise<void> {
  for (const path of demoPaths) {
    const calibrated = path.items.flatMap(({ identifier }) =>
      itemOf(identifier).calibrations.map(({ onDay }) => onDay),
    );
    const complete = Math.max(
      ...path.items.map(({ identifier }) => itemOf(identifier).calibrations[0]?.onDay ?? -Infinity),
    );
    const days = [...new Set(calibrated.filter((day) => day >= complete))].sort((a, b) => a - b);
    for (const day of days) await enterSignalPath(actor, revisionOf(path, items, day), at(day));
  }
}

function revisionOf(path: DemoPath, items: Map<string, SeededItem>, day: number) {
  const { code, name, port, position, fromHz, toHz, uncertainty, budget, uncertaintyBasis } = path;
  const whole = (contributions: DemoContribution[]) => [{ startHz: fromHz, stopHz: toHz, contributions }];
  return {
    code,
    name,
    port,
    position,
    ...(budget ? { budget: { prescan: whole(budget.prescan), final: whole(budget.final) } } : { uncertainty }),
    uncertaintySource: uncertaintyBasis,
    items: path.items.map(({ identifier, term, range }): StoredPathItem => {
      const item = itemOf(identifier);
      const { row, tables } = items.get(identifier)!;
      const own = term === null ? [] : (calibrationOn(item, day)?.tables ?? []);
      const idOf = (polarisation: DemoTable['polarisation']) => {
        const table = own.find((candidate) => candidate.polarisation === polarisation);
        return table ? tables.get(table.key)!.publicId : null;
      };
      return {
        equipmentId: row.publicId,
        role: item.role,
        term,
        quantity: own[0]?.quantity ?? null,
        tables: { horizontal: idOf('horizontal'), vertical: idOf('vertical'), any: idOf(null) },
        ...(range && { fromHz: range.fromHz, toHz: range.toHz }),
      };
    }),
  };
}
