import { renderToStaticMarkup } from 'react-dom/server';
import type { Actor } from '@/auth/actor';
import { closePasswordWorkers } from '@/auth/passwordWorker';
import { freshDatabase, type TestDatabase } from '../../support/database';
import { enterWorld, type World } from '../../support/world';

let reader: Actor;
jest.mock('@/app/requireActor', () => ({ requireActor: async () => reader }));
jest.mock('next/navigation', () => ({
  ...jest.requireActual<object>('next/navigation'),
  useRouter: () => ({}),
  usePathname: () => '/',
}));

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

async function markup(who: Actor, query: Record<string, string>): Promise<string> {
  reader = who;
  const { default: Page } = await import('@/app/(lab)/finals/page');
  return renderToStaticMarkup(await Page({ searchParams: Promise.resolve(query) }));
}
const words = (html: string) => html.replace(/<[^>]+>/g, ' ').replace(/\s+/g, ' ');
const NOT_FOUND = { digest: 'NEXT_HTTP_ERROR_FALLBACK;404' };

test('a run’s sheet has a row for each emission, its cells named, and says how it is measured and from where', async () => {
  const html = await markup(world.technician.actor, { run: world.run.id });
  const text = words(html);
  expect(text).toContain('Finals, enclosure');
  expect(text).toContain('Horizontal polarisation');
  expect(text).toMatch(/144\.000 MHz T-\d\d-001 QP needs a final, 6\.2 over/);
  expect(text).toContain('Quasi-peak at 144.000 MHz, in dBµV');
  expect(text).toContain(`As in run ${world.run.number}`);
  expect(text).toContain('120 kHz bandwidth, as the limit lines ask');
  expect(text).toContain('Keep finals');
  expect(text).toContain('Pre-compliance record, not a certificate.');
  expect(html).toContain('value="144.000"');
  expect(html.match(/<h1/g)).toHaveLength(1);
  expect(html.match(/\sstyle="[^"]*"/g) ?? []).toEqual([]);
});

test('the sheet of a port says so when nothing waits', async () => {
  const query = { state: world.sample.states[0]!.id, port: 'ac-mains' };
  expect(words(await markup(world.manager.actor, query))).toContain('Nothing waits for a final here.');
});

test('a designer, an address that asks for nothing, and a run that is none are not found', async () => {
  for (const [who, query] of [
    [world.designer.actor, { run: world.run.id }],
    [world.technician.actor, {}],
    [world.technician.actor, { state: world.sample.states[0]!.id, port: 'lid' }],
    [world.technician.actor, { run: 'x'.repeat(16) }],
  ] as const) {
    await expect(markup(who, query)).rejects.toMatchObject(NOT_FOUND);
  }
});
