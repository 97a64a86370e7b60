import { Op, type Model, type ModelStatic } from 'sequelize';
import { StaleVersion } from '@/errors';

/**
 * Writes `values` on the row if it still has `version`, and counts the version up. Throws StaleVersion when somebody
 * else was first: the comparison is in the UPDATE itself, so two at once cannot both win.
 */
export async function changeVersioned<M extends Model>(
  model: ModelStatic<M>,
  row: M & { id: number; version: number },
  version: number,
  values: Record<string, unknown>,
  what: string,
): Promise<void> {
  const where = { id: { [Op.eq]: row.id }, version } as never;
  const [changed] = await model.update({ ...values, version: version + 1 } as never, { where });
  if (changed !== 1) {
    const now = (await model.findByPk(row.id as never)) as (M & { version: number }) | null;
    throw new StaleVersion(now?.version ?? row.version, what);
  }
}
