import { closePasswordWorkers } from '@/auth/passwordWorker';
import { evaluateSweep, listEvaluations } from '@/services/evaluations';
import { changeJob, createJob } from '@/services/jobs';
import { previewSweepFile } from '@/services/judgeFile';
import { keepSweep } from '@/services/keepSweep';
import { createSample } from '@/services/samples';
import { createSweepFile } from '@/services/sweepFiles';
import { readSweep } from '@/services/sweeps';
import { readWorking } from '@/services/sweepWorking';
import type { JobView } from '@/schemas/job';
import { freshDatabase, type TestDatabase } from '../support/database';
import { enterWorld, sweepFile, type World } from '../support/world';

/* A level of 38 dBµV/m against 40: 2 dB under, with U 5 dB (k = 2) and Ucispr 6.3 dB. */

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

const AT = { frequencyHz: 144e6, trace: 0 };

async function jobWith(decisionRule: JobView['decisionRule']) {
  const { manager, technician, product } = world;
  const job = await createJob(manager.actor, { productId: product.id, title: decisionRule, decisionRule });
  const sample = await createSample(technician.actor, job.id, { serial: decisionRule, firmware: '', description: '' });
  return { job, stateId: sample.states[0]!.id };
}

/** A final in the line's own detector and bandwidth, kept under a state. */
async function finalUnder(stateId: string) {
  const { technician, choice, about } = world;
  const file = await createSweepFile(technician.actor, sweepFile({ 144: 52 }, `${stateId}.csv`));
  const as = {
    ...choice,
    purpose: 'final' as const,
    traces: [{ ...choice.traces[0]!, detector: 'quasi-peak' as const }],
  };
  const preview = await previewSweepFile(technician.actor, file.id, { ...as, stateId });
  return { preview, run: await keepSweep(technician.actor, { ...as, ...about, stateId, fileId: file.id }) };
}

test.each([
  ['guarded-by-u', 'inconclusive', 0],
  ['cispr-16-4-2', 'under', 0],
  ['simple-acceptance', 'under', 0],
] as const)(
  'by %s a margin of 2 dB with U 5 dB is %s: previewed, kept and in the Working',
  async (rule, verdict, added) => {
    const { stateId } = await jobWith(rule);
    const { preview, run } = await finalUnder(stateId);
    expect(preview).toMatchObject({ decisionRule: rule, worst: { verdict } });
    expect(run.evaluation).toMatchObject({ decisionRule: rule, worst: { verdict } });
    const working = await readWorking(world.designer.actor, run.id, AT);
    expect(working).toMatchObject({ decisionRule: rule, addedDb: added, verdict, uncertaintyDb: 5 });
  },
);

test('another rule of the job judges nothing by itself; judged again, the history names both rules', async () => {
  const { manager, technician } = world;
  const { job, stateId } = await jobWith('cispr-16-4-2');
  const { run } = await finalUnder(stateId);
  await changeJob(manager.actor, job.id, job.version, { decisionRule: 'guarded-by-u' });
  expect((await readSweep(technician.actor, run.id)).evaluation).toMatchObject({ worst: { verdict: 'under' } });
  expect((await readWorking(technician.actor, run.id, AT)).decisionRule).toBe('cispr-16-4-2');
  const { newer } = await listEvaluations(technician.actor, run.id, { limit: 5 });
  expect(newer).toEqual(['The decision rule is guarded by U now.']);

  const again = await evaluateSweep(technician.actor, run.id, { reason: 'the client asked for it' });
  expect(again.sweep.evaluation).toMatchObject({ decisionRule: 'guarded-by-u', worst: { verdict: 'inconclusive' } });
  expect(again.evaluation.changes).toEqual(['decision rule: guarded by U, before that CISPR 16-4-2']);
});

test('while no state is said a file is previewed guarded by U, and a state of another lab is refused', async () => {
  const { technician, choice, file } = world;
  const unsaid = await previewSweepFile(technician.actor, file.id, { ...choice, stateId: null });
  expect(unsaid.decisionRule).toBe('guarded-by-u');
  const stranger = previewSweepFile(technician.actor, file.id, { ...choice, stateId: '0000000000000000' });
  await expect(stranger).rejects.toMatchObject({ issues: [{ pointer: '/stateId' }] });
});
