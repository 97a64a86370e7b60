import { closePasswordWorkers } from '@/auth/passwordWorker';
import { GET as find } from '@/app/api/find/route';
import { GET as list, POST as write } from '@/app/api/notes/route';
import type { Found } from '@/schemas/find';
import type { NoteView } from '@/schemas/note';
import { freshDatabase, type TestDatabase } from '../support/database';
import { enterWorld, type Somebody, type World } from '../support/world';

const ORIGIN = 'http://localhost:3000';

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

const get = (who: Somebody, path: string, handler: typeof find) =>
  handler(new Request(`${ORIGIN}${path}`, { headers: { cookie: who.cookie } }));
const post = (who: Somebody, body: unknown, key?: string) =>
  write(
    new Request(`${ORIGIN}/api/notes`, {
      method: 'POST',
      headers: {
        cookie: who.cookie,
        origin: ORIGIN,
        'content-type': 'application/json',
        ...(key && { 'idempotency-key': key }),
      },
      body: JSON.stringify(body),
    }),
  );
const notesOf = async (who: Somebody, query: string) =>
  ((await (await get(who, `/api/notes?${query}`, list)).json()) as { items: NoteView[] }).items;
const found = async (who: Somebody, q: string, more = '') => {
  const answer = await get(who, `/api/find?q=${encodeURIComponent(q)}${more}`, find);
  return ((await answer.json()) as Found).kinds;
};
const names = (kinds: Found['kinds']) => kinds.flatMap(({ items }) => items.map(({ name }) => name));

describe('notes', () => {
  test('what the lab writes for itself no designer reads; what it writes for the client both do', async () => {
    const sweepId = world.run.id;
    await post(world.technician, { sweepId, text: 'check the lid gasket', audience: 'lab' });
    await post(world.technician, {
      sweepId,
      text: '×3 falls with the mains lead held to the plane',
      audience: 'client',
    });
    expect((await notesOf(world.manager, `sweepId=${sweepId}`)).map(({ text }) => text)).toEqual([
      '×3 falls with the mains lead held to the plane',
      'check the lid gasket',
    ]);
    expect((await notesOf(world.designer, `sweepId=${sweepId}`)).map(({ text }) => text)).toEqual([
      '×3 falls with the mains lead held to the plane',
    ]);
  });

  test('a designer’s note is for both sides whatever it says, and names the client', async () => {
    const answer = await post(world.designer, { sampleId: world.sample.id, text: 'idles at 18 kHz', audience: 'lab' });
    expect([answer.status, ((await answer.json()) as NoteView).audience]).toEqual([201, 'client']);
    expect((await notesOf(world.technician, `sampleId=${world.sample.id}`))[0]!.from).toBe('Pell & Orrin Lighting');
  });

  test('another client’s designer finds neither record nor note', async () => {
    const read = await get(world.outsider, `/api/notes?sweepId=${world.run.id}`, list);
    const wrote = await post(world.outsider, { sweepId: world.run.id, text: 'hello', audience: 'client' });
    expect([read.status, wrote.status]).toEqual([404, 404]);
  });

  test('a note names exactly one record and holds words', async () => {
    const both = await post(world.manager, {
      sampleId: world.sample.id,
      jobId: world.job.id,
      text: 'x',
      audience: 'lab',
    });
    const none = await post(world.manager, { text: 'x', audience: 'lab' });
    const empty = await post(world.manager, { jobId: world.job.id, text: '   ', audience: 'lab' });
    expect([both.status, none.status, empty.status]).toEqual([400, 400, 400]);
  });

  test('a repeat with the same key writes one note', async () => {
    const body = { jobId: world.job.id, text: 'the client rings on Friday', audience: 'lab' };
    await Promise.all([post(world.manager, body, 'note-key-1'), post(world.manager, body, 'note-key-1')]);
    expect(await notesOf(world.manager, `jobId=${world.job.id}`)).toHaveLength(1);
  });

  test('a list is paged from the newest', async () => {
    const jobId = world.job.id;
    for (const text of ['one', 'two', 'three']) await post(world.manager, { jobId, text, audience: 'lab' });
    const first = (await (await get(world.manager, `/api/notes?jobId=${jobId}&limit=2`, list)).json()) as {
      items: NoteView[];
      next: string;
    };
    const second = await notesOf(world.manager, `jobId=${jobId}&limit=2&after=${first.next}`);
    expect([...first.items, ...second].map(({ text }) => text)).toEqual([
      'three',
      'two',
      'one',
      'the client rings on Friday',
    ]);
  });
});

describe('find', () => {
  test('a number, a serial, a product code and part of a file name lead to their records', async () => {
    expect(names(await found(world.technician, world.job.number))).toContain(world.job.number);
    expect(names(await found(world.technician, world.sample.serial))).toContain(world.sample.code);
    expect(names(await found(world.technician, world.run.number.toLowerCase()))).toEqual([world.run.number]);
    expect(names(await found(world.technician, world.run.file.name.slice(0, 6)))).toContain(world.run.number);
  });

  test('every word has to be there', async () => {
    expect(names(await found(world.technician, `${world.product.code} nowhere`))).toEqual([]);
  });

  test('a designer finds the own organisation’s records and no equipment', async () => {
    const own = await found(world.designer, 'LD-40');
    expect(names(own)).toContain(world.product.code);
    expect(names(await found(world.outsider, 'LD-40'))).toEqual([]);
    expect(names(await found(world.designer, 'ANT'))).toEqual([]);
  });

  test('a signal path is found by the lab and by no designer', async () => {
    const kinds = await found(world.technician, 'P-1');
    expect(names(kinds.filter(({ kind }) => kind === 'path'))).toEqual(['P-1']);
    expect(names(await found(world.designer, 'P-1'))).toEqual([]);
  });

  test('% and _ are letters, not wildcards', async () => {
    expect(names(await found(world.technician, '%'))).toEqual([]);
    expect(names(await found(world.technician, '_'))).not.toContain(world.product.code);
  });

  test('LISN finds what is entered as AMN, AAN what is entered as ISN', async () => {
    const { enterEquipment } = await import('@/services/enterEquipment');
    const item = (identifier: string) => ({ identifier, role: 'network', description: 'x', state: 'in-use' as const });
    await enterEquipment(world.manager.actor, item('AMN-1'));
    await enterEquipment(world.manager.actor, item('ISN-4'));
    expect(names(await found(world.technician, 'LISN'))).toEqual(['AMN-1']);
    expect(names(await found(world.technician, 'aan'))).toEqual(['ISN-4']);
  });

  test('one kind is paged', async () => {
    const [first] = await found(world.technician, '-', '&kind=equipment&limit=2');
    expect(first!.items).toHaveLength(2);
    const [second] = await found(world.technician, '-', `&kind=equipment&limit=2&after=${first!.next!}`);
    expect(second!.items.length).toBeGreaterThan(0);
    expect(names([first!]).filter((name) => names([second!]).includes(name))).toEqual([]);
  });
});
