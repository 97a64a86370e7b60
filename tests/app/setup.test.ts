import { readdirSync } from 'node:fs';
import path from 'node:path';
import sharp from 'sharp';
import { closePasswordWorkers } from '@/auth/passwordWorker';
import type { RouteHandler } from '@/http/handle';
import { PHOTO_PART_BYTES } from '@/models/photoStore';
import { AuditEntry } from '@/models/auditEntry';
import { Photo } from '@/models/photo';
import { PhotoPart } from '@/models/photoPart';
import { SetupRecord } from '@/models/setupRecord';
import { unitOfWork } from '@/models/unitOfWork';
import type { PhotoView, SetupView } from '@/schemas/setup';
import type { SweepView } from '@/schemas/sweep';
import { verifyChain } from '@/services/audit';
import { changeJob, readJob } from '@/services/jobs';
import { keepSweep } from '@/services/keepSweep';
import { createSweepFile } from '@/services/sweepFiles';
import { freshDatabase, type TestDatabase } from '../support/database';
import { enterWorld, sweepFile, type Somebody, type World } from '../support/world';

const ORIGIN = 'http://localhost:3000';
const API = path.resolve(__dirname, '../../src/app/api');

let schema: TestDatabase;
let world: World;
/** A second run of the same sample, to begin from the first. */
let second: SweepView;
const handlers = new Map<string, RouteHandler>();
beforeAll(async () => {
  schema = await freshDatabase();
  world = await enterWorld();
  const file = await createSweepFile(world.technician.actor, sweepFile());
  second = await keepSweep(world.technician.actor, {
    ...world.choice,
    ...world.about,
    polarisation: 'vertical',
    fileId: file.id,
  });
  for (const name of readdirSync(API, { recursive: true, encoding: 'utf8' })) {
    if (!/^(sweeps|photos).*route\.ts$/.test(name)) continue;
    for (const handler of Object.values((await import(path.join(API, name))) as Record<string, RouteHandler>)) {
      if (handler.operation) handlers.set(handler.operation.id, handler);
    }
  }
}, 120_000);
afterAll(async () => {
  await closePasswordWorkers();
  await schema.close();
});

interface Asked {
  body?: unknown;
  file?: Uint8Array;
  caption?: string;
  query?: string;
  headers?: Record<string, string>;
}

async function ask(
  operation: string,
  who: Somebody,
  id: string,
  { body, file, caption, query = '', headers = {} }: Asked = {},
) {
  const handler = handlers.get(operation)!;
  const form = new FormData();
  if (caption !== undefined) form.set('caption', caption);
  if (file) form.set('file', new File([new Uint8Array(file)], 'IMG_0001.JPG'));
  const request = new Request(`${ORIGIN}/x${query}`, {
    method: handler.operation.method,
    headers: {
      cookie: who.cookie,
      origin: ORIGIN,
      ...(body !== undefined && { 'content-type': 'application/json' }),
      ...headers,
    },
    body: file ? form : body === undefined ? undefined : JSON.stringify(body),
  });
  return handler(request, { params: Promise.resolve({ id }) });
}
const json = async <T>(answer: Promise<Response>): Promise<T> => {
  const got = await answer;
  if (!got.ok) throw new Error(`${got.status} ${await got.text()}`);
  return (await got.json()) as T;
};
const setup = (who: Somebody, id = world.run.id) => json<SetupView>(ask('readSetup', who, id));
const noise = (width: number, height: number) =>
  sharp({
    create: { width, height, channels: 3, background: '#888', noise: { type: 'gaussian', mean: 128, sigma: 40 } },
  })
    .jpeg({ quality: 90 })
    .toBuffer();

describe('the record', () => {
  test('nothing is needed before a run is kept, and all that nobody has said is named', async () => {
    const { brief, record, last } = await setup(world.designer, second.id);
    expect([record, last, brief.revision, brief.eutStayed]).toEqual([null, null, null, null]);
    expect(brief.unsaid).toEqual([
      'mode',
      'supply',
      'cables',
      'ancillary',
      'temperature',
      'humidity',
      'deviations',
      'stayed',
      'photograph',
    ]);
    const run = await json<SweepView>(ask('readSweep', world.designer, second.id));
    expect(run.setup).toEqual(brief);
    expect(run.portVerdict.runs.find(({ id }) => id === second.id)?.setup).toEqual(brief);
  });

  test('one field may be said alone; an empty one is not said', async () => {
    const said = { temperatureC: 21.5, cableLayout: '  ', supplyKind: 'ac', supplyV: 230, supplyFrequencyHz: 50 };
    const { record, brief } = await json<SetupView>(ask('writeSetup', world.technician, world.run.id, { body: said }));
    expect(record).toMatchObject({ revision: 1, temperatureC: 21.5, cableLayout: null, supplyV: 230, reason: null });
    expect(record!.by.id).toBe(world.technician.actor.publicId);
    expect(brief.unsaid).not.toContain('supply');
    expect(brief.unsaid).toContain('cables');
  });

  test.each([
    [{ eutStayed: 'no' }, '/whatHappened'],
    [{ eutStayed: 'yes', whatHappened: 'restarted' }, '/whatHappened'],
    [{ supplyKind: 'dc', supplyFrequencyHz: 50 }, '/supplyFrequencyHz'],
    [{ humidityPct: 101 }, '/humidityPct'],
    [{ corrects: 1 }, '/reason'],
    [{ reason: 'because' }, '/reason'],
    [{ sky: 'blue' }, '/sky'],
  ])('%j is refused at %s', async (body, pointer) => {
    const answer = await ask('writeSetup', world.technician, second.id, { body });
    const { errors } = (await answer.json()) as { errors: { pointer: string }[] };
    expect([answer.status, errors.map((issue) => issue.pointer)]).toEqual([400, [pointer]]);
  });

  test('a correction is the next revision with its reason; the earlier one stays readable and the table takes no update', async () => {
    const body = {
      temperatureC: 22,
      eutStayed: 'no',
      whatHappened: 'restarted at 144 MHz',
      corrects: 1,
      reason: 'read off the wrong meter',
    };
    const { record, brief } = await json<SetupView>(ask('writeSetup', world.manager, world.run.id, { body }));
    expect([record!.revision, record!.reason, record!.supplyV]).toEqual([2, 'read off the wrong meter', null]);
    expect(brief).toMatchObject({ revision: 2, eutStayed: 'no', whatHappened: 'restarted at 144 MHz' });
    const list = await json<{ items: { revision: number; temperatureC: number }[]; next: string | null }>(
      ask('listSetupRevisions', world.designer, world.run.id, { query: '?limit=1' }),
    );
    expect([list.items.map(({ revision }) => revision), list.next !== null]).toEqual([[2], true]);
    const older = await json<typeof list>(
      ask('listSetupRevisions', world.designer, world.run.id, { query: `?limit=1&after=${list.next}` }),
    );
    expect([older.items[0]!.temperatureC, older.next]).toEqual([21.5, null]);
    await expect(unitOfWork(() => SetupRecord.update({ temperatureC: 0 }, { where: {} }))).rejects.toThrow(/denied/);
  });

  test('whoever was slower is told of it, with the revision that is there now', async () => {
    const body = { temperatureC: 23, corrects: 1, reason: 'late' };
    const answer = await ask('writeSetup', world.technician, world.run.id, { body });
    expect([answer.status, ((await answer.json()) as { version: number }).version]).toEqual([412, 2]);
  });

  test('ten who write at once: one is the first, nine are told', async () => {
    const file = await createSweepFile(world.technician.actor, sweepFile());
    const run = await keepSweep(world.technician.actor, { ...world.choice, ...world.about, fileId: file.id });
    const answers = await Promise.all(
      Array.from({ length: 10 }, (_, i) => ask('writeSetup', world.technician, run.id, { body: { humidityPct: i } })),
    );
    expect(answers.map(({ status }) => status).sort()).toEqual([201, ...Array.from({ length: 9 }, () => 412)]);
    expect(
      await unitOfWork(() => SetupRecord.count({ include: [{ association: 'sweep', where: { publicId: run.id } }] })),
    ).toBe(1);
  });

  test('a repeat under the same key is one revision', async () => {
    const body = { humidityPct: 40 };
    const send = () =>
      ask('writeSetup', world.technician, second.id, { body, headers: { 'idempotency-key': 'setup-once-1' } });
    const [first, again] = [await send(), await send()];
    expect([first.status, again.status, await again.text()]).toEqual([201, 201, await first.text()]);
  });

  test('an EUT that did not stay in its mode is named in the list of runs too, and no verdict changes by it', async () => {
    const { items } = await json<{ items: { id: string; strayed: string | null; verdict: string }[] }>(
      ask('listSweeps', world.designer, '', { query: `?sampleId=${world.sample.id}` }),
    );
    const listed = items.find(({ id }) => id === world.run.id)!;
    expect([listed.strayed, listed.verdict]).toEqual(['restarted at 144 MHz', world.run.evaluation.verdict]);
    expect(items.find(({ id }) => id === second.id)!.strayed).toBeNull();
  });

  test('the last record of another run of the same sample is there to begin from', async () => {
    const { last } = await setup(world.technician, second.id);
    expect([last!.run.number.slice(0, 2), last!.record.revision]).toEqual(['R-', 1]);
    expect(last!.run.id).not.toBe(second.id);
  });
});

describe('a photograph', () => {
  let photo: PhotoView;

  test('is kept in rows of at most 512 KiB in both sizes, and comes back as what was hashed', async () => {
    const file = await noise(2600, 1800);
    photo = await json(ask('addPhoto', world.technician, world.run.id, { file, caption: ' the table from the door ' }));
    expect(photo).toMatchObject({
      caption: 'the table from the door',
      width: 2400,
      small: { width: 480 },
      withdrawn: null,
    });
    expect(photo.sent.bytes).toBe(file.length);
    const parts = await unitOfWork(() => PhotoPart.findAll({ include: [], where: {}, order: [['photoId', 'DESC']] }));
    const own = parts.filter(({ photoId }) => photoId === parts[0]!.photoId);
    expect(own.filter(({ size }) => size === 'whole').length).toBeGreaterThan(1);
    expect(Math.max(...own.map(({ part }) => part.length))).toBeLessThanOrEqual(PHOTO_PART_BYTES);
    const answer = await ask('downloadPhoto', world.designer, photo.id);
    const bytes = Buffer.from(await answer.arrayBuffer());
    expect([bytes.length, await sha256(bytes)]).toEqual([photo.bytes, photo.sha256]);
    const small = await ask('downloadPhoto', world.designer, photo.id, { query: '?size=small' });
    expect((await sharp(Buffer.from(await small.arrayBuffer())).metadata()).width).toBe(480);
  }, 60_000);

  test('goes out as a picture that is asked for again each time, and answers 304 to its own ETag', async () => {
    const answer = await ask('downloadPhoto', world.designer, photo.id);
    expect(Object.fromEntries(answer.headers)).toMatchObject({
      'content-type': 'image/jpeg',
      'cache-control': 'private, no-cache',
      'x-content-type-options': 'nosniff',
      'content-security-policy': "default-src 'none'; sandbox",
    });
    const etag = answer.headers.get('etag')!;
    const again = await ask('downloadPhoto', world.designer, photo.id, { headers: { 'if-none-match': etag } });
    expect([again.status, await again.text()]).toEqual([304, '']);
  });

  test('is not there for another organisation, whichever way it is asked for', async () => {
    for (const operation of ['readPhoto', 'downloadPhoto'] as const) {
      expect((await ask(operation, world.outsider, photo.id)).status).toBe(404);
    }
    for (const operation of ['listPhotos', 'readSetup', 'listSetupRevisions'] as const) {
      expect((await ask(operation, world.outsider, world.run.id)).status).toBe(404);
    }
  });

  test('a designer reads and cannot write', async () => {
    const file = await noise(8, 8);
    expect((await ask('addPhoto', world.designer, world.run.id, { file })).status).toBe(403);
    expect((await ask('writeSetup', world.designer, world.run.id, { body: {} })).status).toBe(403);
  });

  test('sent again under the same key it is one photograph; another file under that key is a conflict', async () => {
    const file = await noise(60, 40);
    const headers = { 'idempotency-key': 'photo-once-1' };
    const one = await json<PhotoView>(ask('addPhoto', world.technician, second.id, { file, headers }));
    const again = await json<PhotoView>(ask('addPhoto', world.technician, second.id, { file, headers }));
    expect(again.id).toBe(one.id);
    const other = await ask('addPhoto', world.technician, second.id, { file: await noise(60, 41), headers });
    expect(other.status).toBe(409);
    const { items } = await json<{ items: unknown[] }>(ask('listPhotos', world.technician, second.id));
    expect(items).toHaveLength(1);
    expect((await setup(world.technician, second.id)).brief.unsaid).not.toContain('photograph');
  });

  test('its caption is corrected on the version that was read', async () => {
    const change = (version: number, caption: string) =>
      ask('changePhoto', world.technician, photo.id, { body: { caption }, headers: { 'if-match': `"${version}"` } });
    expect((await change(photo.version, 'the table')).status).toBe(200);
    expect((await change(photo.version, 'late')).status).toBe(412);
  });

  test('withdrawn, it is gone for the client and stays for the lab, with who, when and why', async () => {
    const reason = 'another client’s sample is in it';
    const headers = { 'if-match': `"${photo.version + 1}"` };
    const gone = await json<PhotoView>(ask('withdrawPhoto', world.technician, photo.id, { body: { reason }, headers }));
    expect(gone.withdrawn).toMatchObject({ reason, by: { id: world.technician.actor.publicId } });
    for (const operation of ['readPhoto', 'downloadPhoto'] as const) {
      expect((await ask(operation, world.designer, photo.id)).status).toBe(404);
      expect((await ask(operation, world.manager, photo.id)).status).toBe(200);
    }
    const listed = async (who: Somebody) =>
      (await json<{ items: PhotoView[] }>(ask('listPhotos', who, world.run.id))).items.some(
        ({ id }) => id === photo.id,
      );
    expect([await listed(world.designer), await listed(world.technician)]).toEqual([false, true]);
    const again = await ask('withdrawPhoto', world.technician, photo.id, {
      body: { reason },
      headers: { 'if-match': `"${gone.version}"` },
    });
    expect(again.status).toBe(409);
    await expect(unitOfWork(() => Photo.destroy({ where: {} }))).rejects.toThrow(/denied/);
    await expect(unitOfWork(() => PhotoPart.update({ seq: 9 }, { where: {} }))).rejects.toThrow(/denied/);
  });

  test('what is no picture is refused at the file', async () => {
    const answer = await ask('addPhoto', world.technician, world.run.id, { file: sweepFile().bytes });
    expect([answer.status, await answer.json()]).toMatchObject([
      400,
      { errors: [{ pointer: '/file', message: 'is no JPEG, PNG or WebP picture' }] },
    ]);
  });
});

test('every act is in the audit trail of its job, whose chain holds', async () => {
  const scope = `job-${world.job.id}`;
  const actions = (await unitOfWork(() => AuditEntry.findAll({ where: { scope } }))).map(({ action }) => action);
  for (const action of [
    'set-up recorded',
    'set-up corrected, revision 2',
    'photograph added',
    'caption of a photograph corrected',
    'photograph withdrawn',
  ]) {
    expect(actions).toContain(action);
  }
  expect(await verifyChain(scope)).toBeNull();
});

test('a closed job takes no set-up and no photograph', async () => {
  const { version } = await readJob(world.manager.actor, world.job.id);
  await changeJob(world.manager.actor, world.job.id, version, { state: 'closed', stateReason: 'done' });
  const file = await noise(8, 8);
  expect((await ask('addPhoto', world.technician, second.id, { file })).status).toBe(409);
  expect((await ask('writeSetup', world.technician, second.id, { body: {} })).status).toBe(409);
});

async function sha256(bytes: Uint8Array): Promise<string> {
  return (await import('node:crypto')).createHash('sha256').update(bytes).digest('hex');
}
