import { Op } from 'sequelize';
import type { Port } from '@/emc/kinds';
import { Retest } from '@/models/retest';

/** Rows written or read in one statement: so few that another request is answered in between. */
export const ROWS_AT_A_TIME = 200;

/** The same in order, in parts of at most ROWS_AT_A_TIME. */
export function inParts<T>(all: readonly T[]): T[][] {
  const parts: T[][] = [];
  for (let from = 0; from < all.length; from += ROWS_AT_A_TIME) parts.push(all.slice(from, from + ROWS_AT_A_TIME));
  return parts;
}

/** The items of one port that are of a state or were carried to it, oldest first. */
export async function retestRows(of: { stateId: number } | { carriedTo: number }, port: Port): Promise<Retest[]> {
  const rows: Retest[] = [];
  for (;;) {
    const some = await Retest.findAll({
      where: { ...of, port, id: { [Op.gt]: rows.at(-1)?.id ?? 0 } },
      order: [['id', 'ASC']],
      limit: ROWS_AT_A_TIME,
    });
    rows.push(...some);
    if (some.length < ROWS_AT_A_TIME) return rows;
  }
}
