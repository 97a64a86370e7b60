import { readdirSync } from 'node:fs';
import path from 'node:path';
import { closePasswordWorkers } from '@/auth/passwordWorker';
import { mayRole } from '@/auth/permissions';
import type { RouteHandler } from '@/http/handle';
import type { Operation } from '@/schemas/operation';
import { OPERATIONS } from '@/schemas/operations';
import { addProductClock } from '@/services/clocks';
import { keepSweep } from '@/services/keepSweep';
import { previewResultMail } from '@/services/resultMails';
import { listRetests, readRetest } from '@/services/retests';
import { createSample } from '@/services/samples';
import { createSweepFile } from '@/services/sweepFiles';
import { PASSWORD } from '../auth/people';
import { freshDatabase, type TestDatabase } from '../support/database';
import { enterWorld, pixel, sweepFile, type Somebody, type World } from '../support/world';

/* Every operation of the API × who asks: nobody, each role, the own and another organisation. */

const ORIGIN = 'http://localhost:3000';
const API = path.resolve(__dirname, '../../src/app/api');

let schema: TestDatabase;
let world: World;
const handlers = new Map<string, RouteHandler>();

beforeAll(async () => {
  schema = await freshDatabase();
  world = await enterWorld();
  retestId = await enterRetest(world);
  clockIds = await enterClocks(world);
  for (const file of readdirSync(API, { recursive: true, encoding: 'utf8' })) {
    if (!file.endsWith('route.ts')) continue;
    const module = (await import(path.join(API, file))) as Record<string, RouteHandler>;
    for (const handler of Object.values(module)) {
      if (handler.operation) handlers.set(handler.operation.id, handler);
    }
  }
}, 120_000);
afterAll(async () => {
  await closePasswordWorkers();
  await schema.close();
});

interface Sample {
  params?: (w: World) => string;
  query?: string | ((w: World) => string);
  body?: (w: World) => unknown;
  /** What is uploaded instead of a sweep file. */
  file?: () => { name: string; bytes: Uint8Array<ArrayBuffer> };
}

const stateOf = (w: World) => w.sample.states[0]!;
const resultAsked = (w: World) => ({ stateId: stateOf(w).id, recipientIds: [w.designer.actor.publicId], note: '' });

let turn = 0;
/** The two spare runs by turns: what the manager did to one, the technician does to the other. */
const spareOf = (w: World) => w.spares[turn++ % 2]!.id;

/** A retest of a sample of its own, which no other operation touches. */
let retestId = '';

async function enterRetest({ technician, job, choice, about }: World): Promise<string> {
  const sample = await createSample(technician.actor, job.id, { serial: 'P2-0777', firmware: '', description: '' });
  const file = await createSweepFile(technician.actor, sweepFile());
  await keepSweep(technician.actor, { ...choice, ...about, stateId: sample.states[0]!.id, fileId: file.id });
  return (await listRetests(technician.actor, { limit: 1, sampleId: sample.id })).items[0]!.id;
}

/** Declared clocks: the first is read and changed, each other one is withdrawn by one role. */
let clockIds: string[] = [];

async function enterClocks({ technician, product }: World): Promise<string[]> {
  const clock = { kind: 'clock' as const, tolerancePpm: 100, spread: null, note: '' };
  const ids: string[] = [];
  for (const mhz of [12, 16, 24, 25]) {
    const body = { ...clock, name: `${mhz} MHz`, frequencyHz: mhz * 1e6 };
    ids.push((await addProductClock(technician.actor, product.id, body)).id);
  }
  return ids;
}

/** A final for that retest. */
async function typedFinals(w: World) {
  const { state } = await readRetest(w.technician.actor, retestId);
  return {
    ...{ stateId: state.id, port: 'enclosure', polarisation: 'horizontal', distanceM: 3 },
    ...{ pathId: w.choice.pathId, limitSetId: w.choice.limitSetId, operatingMode: 'full light' },
    ...{ valuesHold: 'receiver-input', unit: 'dBuV' },
    finals: [
      { retestIds: [retestId], frequencyHz: 144e6, rbwHz: 120e3, readings: [{ detector: 'quasi-peak', level: 47 }] },
    ],
  };
}

/** What makes each operation do something when the asker may; a missing row fails the test below. */
const SAMPLES: Record<string, Sample> = {
  signIn: { body: () => ({ email: 'nobody@harrowlane.example', password: 'wrong' }) },
  signOut: {},
  readMe: {},
  listSessions: {},
  endSession: { params: () => '0000000000000000' },
  requestPasswordReset: { body: () => ({ email: 'nobody@harrowlane.example' }) },
  resetPassword: { body: () => ({ token: 'x'.repeat(43), password: 'another tidal copper mast' }) },
  readLink: { body: () => ({ kind: 'reset', token: 'x'.repeat(43) }) },
  acceptInvitation: { body: () => ({ token: 'x'.repeat(43), password: 'another tidal copper mast' }) },
  changeOwnPassword: { body: () => ({ current: PASSWORD, password: 'another tidal copper mast' }) },
  listPeople: {},
  readPerson: { params: (w) => w.invited.id },
  invitePerson: {
    body: (w) => ({
      name: 'Ilse Marrow',
      email: `ilse${Math.random()}@pellorrin.example`,
      role: 'designer',
      organisationId: w.client.publicId,
    }),
  },
  inviteAgain: { params: (w) => w.invited.id },
  changePerson: { params: (w) => w.invited.id, body: () => ({ name: 'Odo Fenn' }) },
  disablePerson: { params: (w) => w.invited.id, body: () => ({ reason: 'left the client' }) },
  enablePerson: { params: (w) => w.invited.id, body: () => ({ reason: 'came back' }) },
  listOrganisations: {},
  listProducts: {},
  readProduct: { params: (w) => w.product.id },
  createProduct: { body: (w) => ({ organisationId: w.client.publicId, code: `X-${Math.random()}`, name: 'X' }) },
  changeProduct: { params: (w) => w.product.id, body: () => ({ description: 'changed' }) },
  listProductClocks: { params: (w) => w.product.id },
  addProductClock: {
    params: (w) => w.product.id,
    body: () => ({ name: 'converter', kind: 'converter', frequencyHz: 65e3, tolerancePpm: 20e3 }),
  },
  readProductClock: { params: () => clockIds[0]! },
  changeProductClock: { params: () => clockIds[0]!, body: () => ({ note: 'on the main board' }) },
  withdrawProductClock: { params: () => clockIds[1 + (turn++ % 3)]!, body: () => ({ reason: 'not fitted any more' }) },
  listJobs: {},
  readJob: { params: (w) => w.job.id },
  createJob: { body: (w) => ({ productId: w.product.id, title: 'another' }) },
  changeJob: { params: (w) => w.job.id, body: () => ({ title: 'renamed' }) },
  listSamples: {},
  readSample: { params: (w) => w.sample.id },
  createSample: { params: (w) => w.job.id, body: () => ({ serial: 'P2-0200' }) },
  changeSample: { params: (w) => w.sample.id, body: () => ({ firmware: '1.2' }) },
  createState: { params: (w) => w.sample.id, body: () => ({ description: 'ferrite' }) },
  changeState: { params: (w) => stateOf(w).id, body: () => ({ description: 'as received, lid on' }) },
  listPaths: {},
  readPath: { params: (w) => w.choice.pathId! },
  reviseUncertainty: {
    params: (w) => w.choice.pathId!,
    body: () => {
      const site = { name: 'site', valueDb: 5, distribution: { shape: 'triangular' }, source: 'made for tests' };
      const ranges = [{ startHz: 30e6, stopHz: 1e9, contributions: [site] }];
      return { budget: { prescan: ranges, final: ranges }, uncertaintySource: 'made for tests', reason: 'a sample' };
    },
  },
  listLimitSets: {},
  listEquipment: {},
  readEquipment: { params: (w) => w.items[1]!.equipmentId },
  readLimitSet: { params: (w) => w.limitSet.publicId },
  createLimitSet: {
    body: (w) => ({
      name: `set ${Math.random()}`,
      port: 'enclosure',
      distanceM: 3,
      lineIds: [w.limitLine.publicId],
      reason: 'a sample',
    }),
  },
  listFactorTables: {},
  readFactorTable: { params: (w) => w.items[1]!.tables.any },
  downloadFactorTable: { params: (w) => w.items[1]!.tables.any },
  previewFactorTable: { body: (w) => ({ fileId: w.tableFile.id, equipmentId: w.items[1]!.equipmentId, tables: [] }) },
  enterFactorTables: {
    body: (w) => ({
      fileId: w.tableFile.id,
      equipmentId: w.items[1]!.equipmentId,
      tables: [{ index: 0, name: `table ${Math.random()}`, quantity: null, revises: null }],
      calibration: { certificate: 'C-9', laboratory: 'invented', calibratedOn: '2024-05-06', dueOn: null },
      source: 'certificate C-9',
      reason: 'a sample',
    }),
  },
  listLimitLines: {},
  readLimitLine: { params: (w) => w.limitLine.publicId },
  downloadLimitLine: { params: (w) => w.limitLine.publicId },
  previewLimitLine: { body: (w) => ({ fileId: w.lineFile.id }) },
  enterLimitLine: {
    body: (w) => ({
      ...{ fileId: w.lineFile.id, unit: 'dBuV/m', name: 'a line', document: 'X 1', class: 'B', port: 'enclosure' },
      ...{ detector: 'quasi-peak', bandwidthHz: 120e3, distanceM: 3, source: 'table 1', basis: 'from memory' },
      reason: 'a sample',
    }),
  },
  createSweepFile: {},
  readSweepFile: { params: (w) => w.file.id },
  previewSweepFile: { params: (w) => w.file.id, body: (w) => w.choice },
  keepSweep: { body: (w) => ({ ...w.choice, ...w.about, fileId: w.file.id }) },
  findEverywhere: { query: '?q=LD-40' },
  listCustody: { params: (w) => w.sample.id },
  moveSample: { params: (w) => w.sample.id, body: () => ({ place: 'shelf 3' }) },
  listNotes: { query: (w) => `?sampleId=${w.sample.id}` },
  createNote: { body: (w) => ({ sampleId: w.sample.id, text: 'the lid rattles', audience: 'client' }) },
  listPositions: {},
  readPosition: { params: (w) => w.position.id },
  enterPosition: { body: () => ({ code: `X${Math.floor(Math.random() * 1e6)}`, name: 'another' }) },
  changePosition: { params: (w) => w.position.id, body: () => ({ name: '3 m chamber, north' }) },
  listBookings: { query: '?from=2031-01-01T00:00:00Z' },
  readBooking: { params: (w) => w.booking.id },
  createBooking: { body: (w) => ({ ...w.slot, startsAt: '2031-01-08T09:00:00Z', endsAt: '2031-01-08T10:00:00Z' }) },
  changeBooking: { params: (w) => w.booking.id, body: () => ({ endsAt: '2031-01-07T12:00:00Z' }) },
  cancelBooking: { params: (w) => w.spareBooking.id, body: () => ({ reason: 'the sample comes later' }) },
  listResultMails: {},
  listResultMailRecipients: { query: (w) => `?stateId=${stateOf(w).id}` },
  previewResultMail: { body: resultAsked },
  sendResultMail: {
    body: async (w) => ({
      ...resultAsked(w),
      digest: (await previewResultMail(w.manager.actor, resultAsked(w))).digest,
    }),
  },
  listSweeps: {},
  readSweep: { params: (w) => w.run.id },
  readWindow: { params: (w) => w.run.id, query: '?fromHz=100e6&toHz=200e6&columns=64' },
  listCandidates: { params: (w) => w.run.id },
  readWorking: { params: (w) => w.run.id, query: '?frequencyHz=144e6&trace=0' },
  readReceiverCheck: { params: (w) => w.run.id },
  readLikelySources: { params: (w) => w.run.id },
  downloadSweepFile: { params: (w) => w.run.id },
  refileSweep: { params: spareOf, body: (w) => ({ stateId: stateOf(w).id, reason: 'dropped on the wrong sample' }) },
  voidSweep: { params: spareOf, body: () => ({ reason: 'the mast stood still' }) },
  restoreSweep: { params: spareOf, body: () => ({ reason: 'the log says it moved' }) },
  listEvaluations: { params: (w) => w.run.id },
  evaluateSweep: { params: spareOf, body: () => ({ reason: 'asked by the client' }) },
  compareSweeps: { query: (w) => `?a=${w.run.id}&b=${w.run.id}` },
  readSetup: { params: (w) => w.run.id },
  writeSetup: { params: spareOf, body: () => ({ temperatureC: 21, eutStayed: 'yes' }) },
  listSetupRevisions: { params: (w) => w.run.id },
  addPhoto: { params: (w) => w.run.id, file: pixel },
  listPhotos: { params: (w) => w.run.id },
  readPhoto: { params: (w) => w.photos[0]!.id },
  changePhoto: { params: (w) => w.photos[0]!.id, body: () => ({ caption: 'the table from the door' }) },
  withdrawPhoto: { params: (w) => w.photos[1 + (turn++ % 2)]!.id, body: () => ({ reason: 'another sample is in it' }) },
  downloadPhoto: { params: (w) => w.photos[0]!.id },
  listRetests: {},
  readRetest: { params: () => retestId },
  changeRetest: { params: () => retestId, body: () => ({ act: 'schedule', note: 'beside the next samples' }) },
  downloadFrequencyList: {},
  previewFinals: { body: typedFinals },
  keepFinals: { body: typedFinals },
};

/** A run can be voided while it has a voice, and restored while it has none. */
async function giveVoice(id: string, voice: boolean): Promise<void> {
  const { readSweep } = await import('@/services/sweeps');
  const { restoreSweep, voidSweep } = await import('@/services/runActs');
  const { actor } = world.technician;
  const run = await readSweep(actor, id);
  if ((run.voided === null) === voice) return;
  await (voice ? restoreSweep : voidSweep)(actor, id, run.version, { reason: 'for the next test' });
}

/** A change names the version that is current now; two allowed roles may have changed it before. */
async function versionFor(op: Operation, id: string | undefined): Promise<string> {
  const reader: Record<string, [string, string]> = {
    changePerson: ['readPerson', world.invited.id],
    disablePerson: ['readPerson', world.invited.id],
    enablePerson: ['readPerson', world.invited.id],
    changeProduct: ['readProduct', world.product.id],
    changeJob: ['readJob', world.job.id],
    changeSample: ['readSample', world.sample.id],
    changeState: ['readSample', world.sample.id],
    changePosition: ['readPosition', world.position.id],
    changeBooking: ['readBooking', world.booking.id],
    cancelBooking: ['readBooking', world.spareBooking.id],
    refileSweep: ['readSweep', id!],
    voidSweep: ['readSweep', id!],
    restoreSweep: ['readSweep', id!],
    changePhoto: ['readPhoto', id!],
    withdrawPhoto: ['readPhoto', id!],
    changeRetest: ['readRetest', id!],
    reviseUncertainty: ['readPath', id!],
    changeProductClock: ['readProductClock', id!],
    withdrawProductClock: ['readProductClock', id!],
  };
  const [read, record] = reader[op.id]!;
  const answer = await handlers.get(read)!(new Request(`${ORIGIN}/x`, { headers: { cookie: world.manager.cookie } }), {
    params: Promise.resolve({ id: record }),
  });
  const view = (await answer.json()) as { version: number; states?: { id: string; version: number }[] };
  const state = view.states?.find((one) => one.id === stateOf(world).id);
  return `"${op.id === 'changeState' ? state!.version : view.version}"`;
}

async function ask(op: Operation, who: Somebody | null): Promise<Response> {
  const sample = SAMPLES[op.id]!;
  const headers = new Headers({ origin: ORIGIN });
  if (who) headers.set('cookie', who.cookie);
  const id = sample.params?.(world);
  if (op.id === 'restoreSweep') await giveVoice(id!, false);
  if (op.id === 'voidSweep' || op.id === 'evaluateSweep') await giveVoice(id!, true);
  if (op.ifMatch) headers.set('if-match', await versionFor(op, id));
  const url =
    ORIGIN +
    op.path.replace('{id}', id ?? '') +
    (typeof sample.query === 'function' ? sample.query(world) : (sample.query ?? ''));
  let body: BodyInit | null = null;
  if (op.upload) {
    const { name, bytes } = (sample.file ?? sweepFile)();
    const form = new FormData();
    form.append('file', new File([bytes], name));
    body = form;
  } else if (sample.body) {
    headers.set('content-type', 'application/json');
    body = JSON.stringify(await sample.body(world));
  }
  const request = new Request(url, { method: op.method, headers, body });
  return handlers.get(op.id)!(request, { params: Promise.resolve(id === undefined ? {} : { id }) });
}

test('every operation has one route handler, and every handler an operation', () => {
  expect([...handlers.keys()].sort()).toEqual(OPERATIONS.map((op) => op.id).sort());
});

test('every operation has a sample to ask it with', () => {
  expect(Object.keys(SAMPLES).sort()).toEqual(OPERATIONS.map((op) => op.id).sort());
});

test('operation ids and method-and-path pairs are unique', () => {
  const pairs = OPERATIONS.map((op) => `${op.method} ${op.path}`);
  expect(new Set(pairs).size).toBe(pairs.length);
  expect(new Set(OPERATIONS.map((op) => op.id)).size).toBe(OPERATIONS.length);
});

const guarded = OPERATIONS.filter((op) => op.permission !== null);

test.each(guarded.map((op) => [op.id, op] as const))('%s: nobody is answered 401', async (_id, op) => {
  const answer = await ask(op, null);
  expect([answer.status, answer.headers.get('content-type')]).toEqual([401, 'application/problem+json']);
});

const ROLES = ['manager', 'technician', 'designer'] as const;
const matrix = guarded.flatMap((op) => ROLES.map((role) => [op.id, role, op] as const));

test.each(matrix)('%s as %s: done when the table allows it, 403 when not', async (_id, role, op) => {
  const answer = await ask(op, world[role]);
  if (!mayRole(role, op.permission!)) expect(answer.status).toBe(403);
  else if (op.id === 'endSession') expect(answer.status).toBe(404);
  else expect([answer.status, answer.ok ? '' : await answer.text()]).toEqual([op.status, '']);
  if (op.id === 'signOut' && answer.ok) {
    const { signIn } = await import('@/services/sessions');
    const { cookieOf, PASSWORD } = await import('../auth/people');
    const { email } = world[role].actor;
    const again = await signIn({ email, password: PASSWORD }, { address: '127.0.0.1', agent: 'test' });
    world[role].cookie = cookieOf(again.cookie);
  }
});

const ofOneRecord = guarded.filter((op) => mayRole('designer', op.permission!) && op.path.includes('{id}'));

test.each(ofOneRecord.map((op) => [op.id, op] as const))(
  '%s: a designer of another organisation is answered 404, as for a record that does not exist',
  async (_id, op) => {
    const answer = await ask(op, world.outsider);
    expect(answer.status).toBe(404);
    expect(await answer.text()).not.toMatch(/Pell|LD-40|HL-/);
  },
);

const lists = ['listProducts', 'listJobs', 'listSamples', 'listSweeps', 'listRetests'];

test.each(lists)('%s: a designer sees the own organisation’s records and no other', async (id) => {
  const op = OPERATIONS.find((one) => one.id === id)!;
  const own = (await (await ask(op, world.designer)).json()) as { items: unknown[] };
  const other = (await (await ask(op, world.outsider)).json()) as { items: unknown[] };
  expect(own.items.length).toBeGreaterThan(0);
  expect(other.items).toEqual([]);
});

test('a list filtered by another organisation’s sample is answered 404', async () => {
  const request = new Request(`${ORIGIN}/api/sweeps?sampleId=${world.sample.id}`, {
    headers: { cookie: world.outsider.cookie },
  });
  expect((await handlers.get('listSweeps')!(request)).status).toBe(404);
});
