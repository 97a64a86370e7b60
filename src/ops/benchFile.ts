import { z } from 'zod';
import type { Actor } from '@/auth/actor';
import { FACTOR_QUANTITIES } from '@/emc/kinds';
import { Conflict, Invalid } from '@/errors';
import { Equipment } from '@/models/equipment';
import { polarisation, port } from '@/schemas/common';
import { uncertaintyBudget } from '@/schemas/paths';
import { enterCalibration, enterEquipment } from '@/services/enterEquipment';
import { enterSignalPath } from '@/services/enterSignalPath';

const day = z.iso.date();
const steps = z.array(
  z.strictObject({ startHz: z.number().positive(), stopHz: z.number(), expandedDb: z.number().positive() }),
);

/**
 * A lab's bench as one file: equipment with its calibrations and tables (rows of Hz and dB, each quantity in its own unit),
 * and signal paths from the sample to the receiver that name those tables.
 */
export const benchFile = z.strictObject({
  equipment: z.array(
    z.strictObject({
      identifier: z.string().min(1).max(20),
      role: z.string().min(1).max(40),
      description: z.string().max(200),
      calibrations: z.array(
        z.strictObject({
          certificate: z.string().min(1).max(80),
          laboratory: z.string().min(1).max(120),
          calibratedOn: day,
          dueOn: day.nullable(),
          tables: z.array(
            z.strictObject({
              name: z.string().min(1).max(120),
              quantity: z.enum(FACTOR_QUANTITIES),
              polarisation: polarisation.nullable(),
              distanceM: z.number().positive().nullable(),
              rows: z.array(z.tuple([z.number().positive(), z.number()])).min(1),
              source: z.string().max(300),
            }),
          ),
        }),
      ),
    }),
  ),
  paths: z.array(
    z.strictObject({
      code: z.string().min(1).max(20),
      name: z.string().min(1).max(160),
      port,
      position: z.string().max(60),
      /** From the sample to the receiver; `term` null for what adds nothing, tables by name. */
      items: z.array(
        z.strictObject({
          identifier: z.string(),
          term: z.string().nullable(),
          /** Where it is in a path split by frequency; left out, it is in the path at every frequency. */
          fromHz: z.number().positive().nullable().default(null),
          toHz: z.number().positive().nullable().default(null),
          tables: z.strictObject({
            horizontal: z.string().nullable(),
            vertical: z.string().nullable(),
            any: z.string().nullable(),
          }),
        }),
      ),
      /** Stated where there is no budget to compute it from. */
      uncertainty: z.strictObject({ prescan: steps, final: steps }).optional(),
      budget: uncertaintyBudget.optional(),
      uncertaintySource: z.string().max(300),
    }),
  ),
});
export type BenchFile = z.infer<typeof benchFile>;

/** Enters all of it; call inside one unit of work, so that a mistake anywhere leaves nothing half entered. */
export async function enterBench(actor: Actor, file: BenchFile): Promise<void> {
  const items = new Map<string, { publicId: string; role: string }>();
  const tables = new Map<string, { publicId: string; quantity: (typeof FACTOR_QUANTITIES)[number] }>();
  for (const { calibrations, ...item } of file.equipment) {
    if (await Equipment.findOne({ where: { identifier: item.identifier } })) {
      throw new Conflict(`${item.identifier} is entered already; nothing was changed.`);
    }
    const row = await enterEquipment(actor, { ...item, state: 'in-use' });
    items.set(item.identifier, { publicId: row.publicId, role: item.role });
    for (const { tables: own, ...calibration } of calibrations) {
      const entered = await enterCalibration(actor, row, {
        ...calibration,
        tables: own.map(({ rows, ...table }) => ({
          ...table,
          frequenciesHz: rows.map(([frequencyHz]) => frequencyHz),
          valuesDb: rows.map(([, valueDb]) => valueDb),
        })),
      });
      for (const table of entered) tables.set(table.name, { publicId: table.publicId, quantity: table.quantity });
    }
  }
  for (const [p, path] of file.paths.entries()) {
    const named = (name: string | null, at: string) => {
      if (name === null) return null;
      const table = tables.get(name);
      if (!table) throw new Invalid([{ pointer: `/paths/${p}${at}`, message: `names no table of this file: ${name}` }]);
      return table;
    };
    await enterSignalPath(actor, {
      ...path,
      items: path.items.map(({ identifier, term, fromHz, toHz, tables: own }, i) => {
        const item = items.get(identifier);
        const at = `/items/${i}`;
        if (!item)
          throw new Invalid([{ pointer: `/paths/${p}${at}/identifier`, message: `is no item: ${identifier}` }]);
        const [horizontal, vertical, any] = [own.horizontal, own.vertical, own.any].map((name) => named(name, at));
        const quantity = (any ?? horizontal ?? vertical)?.quantity ?? null;
        if ((term === null) !== (quantity === null)) {
          throw new Invalid([{ pointer: `/paths/${p}${at}/term`, message: 'and a table go together' }]);
        }
        return {
          equipmentId: item.publicId,
          role: item.role,
          term,
          quantity,
          tables: {
            horizontal: horizontal?.publicId ?? null,
            vertical: vertical?.publicId ?? null,
            any: any?.publicId ?? null,
          },
          fromHz,
          toHz,
        };
      }),
    });
  }
}
