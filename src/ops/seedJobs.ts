import { generateFile, timesOf } from '@fixtures/demo/files';
import { runs as demoRuns } from '@fixtures/demo/runs/all';
import { jobNumber, jobs as demoJobs, products as demoProducts, samples as demoSamples } from '@fixtures/demo/story';
import type { DemoState } from '@fixtures/demo/types';
import { Counter } from '@/models/counter';
import type { LimitSet } from '@/models/limitSet';
import { SignalPath } from '@/models/signalPath';
import { changeJob, createJob, listJobs } from '@/services/jobs';
import { keepSweep } from '@/services/keepSweep';
import { createProduct } from '@/services/products';
import { createSample, createState } from '@/services/samples';
import { createSweepFile } from '@/services/sweepFiles';
import type { SeededPeople } from './seedPeople';

/** Lets the next number of a scope be `value`; the story names its jobs and samples. */
async function continueAt(scope: string, value: number): Promise<void> {
  await Counter.upsert({ scope, value: value - 1 });
}

export interface SeededStates {
  /** Public ids by the story's keys; a state is there once it was entered. */
  states: Map<string, string>;
  /** Enters every modification of the story up to a day, so that each is fitted after what was measured before it. */
  fitUntil: (day: number) => Promise<void>;
}

/** Products, jobs and samples in their first state; the modifications follow as the story goes on. */
export async function seedJobs(people: SeededPeople, at: (day: number) => Date): Promise<SeededStates> {
  const manager = people.actor('anselm');
  const products = new Map<string, string>();
  for (const { key, organisation, code, name, description } of demoProducts) {
    const organisationId = people.organisation(organisation).publicId;
    products.set(key, (await createProduct(manager, { organisationId, code, name, description })).id);
  }
  const jobs = new Map<string, string>();
  for (const job of [...demoJobs].sort((a, b) => a.openedDay - b.openedDay)) {
    const opened = at(job.openedDay);
    await continueAt(`job-${opened.getUTCFullYear()}`, job.sequence);
    const { title, decisionRule } = job;
    const { id } = await createJob(manager, { productId: products.get(job.product)!, title, decisionRule }, opened);
    jobs.set(job.key, id);
  }
  const states = new Map<string, string>();
  const modifications: { sampleId: string; position: number; state: DemoState; day: number }[] = [];
  for (const sample of [...demoSamples].sort((a, b) => a.receivedDay - b.receivedDay)) {
    const number = Number(sample.code.replace(/\D/g, ''));
    await continueAt('sample', number);
    const { id: sampleId, states: first } = await createSample(
      manager,
      jobs.get(sample.job)!,
      { serial: sample.serial, firmware: '', description: '' },
      at(sample.receivedDay),
    );
    states.set(sample.states[0]!.key, first[0]!.id);
    sample.states.forEach((state, position) => {
      const day = state.status === 'planned' ? -1 : state.day;
      if (position > 0) modifications.push({ sampleId, position, state, day });
    });
  }
  modifications.sort((a, b) => a.day - b.day || a.position - b.position);
  const fitUntil = async (day: number) => {
    while (modifications.length > 0 && modifications[0]!.day <= day) {
      const { sampleId, position, state, day: entered } = modifications.shift()!;
      const body = { description: state.description, planned: state.status === 'planned' };
      const view = await createState(manager, sampleId, body, at(entered));
      states.set(state.key, view.states[position]!.id);
    }
  };
  return { states, fitUntil };
}

/** Every run of the story, oldest first, through upload and keep; afterwards jobs that ended are closed. Answers how many. */
export async function seedRuns(
  people: SeededPeople,
  { states, fitUntil }: SeededStates,
  sets: Map<string, LimitSet>,
  seedDay: string,
): Promise<number> {
  const paths = new Map((await SignalPath.findAll()).map((path) => [path.code, path.publicId]));
  for (const run of demoRuns) {
    await fitUntil(run.measuredAt.day);
    const actor = people.actor(run.by);
    const { measuredAt, keptAt } = timesOf(run, seedDay);
    const file = await createSweepFile(actor, generateFile(run, seedDay));
    const {
      purpose,
      port,
      operatingMode,
      line,
      polarisation,
      heightM,
      heightSwept,
      azimuthDeg,
      distanceM,
      valuesHold,
    } = run;
    const { alreadyCorrected, frequencyUnit, traces } = run;
    await keepSweep(
      actor,
      {
        fileId: file.id,
        stateId: states.get(run.state)!,
        purpose,
        port,
        operatingMode,
        line,
        polarisation,
        heightM,
        heightSwept,
        azimuthDeg,
        distanceM,
        pathId: paths.get(run.path)!,
        limitSetId: sets.get(run.limitSet)!.publicId,
        valuesHold,
        alreadyCorrected,
        frequencyUnit,
        centreHz: null,
        sweepIndex: null,
        keepPartial: false,
        traces,
        measuredAt,
        trial: run.trial,
      },
      new Date(keptAt),
    );
  }
  await fitUntil(Infinity);
  await endJobs(people, seedDay);
  return demoRuns.length;
}

async function endJobs(people: SeededPeople, seedDay: string): Promise<void> {
  const manager = people.actor('anselm');
  const { items } = await listJobs(manager, { limit: 200 });
  for (const job of demoJobs) {
    if (job.status === 'open') continue;
    const row = items.find(({ number }) => number === jobNumber(job, seedDay))!;
    const ended = new Date(`${seedDay}T12:00:00Z`);
    ended.setUTCDate(ended.getUTCDate() + (job.closedDay ?? job.openedDay));
    await changeJob(manager, row.id, row.version, { state: job.status, stateReason: job.statusReason }, ended);
  }
}
