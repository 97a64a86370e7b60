import { createHash } from 'node:crypto';
import type { Actor } from '@/auth/actor';
import { preparePhoto } from '@/http/image';
import { setupBody } from '@/schemas/setup';
import { addPhoto } from '@/services/photos';
import { writeSetup } from '@/services/setup';
import { listSweeps } from '@/services/sweeps';
import { drawPlan } from './drawPlan';
import type { SeededPeople } from './seedPeople';

type Run = Awaited<ReturnType<typeof listSweeps>>['items'][number];

const TABLE = {
  operatingMode: 'Full load, 5 m of strip',
  supplyKind: 'ac',
  supplyV: 230,
  supplyFrequencyHz: 50,
  ancillary: 'resistive load in place of the last metre of strip',
  deviations: 'none',
};

/** Set-ups of a few runs of the newest state of one sample: whole with its plan, corrected once, and one that strayed. */
export async function seedSetups(
  people: SeededPeople,
  states: Map<string, string>,
  at: (day: number, time?: string) => Date,
): Promise<number> {
  const actor = people.actor('mira');
  const { items } = await listSweeps(actor, { stateId: states.get('ld40-m2')!, limit: 50 });
  const runs = items.filter(({ trial }) => trial === null);
  const one = (fits: (run: Run) => boolean) => runs.find(fits)!;
  const write = (run: Run, said: object, when: Date) => writeSetup(actor, run.id, setupBody.parse(said), when);

  const final = one((run) => run.purpose === 'final' && run.polarisation === 'horizontal');
  const lying = { ...TABLE, cableLayout: 'mains lead down at the rear, bundled 0.4 m above the plane; strip in an S' };
  const climate = { temperatureC: 21.5, humidityPct: 44, eutStayed: 'yes', supplySource: 'laboratory source' };
  await write(final, { ...lying, ...climate }, at(-1, '13:52'));
  await addPlan(actor, final, at(-1, '13:54'));

  const mains = one((run) => run.port === 'ac-mains' && run.line === 'L');
  const through = { ...TABLE, supplySource: 'mains through the AMN', cableLayout: 'mains lead of 0.8 m, not bundled' };
  await write(mains, { ...through, temperatureC: 25.1, eutStayed: 'not-watched' }, at(-1, '10:15'));
  const reason = 'temperature was read inside the enclosure';
  const corrected = { ...through, temperatureC: 21.2, humidityPct: 45, eutStayed: 'not-watched', corrects: 1, reason };
  await write(mains, corrected, at(-1, '10:40'));

  const prescan = one((run) => run.purpose === 'prescan' && run.polarisation === 'vertical');
  const whatHappened = 'dimmed itself to half load for three minutes at 300 MHz, then came back';
  await write(prescan, { ...lying, temperatureC: 21.3, eutStayed: 'no', whatHappened }, at(-1, '11:58'));
  return 3;
}

async function addPlan(actor: Actor, run: Run, when: Date): Promise<void> {
  const bytes = await drawPlan();
  const sha256 = createHash('sha256').update(bytes).digest('hex');
  const prepared = { sha256, sentBytes: bytes.length, ...(await preparePhoto(bytes)) };
  await addPhoto(actor, run.id, prepared, 'Plan of the table, drawn: EUT, its leads and the antenna', when);
}
