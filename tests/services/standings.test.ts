import { closePasswordWorkers } from '@/auth/passwordWorker';
import { database } from '@/models/database';
import { createJob } from '@/services/jobs';
import { keepSweep } from '@/services/keepSweep';
import { standingsOfJobs } from '@/services/portVerdict';
import { voidSweep } from '@/services/runActs';
import { createSample, createState } from '@/services/samples';
import { createSweepFile } from '@/services/sweepFiles';
import { freshDatabase, type TestDatabase } from '../support/database';
import { enterWorld, sweepFile, type World } from '../support/world';

/* How jobs stand, read together instead of run by run. */

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

let files = 0;
async function keepRun(stateId: string, at144: number, change: object = {}) {
  const { actor } = world.technician;
  const file = await createSweepFile(actor, sweepFile({ 144: at144 }, `stands-${++files}.csv`));
  return keepSweep(actor, { ...world.choice, ...world.about, fileId: file.id, stateId, ...change });
}

async function newJob() {
  const boss = world.manager.actor;
  const job = await createJob(boss, { productId: world.product.id, title: 'Again', decisionRule: 'guarded-by-u' });
  const sample = await createSample(boss, job.id, { serial: `P2-${++files}`, firmware: '', description: '' });
  return { job, sample, m0: sample.states[0]!.id };
}

test('the newest measured state speaks for its port, by the verdict its run’s sheet tells; trials and voided runs do not', async () => {
  const { job, sample, m0 } = await newJob();
  await keepRun(m0, 70);
  const added = await createState(world.manager.actor, sample.id, { description: 'ferrite', planned: false });
  const m1 = added.states.at(-1)!.id;
  const own = await keepRun(m1, 52);
  await keepRun(m1, 80, { trial: 'lid off' });
  const wrong = await keepRun(m1, 90);
  await voidSweep(world.technician.actor, wrong.id, wrong.version, { reason: 'the wrong cable' });

  const standings = (await standingsOfJobs(world.manager.actor, [job.id])).get(job.id);
  const { worst, verdict } = own.evaluation;
  expect(verdict).toBe('needs-final');
  expect(standings).toEqual([
    {
      port: 'enclosure',
      state: 'M1',
      verdict: own.portVerdict.verdict,
      worst: { frequencyHz: worst!.frequencyHz, marginDb: worst!.marginDb },
    },
  ]);
});

test('another organisation’s job and a job without a run are not in the answer', async () => {
  const { job } = await newJob();
  const ids = [job.id, world.job.id];
  expect([...(await standingsOfJobs(world.designer.actor, ids)).keys()]).toEqual([world.job.id]);
  expect((await standingsOfJobs(world.outsider.actor, ids)).size).toBe(0);
});

test('three jobs take as many queries as one', async () => {
  const query = jest.spyOn(database(), 'query');
  const count = async (ids: string[]) => {
    query.mockClear();
    await standingsOfJobs(world.manager.actor, ids);
    return query.mock.calls.length;
  };
  const others = [await newJob(), await newJob()];
  for (const { m0 } of others) await keepRun(m0, 50);
  const one = await count([world.job.id]);
  expect(await count([world.job.id, ...others.map(({ job }) => job.id)])).toBe(one);
  expect(one).toBeLessThan(8);
  query.mockRestore();
});
