import { Counter } from '@/models/counter';
import { database } from '@/models/database';
import { currentTransaction, lastly, unitOfWork } from '@/models/unitOfWork';
import { nextNumber } from '@/services/counters';
import { freshDatabase, type TestDatabase } from '../support/database';

let schema: TestDatabase;
beforeAll(async () => {
  schema = await freshDatabase();
  database();
});
afterAll(() => schema.close());

const lock = (scope: string) =>
  Counter.findOne({ where: { scope }, lock: currentTransaction().LOCK.UPDATE, rejectOnEmpty: true });
const pause = (ms: number) => new Promise((resolve) => setTimeout(resolve, ms));

test('a query outside a unit of work is refused', async () => {
  await expect(Counter.findAll()).rejects.toThrow('outside a unit of work');
});

test('what a unit wrote is gone when it throws', async () => {
  const failing = unitOfWork(async () => {
    await Counter.create({ scope: 'half', value: 1 });
    throw new Error('stop');
  });
  await expect(failing).rejects.toThrow('stop');
  expect(await unitOfWork(() => Counter.count({ where: { scope: 'half' } }))).toBe(0);
});

test('two units that lock the same rows in opposite order both finish: the loser runs again', async () => {
  await unitOfWork(() =>
    Counter.bulkCreate([
      { scope: 'a', value: 0 },
      { scope: 'b', value: 0 },
    ]),
  );
  let runs = 0;
  const add = (first: string, second: string) =>
    unitOfWork(async () => {
      runs += 1;
      await lock(first);
      await pause(100);
      await lock(second);
      await Counter.increment('value', { where: { scope: [first, second] } });
    });
  await Promise.all([add('a', 'b'), add('b', 'a')]);
  const rows = await unitOfWork(() => Counter.findAll({ where: { scope: ['a', 'b'] }, order: [['scope', 'ASC']] }));
  expect(rows.map((row) => Number(row.value))).toEqual([2, 2]);
  expect(runs).toBe(3);
});

test('a unit inside another joins it: the outer failure takes the inner write back', async () => {
  const failing = unitOfWork(async () => {
    await unitOfWork(() => Counter.create({ scope: 'inner', value: 1 }));
    throw new Error('stop');
  });
  await expect(failing).rejects.toThrow('stop');
  expect(await unitOfWork(() => Counter.count({ where: { scope: 'inner' } }))).toBe(0);
});

test('what is registered for last runs at the end, sorted by key', async () => {
  const order: string[] = [];
  await unitOfWork(async () => {
    lastly('z', async () => void order.push('z'));
    lastly('a', async () => void order.push('a'));
    order.push('work');
  });
  expect(order).toEqual(['work', 'a', 'z']);
});

test('forty numbers asked for at once are 1 to 40, each once', async () => {
  const numbers = await Promise.all(Array.from({ length: 40 }, () => unitOfWork(() => nextNumber('race'))));
  expect(numbers.sort((a, b) => a - b)).toEqual(Array.from({ length: 40 }, (_, i) => i + 1));
});

test('a number whose unit fails is given again', async () => {
  await expect(
    unitOfWork(async () => {
      await nextNumber('again');
      throw new Error('stop');
    }),
  ).rejects.toThrow('stop');
  expect(await unitOfWork(() => nextNumber('again'))).toBe(1);
});
