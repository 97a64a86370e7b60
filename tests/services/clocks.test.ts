import { closePasswordWorkers } from '@/auth/passwordWorker';
import { historyOf } from '@/services/audit';
import { addProductClock, changeProductClock, listProductClocks, withdrawProductClock } from '@/services/clocks';
import { freshDatabase, type TestDatabase } from '../support/database';
import { enterWorld, type World } from '../support/world';

let schema: TestDatabase;
let world: World;
beforeAll(async () => {
  schema = await freshDatabase();
  world = await enterWorld();
}, 120_000);
afterAll(async () => {
  await closePasswordWorkers();
  await schema.close();
});

const crystal = (name: string) => ({
  name,
  kind: 'clock' as const,
  frequencyHz: 12e6,
  tolerancePpm: 100,
  spread: null,
  note: '',
});

test('a designer declares a clock of an own product, and the lab reads who did', async () => {
  const { id } = await addProductClock(world.designer.actor, world.product.id, crystal('controller clock'));
  const { items } = await listProductClocks(world.technician.actor, world.product.id, { limit: 50 });
  expect(items.find((one) => one.id === id)).toMatchObject({
    name: 'controller clock',
    frequencyHz: 12e6,
    by: { name: world.designer.actor.name },
    withdrawn: null,
  });
});

test('a designer of another client finds neither product nor clock', async () => {
  const { id, version } = await addProductClock(world.technician.actor, world.product.id, crystal('inner clock'));
  const { actor } = world.outsider;
  await expect(listProductClocks(actor, world.product.id, { limit: 50 })).rejects.toMatchObject({ kind: 'not-found' });
  await expect(addProductClock(actor, world.product.id, crystal('x'))).rejects.toMatchObject({ kind: 'not-found' });
  await expect(changeProductClock(actor, id, version, { name: 'x' })).rejects.toMatchObject({ kind: 'not-found' });
  await expect(withdrawProductClock(actor, id, version, { reason: 'x' })).rejects.toMatchObject({ kind: 'not-found' });
});

test('a correction is made on the version that was read, keeps the rest, and is recorded with before and after', async () => {
  const spread = { kind: 'down' as const, pct: 0.5 };
  const body = { ...crystal('spread clock'), spread };
  const clock = await addProductClock(world.technician.actor, world.product.id, body);
  const named = await changeProductClock(world.designer.actor, clock.id, clock.version, { frequencyHz: 25e6 });
  expect(named).toMatchObject({ name: 'spread clock', frequencyHz: 25e6, spread, version: clock.version + 1 });
  await expect(
    changeProductClock(world.technician.actor, clock.id, clock.version, { frequencyHz: 26e6 }),
  ).rejects.toMatchObject({ kind: 'stale-version' });
  const even = await changeProductClock(world.technician.actor, clock.id, named.version, { spread: null });
  expect(even.spread).toBeNull();
  const history = await historyOf(world.manager.actor, 'product', world.product.id);
  const changes = history.filter(({ action }) => action === 'declared clock corrected');
  expect(changes).toHaveLength(2);
});

test('a withdrawn clock stays with its reason and takes no change', async () => {
  const clock = await addProductClock(world.technician.actor, world.product.id, crystal('old clock'));
  const gone = await withdrawProductClock(world.designer.actor, clock.id, clock.version, { reason: 'not fitted' });
  expect(gone.withdrawn).toMatchObject({ reason: 'not fitted', by: { name: world.designer.actor.name } });
  await expect(changeProductClock(world.technician.actor, clock.id, gone.version, { name: 'x' })).rejects.toThrow(
    /withdrawn/,
  );
  await expect(withdrawProductClock(world.technician.actor, clock.id, gone.version, { reason: 'x' })).rejects.toThrow(
    /withdrawn/,
  );
});

test('pages of declared clocks go on by their cursor, each clock once', async () => {
  const first = await listProductClocks(world.technician.actor, world.product.id, { limit: 2 });
  const rest = await listProductClocks(world.technician.actor, world.product.id, { limit: 50, after: first.next! });
  const ids = [...first.items, ...rest.items].map(({ id }) => id);
  expect(new Set(ids).size).toBe(ids.length);
  expect(rest.next).toBeNull();
});

test('at most forty stand declared at once', async () => {
  const { items } = await listProductClocks(world.technician.actor, world.product.id, { limit: 200 });
  const standing = items.filter(({ withdrawn }) => !withdrawn).length;
  for (let i = standing; i < 40; i++) {
    await addProductClock(world.technician.actor, world.product.id, crystal(`clock ${i}`));
  }
  await expect(addProductClock(world.technician.actor, world.product.id, crystal('one more'))).rejects.toThrow(
    /40 declared clocks/,
  );
});
