import { Op, type WhereOptions } from 'sequelize';
import { Invalid } from '@/errors';

export interface PageRequest {
  limit: number;
  after?: string;
}

export interface Page<T> {
  items: T[];
  next: string | null;
}

/** Where the page before ended, newest first by row id; the cursor is opaque to callers. */
export function olderThan(page: PageRequest): WhereOptions {
  if (!page.after) return {};
  const id = Number(Buffer.from(page.after, 'base64url').toString('latin1'));
  if (!Number.isSafeInteger(id) || id < 1) {
    throw new Invalid([{ pointer: '/query/after', message: 'is not a cursor of this list' }]);
  }
  return { id: { [Op.lt]: id } };
}

/** Cuts one extra row off into `next`; ask the database for `limit + 1`. */
export function pageFrom<Row extends { id: number }, T>(
  rows: Row[],
  page: PageRequest,
  view: (row: Row) => T,
): Page<T> {
  const shown = rows.slice(0, page.limit);
  const last = shown.at(-1);
  const next = rows.length > page.limit && last ? Buffer.from(String(last.id), 'latin1').toString('base64url') : null;
  return { items: shown.map(view), next };
}
