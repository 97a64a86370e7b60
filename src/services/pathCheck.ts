import { levelUnitOf } from '@/emc/correction';
import type { PathTerm } from '@/emc/types';
import { Invalid } from '@/errors';
import { FactorTableRevision } from '@/models/factorTableRevision';
import type { StoredPathItem } from '@/models/stored';
import { toCoreTable } from './signalPaths';

/**
 * Refuses items that no run could be judged through: two transducers at one frequency, ranges that are none or leave
 * nothing, parts that end in different units. Call inside a unit of work. Throws Invalid at `/items`.
 */
export async function refuseItems(items: readonly StoredPathItem[]): Promise<void> {
  const ids = items.flatMap(({ tables }) => Object.values(tables)).filter((id) => id !== null);
  const rows = await FactorTableRevision.findAll({ where: { publicId: [...new Set(ids)] } });
  const byId = new Map(rows.map((row) => [row.publicId, toCoreTable(row)]));
  for (const polarisation of ['horizontal', 'vertical'] as const) {
    const terms = items.flatMap(({ term: name, tables, fromHz, toHz }): PathTerm[] => {
      const table = byId.get(tables.any ?? tables[polarisation] ?? '');
      if (name === null || !table) return [];
      return [{ id: table.id, name, table, applied: true, fromHz, toHz }];
    });
    try {
      levelUnitOf('dBuV', terms);
    } catch (error) {
      if (!(error instanceof RangeError)) throw error;
      throw new Invalid([{ pointer: '/items', message: `cannot be one path. ${error.message}` }]);
    }
  }
}
