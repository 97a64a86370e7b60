import { renderToStaticMarkup } from 'react-dom/server';
import type { Actor } from '@/auth/actor';
import { closePasswordWorkers } from '@/auth/passwordWorker';
import { changeRetest, listRetests } from '@/services/retests';
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

async function markup(who: Actor, query: Record<string, string> = {}): Promise<string> {
  reader = who;
  const searchParams = Promise.resolve({ sample: world.sample.id, ...query });
  const { default: Page } = await import('@/app/(lab)/retests/page');
  return renderToStaticMarkup(await Page({ searchParams }));
}
const words = (html: string) =>
  html
    .replace(/<[^>]+>/g, ' ')
    .replace(/\s+/g, ' ')
    .replace(/ ([.,:;])/g, '$1');
const NOT_FOUND = { digest: 'NEXT_HTTP_ERROR_FALLBACK;404' };

test('it opens with what waits, and lists it with its margin in words', async () => {
  const html = await markup(world.technician.actor);
  const text = words(html);
  expect(text).toContain('One needs a final.');
  expect(text).toMatch(/T-\d\d-001.*needs a final.*144\.000.*LD-40.*enclosure, horizontal.*6\.2 over/);
  expect(text).not.toMatch(/[−+]\d+\.\d dB\b/);
  expect(html.match(/<h1/g)).toHaveLength(1);
  expect(html.match(/\sstyle="[^"]*"/g) ?? []).toEqual([]);
});

test('its file and its print hold the same emissions, the print with room to write', async () => {
  const html = await markup(world.technician.actor, { port: 'enclosure' });
  expect(/href="([^"]*frequency-list[^"]*)"[^>]*download/.exec(html)?.[1]).toBe(
    `/api/retests/frequency-list?format=csv&amp;port=enclosure&amp;sampleId=${world.sample.id}`,
  );
  expect(words(html)).toContain('Take 1 frequency');
  const print = /<div class="retest-print".*$/.exec(html)![0];
  expect(words(print)).toMatch(
    /Ref Sample Measure MHz .*Reading At m, ° T-\d\d-001 S-001 M0 enclosure, horizontal 144\.000 quasi-peak 120/,
  );
});

test('its filters are the address, and a word the address does not know is as if it were not said', async () => {
  expect(words(await markup(world.technician.actor, { port: 'ac-mains' }))).toContain(
    'Nothing waits for another look.',
  );
  expect(words(await markup(world.technician.actor, { status: 'cleared' }))).toContain('No retest is like this.');
  expect(await markup(world.technician.actor, { status: 'green' })).toContain('144.000');
  const html = await markup(world.technician.actor);
  expect(words(html)).toContain(`only ${world.sample.code}, Lumen strip driver LD-40 Show all`);
  await expect(markup(world.technician.actor, { after: 'bm9uZQ' })).rejects.toMatchObject(NOT_FOUND);
});

test('a designer sees their own and can change nothing; of another client they see nothing', async () => {
  const html = await markup(world.designer.actor);
  expect(html).toContain('144.000');
  expect(html).not.toContain('retest-acts');
  const other = words(await markup(world.outsider.actor, { sample: '' }));
  expect(other).toContain('Nothing waits for another look.');
  expect(other).not.toMatch(/LD-40|Pell/);
  await expect(markup(world.outsider.actor)).rejects.toMatchObject(NOT_FOUND);
});

test('R places the chosen retest; a placed one says its day, and nothing waits', async () => {
  expect(await markup(world.technician.actor)).toMatch(/data-key="R"[^>]*>Place it/);
  const { items } = await listRetests(world.technician.actor, { limit: 1, sampleId: world.sample.id });
  const [item] = items;
  const body = { act: 'schedule', day: '2031-03-04', note: 'with M1' } as const;
  await changeRetest(world.technician.actor, item!.id, item!.version, body);
  const text = words(await markup(world.technician.actor));
  expect(text).toContain('Nothing waits. One is scheduled.');
  expect(text).toContain('for 4 Mar');
  expect(text).toContain('with M1');
});
