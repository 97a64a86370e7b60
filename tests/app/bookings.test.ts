import { closePasswordWorkers } from '@/auth/passwordWorker';
import { PATCH as change, GET as read } from '@/app/api/bookings/[id]/route';
import { POST as cancel } from '@/app/api/bookings/[id]/cancel/route';
import { GET as list, POST as book } from '@/app/api/bookings/route';
import { PATCH as changePosition } from '@/app/api/positions/[id]/route';
import { POST as enterPosition, GET as listPositions } from '@/app/api/positions/route';
import type { RouteHandler } from '@/http/handle';
import { AuditEntry } from '@/models/auditEntry';
import { Booking } from '@/models/booking';
import { ModificationState } from '@/models/modificationState';
import { unitOfWork } from '@/models/unitOfWork';
import { User } from '@/models/user';
import { main as positionAdd } from '@/ops/commands/position-add';
import type { BookingView, PositionView } from '@/schemas/booking';
import { verifyChain } from '@/services/audit';
import { changeJob, createJob, readJob } from '@/services/jobs';
import { readDay } from '@/services/day';
import { createSample, createState } from '@/services/samples';
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

interface Asked {
  id?: string;
  query?: string;
  body?: unknown;
  key?: string;
  version?: number;
  who?: Somebody;
}
function ask(handler: RouteHandler, { id, query, body, key, version, who = world.manager }: Asked) {
  const headers = new Headers({ origin: ORIGIN, cookie: who.cookie });
  if (body !== undefined) headers.set('content-type', 'application/json');
  if (key) headers.set('idempotency-key', key);
  if (version !== undefined) headers.set('if-match', `"${version}"`);
  const { method } = handler.operation;
  const init = { method, headers, body: body === undefined ? null : JSON.stringify(body) };
  return handler(new Request(`${ORIGIN}/x${query ?? ''}`, init), { params: Promise.resolve(id ? { id } : {}) });
}
const slot = (startsAt: string, endsAt: string, more: object = {}) => ({ ...world.slot, startsAt, endsAt, ...more });
async function booked(answer: Response | Promise<Response>, status = 201): Promise<BookingView> {
  const got = await answer;
  expect([got.status, got.ok ? '' : await got.text()]).toEqual([status, '']);
  return (await got.json()) as BookingView;
}
interface Refusal {
  status: number;
  detail: string;
  errors?: { pointer: string; message: string }[];
}
const refused = async (answer: Promise<Response>) => (await (await answer).json()) as Refusal;

test('a booking says where, who, what and when, and stands in the record of its job', async () => {
  const made = await booked(ask(book, { body: slot('2032-01-05T13:00:00Z', '2032-01-05T15:30:00Z') }));
  expect(made).toMatchObject({
    version: 1,
    position: { code: 'A', name: '3 m chamber' },
    technician: { name: 'technician' },
    sample: { code: 'S-001' },
    state: { label: 'M0', planned: false },
    product: { code: 'LD-40' },
    organisation: { name: 'Pell & Orrin Lighting' },
    work: 'radiated prescan',
    startsAt: '2032-01-05T13:00:00.000Z',
    endsAt: '2032-01-05T15:30:00.000Z',
    cancelled: null,
  });
  const entries = await unitOfWork(() => AuditEntry.findAll({ where: { subjectId: made.id } }));
  expect(entries.map(({ action, scope }) => [action, scope])).toEqual([['booked', `job-${world.job.id}`]]);
  expect(await verifyChain(`job-${world.job.id}`)).toBeNull();
});

test('a clash names what is shared, when, with whom, and the next free time; touching is none', async () => {
  const taken = await refused(ask(book, { body: slot('2032-01-05T15:15:00Z', '2032-01-05T16:15:00Z') }));
  expect([taken.status, taken.detail]).toEqual([
    409,
    'Position A, 3 m chamber, is taken 5 Jan 2032, 13:00 to 15:30 by LD-40 M0 (S-001) with technician. ' +
      'technician is booked 5 Jan 2032, 13:00 to 15:30 at position A, 3 m chamber, for LD-40 M0 (S-001). ' +
      'Position and person are next free together for as long from 5 Jan 2032, 15:30.',
  ]);
  await booked(ask(book, { body: slot('2032-01-05T15:30:00Z', '2032-01-05T15:45:00Z') }));
});

test('a person at one position cannot be at another at the same time', async () => {
  const answer = await ask(enterPosition, {
    body: { code: 'B', name: 'Mains bench', capabilities: ['mains-network'] },
  });
  const { id: positionId } = (await answer.json()) as PositionView;
  const busy = await refused(ask(book, { body: slot('2032-01-05T13:00:00Z', '2032-01-05T13:15:00Z', { positionId }) }));
  expect(busy.detail).toMatch(/^technician is booked 5 Jan 2032, 13:00 to 15:30 at position A, 3 m chamber, for LD-40/);
  const other = { positionId, technicianId: world.manager.actor.publicId };
  await booked(ask(book, { body: slot('2032-01-05T13:00:00Z', '2032-01-05T13:15:00Z', other) }));
});

test.each([
  ['across midnight', '2032-02-01T22:00:00Z', '2032-02-02T02:00:00Z', 201],
  ['ten days', '2032-04-01T08:00:00Z', '2032-04-11T08:00:00Z', 201],
  ['ten days and a quarter', '2032-05-01T08:00:00Z', '2032-05-11T08:15:00Z', 400],
  ['a quarter of an hour', '2032-02-03T10:00:00Z', '2032-02-03T10:15:00Z', 201],
  ['five minutes', '2032-02-03T10:15:00Z', '2032-02-03T10:20:00Z', 400],
  ['backwards', '2032-02-03T12:00:00Z', '2032-02-03T11:00:00Z', 400],
  ['over already', '2020-02-03T10:00:00Z', '2020-02-03T11:00:00Z', 400],
])('%s: %s to %s is answered %i', async (_what, startsAt, endsAt, status) => {
  const answer = await ask(book, { body: slot(startsAt, endsAt) });
  expect(answer.status).toBe(status);
  if (status === 400) {
    const { errors } = (await answer.json()) as Refusal;
    expect(errors!.map(({ pointer }) => pointer)).toContain('/endsAt');
  }
});

test('what cannot be booked is refused with a pointer to each: unknown, designer, disabled, planned only, closed, retired', async () => {
  const unknown = '0000000000000000';
  const day = ['2032-03-01T09:00:00Z', '2032-03-01T10:00:00Z'] as const;
  const pointers = async (more: object) =>
    (await refused(ask(book, { body: slot(...day, more) }))).errors?.map(
      ({ pointer, message }) => `${pointer} ${message}`,
    );
  expect(await pointers({ sampleId: unknown, technicianId: unknown, positionId: unknown })).toEqual([
    '/sampleId is not a sample of this lab',
    '/technicianId is not one of the lab’s people',
    '/positionId is not a test position of this lab',
  ]);
  expect(await pointers({ stateId: unknown })).toEqual(['/stateId is not a state of this sample']);
  const { publicId: designer } = world.designer.actor;
  expect(await pointers({ technicianId: designer })).toEqual(['/technicianId is not one of the lab’s people']);

  await unitOfWork(() =>
    User.update({ disabledAt: new Date() }, { where: { publicId: world.technician.actor.publicId } }),
  );
  expect(await pointers({})).toEqual(['/technicianId is disabled and can no longer be booked']);
  await unitOfWork(() => User.update({ disabledAt: null }, { where: { publicId: world.technician.actor.publicId } }));

  const boss = world.manager.actor;
  const job = await createJob(boss, { productId: world.product.id, title: 'second', decisionRule: 'guarded-by-u' });
  const sample = await createSample(boss, job.id, { serial: 'P2-0300', firmware: '', description: '' });
  const own = { sampleId: sample.id, stateId: null };
  const fitted = (planned: boolean) =>
    unitOfWork(() => ModificationState.update({ planned }, { where: { publicId: sample.states[0]!.id } }));
  await fitted(true);
  expect(await pointers(own)).toEqual(['/sampleId has only planned states: nothing of it is here yet']);
  await fitted(false);
  const { states } = await createState(boss, sample.id, { description: 'ferrite', planned: true });
  const planned = await booked(ask(book, { body: slot(...day, { ...own, stateId: states[1]!.id }) }));
  expect(planned.state).toMatchObject({ label: 'M1', planned: true });

  const { version } = await readJob(boss, job.id);
  const closed = await changeJob(boss, job.id, version, { state: 'closed', stateReason: 'done' });
  expect(await pointers(own)).toEqual([`/sampleId belongs to job ${closed.number}, which is closed`]);

  const spare = (await (await ask(enterPosition, { body: { code: 'Z', name: 'spare' } })).json()) as PositionView;
  const retired = await ask(changePosition, { id: spare.id, version: 1, body: { state: 'retired' } });
  expect(retired.status).toBe(200);
  expect(await pointers({ positionId: spare.id })).toEqual(['/positionId is retired: position Z takes no bookings']);
});

test('a position with bookings to come is not retired; a code belongs to one position', async () => {
  const still = await refused(
    ask(changePosition, { id: world.position.id, version: world.position.version, body: { state: 'retired' } }),
  );
  expect([still.status, still.detail]).toEqual([409, expect.stringMatching(/^Position A has \d+ bookings to come\./)]);
  const twice = await refused(ask(enterPosition, { body: { code: 'A', name: 'another' } }));
  expect([twice.status, twice.detail]).toEqual([409, 'Another test position has that code.']);
});

test('a repeat with the same key books once', async () => {
  const body = slot('2032-01-12T09:00:00Z', '2032-01-12T10:00:00Z');
  const [one, two] = await Promise.all([1, 2].map(() => ask(book, { body, key: 'booking-key-0001' })));
  expect((await booked(one!)).id).toBe((await booked(two!)).id);
});

test('a move names the version it was made on, frees the old time, and may touch its own old time', async () => {
  const made = await booked(ask(book, { body: slot('2032-01-13T09:00:00Z', '2032-01-13T11:00:00Z') }));
  expect((await ask(change, { id: made.id, body: {} })).status).toBe(428);
  const later = { startsAt: '2032-01-13T10:00:00Z', endsAt: '2032-01-13T12:00:00Z' };
  const moved = await booked(ask(change, { id: made.id, version: 1, body: later }), 200);
  expect([moved.version, moved.startsAt]).toEqual([2, '2032-01-13T10:00:00.000Z']);
  expect((await ask(change, { id: made.id, version: 1, body: later })).status).toBe(412);
  await booked(ask(book, { body: slot('2032-01-13T09:00:00Z', '2032-01-13T10:00:00Z') }));
  const clash = await refused(ask(change, { id: made.id, version: 2, body: { startsAt: '2032-01-13T09:45:00Z' } }));
  expect([clash.status, clash.detail]).toEqual([409, expect.stringContaining('is taken 13 Jan 2032, 09:00 to 10:00')]);
});

test('a cancelled booking keeps its reason, gives its time back and is not moved again', async () => {
  const made = await booked(ask(book, { body: slot('2032-01-14T09:00:00Z', '2032-01-14T11:00:00Z') }));
  const none = await refused(ask(cancel, { id: made.id, version: 1, body: { reason: ' ' } }));
  expect(none.errors).toEqual([{ pointer: '/reason', message: 'is needed' }]);
  const gone = await booked(ask(cancel, { id: made.id, version: 1, body: { reason: 'the sample is late' } }), 200);
  expect([gone.version, gone.cancelled]).toEqual([2, { reason: 'the sample is late' }]);
  await booked(ask(book, { body: slot('2032-01-14T10:00:00Z', '2032-01-14T11:00:00Z') }));
  expect((await ask(change, { id: made.id, version: 2, body: { work: 'again' } })).status).toBe(409);
  expect(await booked(ask(read, { id: made.id }), 200)).toMatchObject({ cancelled: { reason: 'the sample is late' } });
});

test('what stands in the way of a booking since it was made is named on its day: the person, the position, the job', async () => {
  const { manager } = world;
  const job = await createJob(manager.actor, {
    productId: world.product.id,
    title: 'clash',
    decisionRule: 'guarded-by-u',
  });
  const sample = await createSample(manager.actor, job.id, { serial: 'C-1', firmware: '', description: '' });
  const more = { sampleId: sample.id, stateId: sample.states[0]!.id };
  const made = await ask(book, { body: slot('2031-05-05T09:00:00Z', '2031-05-05T11:00:00Z', more) });
  const { id } = (await made.json()) as BookingView;
  const clashes = async (at?: Date) =>
    (await readDay(manager.actor, '2031-05-05', at)).bookings.find((one) => one.id === id)!.clashes;
  expect(await clashes()).toEqual([]);
  const { version } = await readJob(manager.actor, job.id);
  await changeJob(manager.actor, job.id, version, { state: 'closed', stateReason: 'reported' });
  await unitOfWork(() => User.update({ disabledAt: new Date() }, { where: { publicId: world.slot.technicianId } }));
  expect(await clashes()).toEqual(['technician is disabled and cannot come.', `Job ${job.number} is closed.`]);
  expect(await clashes(new Date('2031-05-05T11:00:00Z'))).toEqual([]);
  await unitOfWork(() => User.update({ disabledAt: null }, { where: { publicId: world.slot.technicianId } }));
});

test('the list follows the clock, page by page, without cancelled ones unless asked', async () => {
  const from = '?from=2032-01-01T00:00:00Z&to=2032-01-20T00:00:00Z';
  const seen: BookingView[] = [];
  let after = '';
  for (;;) {
    const answer = await ask(list, { query: `${from}&limit=3${after}`, who: world.technician });
    const { items, next } = (await answer.json()) as { items: BookingView[]; next: string | null };
    seen.push(...items);
    if (next === null) break;
    after = `&after=${encodeURIComponent(next)}`;
  }
  const starts = seen.map(({ startsAt }) => startsAt);
  expect(starts).toEqual([...starts].sort());
  expect(new Set(seen.map(({ id }) => id)).size).toBe(seen.length);
  const standing = seen.filter(({ cancelled }) => cancelled === null).length;
  expect([seen.length, standing > 5]).toEqual([standing, true]);
  const all = (await (await ask(list, { query: `${from}&cancelled=with&limit=200` })).json()) as {
    items: BookingView[];
  };
  const cancelled = await unitOfWork(() => Booking.findAll({ where: { state: 'cancelled' } }));
  expect(all.items.length).toBe(seen.length + cancelled.length);
  const nobody = await ask(list, { query: `${from}&positionId=0000000000000000` });
  expect(((await nobody.json()) as { items: BookingView[] }).items).toEqual([]);
});

describe('Europe/London at the two changes of 2026', () => {
  const now = new Date('2026-03-01T08:00:00Z');
  const service = () => import('@/services/bookings');

  test('a night across the beginning of summer time is an hour shorter on the clock and clashes by instants', async () => {
    const { createBooking } = await service();
    const night = { ...world.slot, startsAt: '2026-03-28T23:00:00Z', endsAt: '2026-03-29T01:00:00Z' };
    await createBooking(world.manager.actor, night, now);
    const overlapping = { ...night, startsAt: '2026-03-29T00:45:00Z', endsAt: '2026-03-29T02:00:00Z' };
    await expect(createBooking(world.manager.actor, overlapping, now)).rejects.toThrow(
      'is taken 28 Mar 2026, 23:00 to 29 Mar 2026, 02:00 by LD-40',
    );
    await createBooking(world.manager.actor, { ...night, startsAt: night.endsAt, endsAt: '2026-03-29T03:00:00Z' }, now);
  });

  test('the hour that comes twice holds two bookings that touch, and ten days of the wall are 241 hours there', async () => {
    const { createBooking } = await service();
    const first = { ...world.slot, startsAt: '2026-10-25T00:00:00Z', endsAt: '2026-10-25T01:00:00Z' };
    await createBooking(world.manager.actor, first, now);
    const second = { ...first, startsAt: '2026-10-25T01:00:00Z', endsAt: '2026-10-25T02:00:00Z' };
    await createBooking(world.manager.actor, second, now);
    const technicianId = world.manager.actor.publicId;
    const { id: positionId } = (await (
      await ask(enterPosition, { body: { code: 'Y', name: 'long' } })
    ).json()) as PositionView;
    const long = {
      ...first,
      positionId,
      technicianId,
      startsAt: '2026-10-20T08:00:00Z',
      endsAt: '2026-10-30T09:00:00Z',
    };
    const tooLong = { ...long, endsAt: '2026-10-30T09:15:00Z' };
    await expect(createBooking(world.manager.actor, tooLong, now)).rejects.toThrow('another look');
    await createBooking(world.manager.actor, long, now);
  });
});

test('the command enters a position, and says which words it knows', async () => {
  const quiet = jest.spyOn(process.stderr, 'write').mockImplementation(() => true);
  await positionAdd(['C', 'Loop', '--can=magnetic-field', '--description=9 kHz to 30 MHz']);
  await expect(positionAdd(['D', 'Table', '--can=magic'])).rejects.toMatchObject({
    issues: [expect.objectContaining({ pointer: '/capabilities/0' })],
  });
  await expect(positionAdd(['D'])).rejects.toThrow('position-add CODE NAME');
  quiet.mockRestore();
  const { items } = (await (await ask(listPositions, { who: world.technician })).json()) as { items: PositionView[] };
  expect(items[0]).toMatchObject({ code: 'C', name: 'Loop', capabilities: ['magnetic-field'], state: 'in-use' });
});
