import { Counter } from '@/models/counter';
import { currentTransaction } from '@/models/unitOfWork';

/**
 * The next number of a scope, without gaps or doubles: the row stays locked until the unit commits, so ask for it
 * just before the insert that needs it.
 */
export async function nextNumber(scope: string): Promise<number> {
  await Counter.bulkCreate([{ scope, value: 0 }], { ignoreDuplicates: true });
  const row = await Counter.findOne({
    where: { scope },
    lock: currentTransaction().LOCK.UPDATE,
    rejectOnEmpty: true,
  });
  const value = Number(row.value) + 1;
  await Counter.update({ value }, { where: { scope } });
  return value;
}
