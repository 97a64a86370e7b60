import { QueryTypes } from 'sequelize';
import { Counter } from '@/models/counter';
import { database } from '@/models/database';
import { currentTransaction } from '@/models/unitOfWork';

/**
 * The next number of a scope, without gaps or doubles: the row stays locked until the unit commits, so ask for it
 * just before the insert that needs it. One statement takes the exclusive lock at once; reading first and locking
 * afterwards would let two units wait for each other.
 */
export async function nextNumber(scope: string): Promise<number> {
  await database().query(
    'INSERT INTO counters (scope, value) VALUES (?, 1) ON DUPLICATE KEY UPDATE value = value + 1',
    {
      replacements: [scope],
      type: QueryTypes.INSERT,
    },
  );
  const row = await Counter.findOne({
    where: { scope },
    lock: currentTransaction().LOCK.UPDATE,
    rejectOnEmpty: true,
  });
  return Number(row.value);
}

/** As many numbers in a row; answers the first. */
export async function nextNumbers(scope: string, count: number): Promise<number> {
  await database().query(
    'INSERT INTO counters (scope, value) VALUES (?, ?) ON DUPLICATE KEY UPDATE value = value + VALUES(value)',
    { replacements: [scope, count], type: QueryTypes.INSERT },
  );
  const row = await Counter.findOne({ where: { scope }, lock: currentTransaction().LOCK.UPDATE, rejectOnEmpty: true });
  return Number(row.value) - count + 1;
}
