import { closePasswordWorkers } from '@/auth/passwordWorker';
import { Conflict } from '@/errors';
import { Job } from '@/models/job';
import { ModificationState } from '@/models/modificationState';
import { Sample } from '@/models/sample';
import { unitOfWork } from '@/models/unitOfWork';
import { changeJob, createJob, readJob } from '@/services/jobs';
import { changeSample, changeState, createSample, createState, lockOpenJob, readSample } from '@/services/samples';
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

const SAMPLE = { serial: 'P2-0300', firmware: '', description: '' };
const open = () =>
  createJob(world.manager.actor, { productId: world.product.id, title: 'LD-40', decisionRule: 'guarded-by-u' });
const turn = async (id: string, state: 'open' | 'closed') => {
  const { version } = await readJob(world.manager.actor, id);
  return changeJob(world.manager.actor, id, version, { state });
};
const enter = (jobId: string) => createSample(world.technician.actor, jobId, SAMPLE);

test('a closed job takes no sample and no change to what it holds; reopened, it does', async () => {
  const { technician } = world;
  const job = await open();
  const sample = await enter(job.id);
  const state = sample.states[0]!;
  await turn(job.id, 'closed');
  const tries = [
    () => enter(job.id),
    () => changeSample(technician.actor, sample.id, sample.version, { firmware: '2' }),
    () => createState(technician.actor, sample.id, { description: 'ferrite', planned: false }),
    () => changeState(technician.actor, state.id, state.version, { description: 'opened' }),
  ];
  for (const attempt of tries) {
    await expect(attempt()).rejects.toThrow(Conflict);
    await expect(attempt()).rejects.toThrow(`Job ${job.number} is closed. Reopen it first.`);
  }
  expect(await readSample(technician.actor, sample.id)).toEqual(sample);
  expect((await readJob(technician.actor, job.id)).samples).toBe(1);
  await turn(job.id, 'open');
  for (const attempt of tries) await attempt();
});

/** Holds a row in a unit of its own until `release`; resolves once it is held. */
async function holding(take: () => Promise<unknown>, then: () => Promise<unknown> = async () => undefined) {
  let release!: () => void;
  const released = new Promise<void>((resolve) => (release = resolve));
  let held!: () => void;
  const isHeld = new Promise<void>((resolve) => (held = resolve));
  const done = unitOfWork(async () => {
    await take();
    held();
    await released;
    await then();
  });
  await isHeld;
  return { release, done };
}

const pause = () => new Promise((resolve) => setTimeout(resolve, 150));

test('whoever comes while a job is being closed waits, and then finds it closed', async () => {
  const { id } = await open();
  const row = await unitOfWork(() => Job.findOne({ where: { publicId: id }, rejectOnEmpty: true }));
  const close = () => Job.update({ state: 'closed' }, { where: { id: row.id } });
  const closing = await holding(close);
  const entering = enter(id);
  const settled = jest.fn();
  entering.then(settled, settled);
  await pause();
  expect(settled).not.toHaveBeenCalled();
  closing.release();
  await closing.done;
  await expect(entering).rejects.toThrow(Conflict);
  expect(await unitOfWork(() => Sample.count({ where: { jobId: row.id } }))).toBe(0);
});

test('a job with an entry under way is closed after it, not around it', async () => {
  const { id } = await open();
  const row = await unitOfWork(() => Job.findOne({ where: { publicId: id }, rejectOnEmpty: true }));
  const entry = await holding(
    () => lockOpenJob(row.id),
    () => enter(id),
  );
  const closing = turn(id, 'closed');
  const settled = jest.fn();
  closing.then(settled, settled);
  await pause();
  expect(settled).not.toHaveBeenCalled();
  entry.release();
  await entry.done;
  expect(await closing).toMatchObject({ state: 'closed', samples: 1 });
});

test('of many entries and one close at once, each sample was entered before the close', async () => {
  const { id } = await open();
  const entries = Promise.allSettled(Array.from({ length: 6 }, () => enter(id)));
  const [entered, closed] = await Promise.all([entries, turn(id, 'closed')]);
  const taken = entered.filter(({ status }) => status === 'fulfilled').length;
  for (const one of entered) if (one.status === 'rejected') expect(one.reason).toBeInstanceOf(Conflict);
  expect(closed.samples).toBe(taken);
  expect((await readJob(world.manager.actor, id)).samples).toBe(taken);
});

test('a state is marked as planned only while it holds no run, counted with the state in hand', async () => {
  const { technician, sample } = world;
  const measured = (await readSample(technician.actor, sample.id)).states[0]!;
  const plan = (version: number, id: string) => changeState(technician.actor, id, version, { planned: true });
  await expect(plan(measured.version, measured.id)).rejects.toThrow('has been measured');

  const with1 = await createState(technician.actor, sample.id, { description: 'ferrite', planned: false });
  const fresh = with1.states.at(-1)!;
  const held = await holding(() =>
    ModificationState.update({ createdAt: new Date() }, { where: { publicId: fresh.id } }),
  );
  const planning = plan(fresh.version, fresh.id);
  const settled = jest.fn();
  planning.then(settled, settled);
  await pause();
  expect(settled).not.toHaveBeenCalled();
  held.release();
  await held.done;
  expect((await planning).states.at(-1)).toMatchObject({ planned: true, version: fresh.version + 1 });
});

test('two that change a job from the same version: one is told to look again', async () => {
  const { id, version } = await open();
  const rename = (title: string) => changeJob(world.manager.actor, id, version, { title });
  const both = await Promise.allSettled([rename('one'), rename('two')]);
  expect(both.map(({ status }) => status).sort()).toEqual(['fulfilled', 'rejected']);
});

test('the year in a job number is the lab’s, not Greenwich’s', async () => {
  const { Setting } = await import('@/models/setting');
  const value = { name: 'Harrow Lane EMC Bench', zone: 'Pacific/Auckland', jobPrefix: 'HL' };
  await unitOfWork(() => Setting.update({ value }, { where: { name: 'lab' } }));
  const body = { productId: world.product.id, title: 'early', decisionRule: 'guarded-by-u' } as const;
  const at = (instant: string) => createJob(world.manager.actor, body, new Date(instant));
  // 12:30 UTC on the last of December is half past one in the morning there
  expect((await at('2030-12-31T12:30:00Z')).number).toBe('HL-3101');
  expect((await at('2030-12-31T10:30:00Z')).number).toBe('HL-3001');
});
