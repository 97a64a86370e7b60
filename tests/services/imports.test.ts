import { spawn } from 'node:child_process';
import path from 'node:path';
import { QueryTypes } from 'sequelize';
import { closePasswordWorkers } from '@/auth/passwordWorker';
import { POST as upload } from '@/app/api/sweep-files/route';
import { POST as keep } from '@/app/api/sweeps/route';
import { evaluateNow } from '@/emc/evaluate';
import { database } from '@/models/database';
import { Evaluation } from '@/models/evaluation';
import { ModificationState } from '@/models/modificationState';
import { newPublicId } from '@/models/publicId';
import { Sweep } from '@/models/sweep';
import { readPieces } from '@/models/traceStore';
import { unitOfWork } from '@/models/unitOfWork';
import { Upload } from '@/models/upload';
import type { SweepFileView } from '@/schemas/sweepFile';
import type { SweepView } from '@/schemas/sweep';
import { checkHour, inImportTurn, letOldestGo, takeImportTurn } from '@/services/importLimits';
import { taskSteps } from '@/services/importTasks';
import { closeImportWorkers, INLINE_BYTES, runApart, runHere } from '@/services/importWorkers';
import { keepSweep, publishSweep } from '@/services/keepSweep';
import { listSweeps, readSweep } from '@/services/sweeps';
import { dropOrphans, dropSweep, stageSweep } from '@/services/stageSweep';
import { createSweepFile } from '@/services/sweepFiles';
import { readSample } from '@/services/samples';
import { freshDatabase, type TestDatabase } from '../support/database';
import { enterWorld, sweepFile, type World } from '../support/world';

const ORIGIN = 'http://localhost:3000';
let schema: TestDatabase;
let world: World;

beforeAll(async () => {
  schema = await freshDatabase();
  world = await enterWorld();
}, 120_000);
afterAll(async () => {
  await closeImportWorkers();
  await closePasswordWorkers();
  await schema.close();
});

/** A sweep of the same shape that is too large to be worked on here. */
function largeFile(name = 'large.csv') {
  const rows: string[] = [];
  for (let i = 0; i < 60_000; i++) {
    const mhz = 30 + (i * 970) / 59_999;
    const level = 20 + ((i * 7919) % 301) / 100 + (i % 9973 === 0 ? 42 : 0);
    rows.push(`${mhz.toFixed(5)},${level.toFixed(2)}`);
  }
  const text = `RBW,120 kHz\nDetector,Peak\nFrequency (MHz),Level (dBuV)\n${rows.join('\n')}\n`;
  return { name, bytes: new TextEncoder().encode(text) };
}

const bodyFor = (file: SweepFileView, change: object = {}) => ({
  ...world.choice,
  ...world.about,
  fileId: file.id,
  ...change,
});
const count = async (table: string) => {
  const [row] = await unitOfWork(() =>
    database().query<{ n: number }>(`SELECT COUNT(*) AS n FROM ${table}`, { type: QueryTypes.SELECT }),
  );
  return Number(row!.n);
};
const BLOBS = ['sweep_files', 'sweep_file_parts', 'sweep_segments', 'trace_segments'];
const blobs = () => Promise.all(BLOBS.map(count));

function ask(handler: typeof keep, body: BodyInit, more: Record<string, string> = {}) {
  const headers = { origin: ORIGIN, cookie: world.technician.cookie, ...more };
  return handler(new Request(`${ORIGIN}/x`, { method: 'POST', headers, body }), { params: Promise.resolve({}) });
}
const asJson = (key?: string) => ({ 'content-type': 'application/json', ...(key && { 'idempotency-key': key }) });

describe('a large file', () => {
  test('gives the same bits on a worker’s thread as here, from its bytes, its stored parts and from memory', async () => {
    const { bytes, name } = largeFile();
    const recognise = { kind: 'recognise' as const, name, sweepIndex: null, store: true };
    const here = await runHere(bytes, recognise);
    const there = await runApart(1, recognise, 'a'.repeat(64), async () => ({ whole: bytes }));
    expect(there).toEqual(here);
    const { recognition, parts } = here;
    const judge = {
      kind: 'judge' as const,
      recognition,
      answers: { frequencyUnit: 'MHz' as const, sweepIndex: 0, traces: [] },
      traces: [{ index: 0, name: 'Level', unit: 'dBuV' as const, detector: 'peak' as const, rbwHz: 120e3 }],
      judging: {
        terms: [],
        lines: [],
        uncertainty: { prescan: [], final: [] },
        purpose: 'prescan' as const,
        port: 'enclosure' as const,
        rule: 'guarded-by-u' as const,
      },
      store: true,
    };
    const judgedHere = await runHere(bytes, judge);
    // The same worker holds the file; another is given its parts.
    const never = () => Promise.reject(new Error('the file is held'));
    expect(await runApart(1, judge, 'a'.repeat(64), never)).toEqual(judgedHere);
    const copies = { parts: parts.map((part) => part.slice()), bytes: bytes.length };
    expect(await runApart(2, judge, 'b'.repeat(64), async () => copies)).toEqual(judgedHere);
  });

  test('is kept whole, and its kept points give the bits of its evaluation again', async () => {
    const file = largeFile();
    expect(file.bytes.length).toBeGreaterThan(INLINE_BYTES);
    const held = await createSweepFile(world.technician.actor, file);
    const run = await keepSweep(world.technician.actor, bodyFor(held));
    const row = (await unitOfWork(() => Sweep.findOne({ where: { publicId: run.id } })))!;
    const pieces = await unitOfWork(() => readPieces(row.id));
    expect(pieces.length).toBe(2);
    const joined = (pick: (i: number) => ArrayLike<number>) => pieces.flatMap((_, i) => Array.from(pick(i)));
    const frequencyHz = Float64Array.from(joined((i) => pieces[i]!.frequencyHz));
    const reading = Float32Array.from(joined((i) => pieces[i]!.levels.get(0)!));
    expect([frequencyHz.length, frequencyHz[1]]).toEqual([60_000, 30016170]);
    const { contextOf, findRun } = await import('@/services/runs');
    const again = await unitOfWork(async () => {
      const { heads, judged } = await contextOf(await findRun(world.technician.actor, run.id));
      return evaluateNow({ ...judged, traces: [{ ...heads[0]!, frequencyHz, reading }] });
    });
    const kept = (await unitOfWork(() => Evaluation.findByPk(row.evaluationId!)))!;
    const { worstMarginDb, worstFrequencyHz, verdict } = kept;
    expect({ worstMarginDb, worstFrequencyHz, verdict }).toEqual({
      worstMarginDb: again.candidates[0]!.marginDb,
      worstFrequencyHz: again.candidates[0]!.frequencyHz,
      verdict: again.verdict,
    });
    expect(kept.candidates).toBe(again.candidates.length);
  });

  test('comes through the door by way of a spool, which leaves nothing behind', async () => {
    const { readdirSync } = await import('node:fs');
    const { tmpdir } = await import('node:os');
    const spools = () => readdirSync(tmpdir()).filter((name) => name.startsWith('stillfield-') && name.length > 40);
    const before = spools();
    const form = new FormData();
    const bytes = new Uint8Array(1_400_000).fill(10);
    const { bytes: rows } = largeFile();
    bytes.set(rows.subarray(0, 1_400_000));
    form.append('file', new File([bytes], 'spooled.csv'));
    const answer = await ask(upload, form);
    expect(answer.status).toBe(201);
    const held = (await answer.json()) as SweepFileView;
    expect(held.bytes).toBe(1_400_000);
    expect(held.recognition.frequency.points).toBe(60_000);
    expect(spools()).toEqual(before);
  });
});

describe('an import is invisible until it is whole', () => {
  test('while it is pending no list, number or verdict shows it; dropping it leaves nothing', async () => {
    const { actor } = world.technician;
    const held = await createSweepFile(actor, sweepFile({ 111: 60 }, 'pending.csv'));
    const before = await blobs();
    const listed = async () => (await listSweeps(actor, { limit: 50 })).items.map(({ number }) => number);
    const shown = await listed();
    const state = world.sample.states[0]!.id;
    const runsBefore = (await unitOfWork(() => ModificationState.findOne({ where: { publicId: state } })))!;
    const pending = await stageSweep(actor, bodyFor(held));
    expect(await blobs()).not.toEqual(before);
    expect(await listed()).toEqual(shown);
    expect(await unitOfWork(() => Sweep.count({ where: { stateId: runsBefore.id } }))).toBe(
      (await readSample(actor, world.sample.id)).states[0]!.runs,
    );
    expect(await unitOfWork(() => Sweep.findByPk(pending.id))).toBeNull();
    const { publicId } = (await unitOfWork(() => Sweep.unscoped().findByPk(pending.id)))!;
    await expect(readSweep(actor, publicId)).rejects.toThrow('no such run');
    await dropSweep(pending);
    expect(await blobs()).toEqual(before);
  });

  test('a job that was closed while the file was read takes no run, and nothing of it stays', async () => {
    const { actor } = world.technician;
    const held = await createSweepFile(actor, sweepFile({ 112: 60 }, 'closed.csv'));
    const pending = await stageSweep(actor, bodyFor(held));
    const { Job } = await import('@/models/job');
    const close = (state: 'open' | 'closed') =>
      unitOfWork(() => Job.update({ state }, { where: { id: pending.state.jobId } }));
    await close('closed');
    await expect(publishSweep(actor, bodyFor(held), pending)).rejects.toThrow(/closed/);
    await close('open');
    await dropSweep(pending);
    expect(await unitOfWork(() => Sweep.unscoped().count({ where: { evaluationId: null } }))).toBe(0);
  });

  test('a process killed in the middle leaves nothing that shows, and housekeeping clears it after an hour', async () => {
    const { actor } = world.technician;
    const held = await createSweepFile(actor, largeFile('killed.csv'));
    const before = await blobs();
    const numbers = (await listSweeps(actor, { limit: 100 })).items.length;
    const child = spawn(
      process.execPath,
      [
        '--import',
        'tsx',
        path.join(__dirname, 'children/keepAndStop.ts'),
        JSON.stringify({ actor, body: bodyFor(held) }),
      ],
      { cwd: process.cwd(), env: { ...process.env, NODE_OPTIONS: '' }, stdio: ['ignore', 'pipe', 'inherit'] },
    );
    const said = await new Promise<string>((resolve, reject) => {
      child.stdout.once('data', (data: Buffer) => resolve(String(data)));
      child.once('exit', (code) => reject(new Error(`the child ended with code ${code}`)));
    });
    expect(said).toMatch(/^written/);
    child.kill('SIGKILL');
    await new Promise((resolve) => child.once('exit', resolve));
    expect((await blobs())[3]).toBeGreaterThan(before[3]!);
    expect((await listSweeps(actor, { limit: 100 })).items.length).toBe(numbers);
    expect(await dropOrphans()).toBe(0);
    await unitOfWork(() =>
      database().query(
        'UPDATE sweeps SET updated_at = UTC_TIMESTAMP(3) - INTERVAL 61 MINUTE WHERE evaluation_id IS NULL',
      ),
    );
    expect(await dropOrphans()).toBe(1);
    expect(await blobs()).toEqual(before);
    // its file is held still, and is kept now
    const run = await keepSweep(actor, bodyFor(held));
    expect(run.number).toMatch(/^R-/);
  }, 120_000);

  test('a kept run and its file cannot be deleted, whoever asks', async () => {
    const [row] = await unitOfWork(() => Sweep.findAll({ limit: 1 }));
    await expect(unitOfWork(() => Sweep.destroy({ where: { id: row!.id } }))).rejects.toThrow(/foreign key/i);
    const run = (sql: string) => unitOfWork(() => database().query(sql));
    await expect(run(`DELETE FROM sweep_files WHERE id = ${row!.sweepFileId}`)).rejects.toThrow(/foreign key/i);
    for (const table of ['sweep_segments', 'trace_segments', 'sweep_file_parts']) {
      await expect(run(`DELETE FROM ${table}`)).rejects.toThrow(/denied/i);
    }
  });

  test('two at once under one key make one run, a retry answers it, and what the loser wrote is gone', async () => {
    const held = await createSweepFile(world.technician.actor, sweepFile({ 113: 60 }, 'twice.csv'));
    const before = await blobs();
    const send = () => ask(keep, JSON.stringify(bodyFor(held)), asJson('one-run-for-two-requests'));
    const answers = await Promise.all([send(), send()]);
    const runs = await Promise.all(answers.map(async (answer) => (await answer.json()) as SweepView));
    expect(answers.map(({ status }) => status)).toEqual([201, 201]);
    expect(runs[0]!.id).toBe(runs[1]!.id);
    const again = await send();
    expect(again.headers.get('idempotency-replayed')).toBe('true');
    expect(((await again.json()) as SweepView).number).toBe(runs[0]!.number);
    const after = await blobs();
    expect(after[0]).toBe(before[0]! + 1);
    expect(await unitOfWork(() => Sweep.unscoped().count({ where: { evaluationId: null } }))).toBe(0);
  });
});

describe('what one person may take', () => {
  test('two turns at once; a third waits a little and is told when to come back; one given back is taken', async () => {
    const { actor } = world.technician;
    const first = await takeImportTurn(actor);
    const second = await takeImportTurn(actor);
    const third = takeImportTurn(actor, 0);
    await expect(third).rejects.toMatchObject({ kind: 'throttled', retryAfterS: 5 });
    await expect(third).rejects.toThrow(/^2 files of yours are being taken in/);
    // somebody else has turns of their own
    await (await takeImportTurn(world.manager.actor, 0)).giveBack();
    const answer = await ask(keep, JSON.stringify({ ...bodyFor({ id: '0'.repeat(16) } as SweepFileView) }), asJson());
    expect([answer.status, answer.headers.get('retry-after')]).toEqual([429, '5']);
    expect(await answer.json()).toMatchObject({ status: 429, type: '/problems/throttled' });
    await first.giveBack();
    await (await takeImportTurn(actor, 0)).giveBack();
    await second.giveBack();
  }, 60_000);

  test('a turn is given back whatever becomes of the work, and ends by itself when its process is gone', async () => {
    const { actor } = world.technician;
    await expect(inImportTurn(actor, () => Promise.reject(new Error('broke')))).rejects.toThrow('broke');
    await takeImportTurn(actor, 0);
    await takeImportTurn(actor, 0);
    await expect(takeImportTurn(actor, 0)).rejects.toThrow();
    await unitOfWork(() =>
      database().query('UPDATE import_turns SET held_until = UTC_TIMESTAMP(3) - INTERVAL 1 SECOND'),
    );
    await (await takeImportTurn(actor, 0)).giveBack();
  });

  test('many claims at the same moment get exactly two turns', async () => {
    const { actor } = world.manager;
    const claims = await Promise.allSettled(Array.from({ length: 8 }, () => takeImportTurn(actor, 0)));
    const got = claims.filter(({ status }) => status === 'fulfilled');
    expect(got).toHaveLength(2);
    for (const claim of got) if (claim.status === 'fulfilled') await claim.value.giveBack();
  });

  test('an hour’s worth of bytes or files is answered with the minutes until there is room', async () => {
    const { actor } = world.manager;
    await createSweepFile(actor, sweepFile({}, 'hour.csv'));
    await expect(checkHour(actor, 2_000_000_000)).rejects.toMatchObject({ kind: 'throttled' });
    await expect(checkHour(actor, 2_000_000_000)).rejects.toThrow(/2000 MB within an hour.*in \d+ min\.$/);
    await expect(checkHour(actor, 1_000_000)).resolves.toBeUndefined();
    await expect(checkHour(world.designer.actor, 1_999_000_000)).resolves.toBeUndefined();
  });

  test('beyond twice an hour’s worth the oldest held files of that person go, and nobody else’s', async () => {
    const { actor } = world.manager;
    const held = async () => {
      const rows = await unitOfWork(() =>
        database().query<{ name: string; userId: number }>('SELECT name, user_id AS userId FROM uploads ORDER BY id', {
          type: QueryTypes.SELECT,
        }),
      );
      const names = (own: boolean) =>
        rows.filter(({ userId }) => (userId === actor.userId) === own).map(({ name }) => name);
      return { own: names(true), others: names(false) };
    };
    await createSweepFile(actor, sweepFile({}, 'older.csv'));
    const before = await held();
    await unitOfWork(() => letOldestGo(actor.userId));
    expect(await held()).toEqual(before);
    await unitOfWork(() =>
      Upload.create({
        publicId: newPublicId(),
        sha256: 'c'.repeat(64),
        name: 'huge.csv',
        bytes: 4_100_000_000,
        recognition: {},
        userId: actor.userId,
        expiresAt: new Date(Date.now() + 3_600_000),
      }),
    );
    await createSweepFile(actor, sweepFile({}, 'newest.csv'));
    expect(await held()).toEqual({ own: ['newest.csv'], others: before.others });
  });
});

test('a task that has no file says so instead of answering', () => {
  const task = { kind: 'recognise' as const, name: 'x', sweepIndex: null, store: false };
  expect(() => taskSteps(null, task).next()).toThrow('needs a file');
});
