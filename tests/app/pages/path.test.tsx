import { renderToStaticMarkup } from 'react-dom/server';
import type { Actor } from '@/auth/actor';
import { closePasswordWorkers } from '@/auth/passwordWorker';
import { reviseUncertaintyBody } from '@/schemas/paths';
import { readPath } from '@/services/pathRecord';
import { reviseUncertainty } from '@/services/reviseUncertainty';
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
  const { default: Page } = await import('@/app/(lab)/paths/[id]/page');
  const params = Promise.resolve({ id: world.choice.pathId! });
  return renderToStaticMarkup(await Page({ params, searchParams: Promise.resolve(query) }));
}
const words = (html: string) =>
  html
    .replace(/<[^>]+>/g, ' ')
    .replace(/\s+/g, ' ')
    .replace(/ ([.,:;])/g, '$1');

async function enterBudget() {
  const { version } = await readPath(world.manager.actor, world.choice.pathId!);
  const row = (name: string, valueDb: number) => {
    return { name, valueDb, distribution: { shape: 'normal', k: 2 }, source: 'certificate 7' };
  };
  const range = { startHz: 30e6, stopHz: 1e9, contributions: [row('site imperfections', 8), row('antenna factor', 6)] };
  const budget = { prescan: [range], final: [range] };
  const body = { budget, uncertaintySource: 'the lab’s own', reason: 'certificates of June' };
  await reviseUncertainty(world.manager.actor, world.choice.pathId!, version, reviseUncertaintyBody.parse(body));
}

test('stated figures: the sheet says that they are, what is corrected, and that U covers instrumentation only', async () => {
  const text = words(await markup(world.technician.actor));
  expect(text).toContain('U is ±5.0 dB for a final and ±6.0 dB for a prescan, stated without a budget.');
  expect(text).toContain('Corrected over 20–1000 MHz.');
  expect(text).toContain('These figures are stated, not computed: made for tests.');
  expect(text).toContain('No uncertainty for a final over 20–30 MHz: levels there conclude nothing.');
  expect(text).toContain('U covers the instrumentation along this path.');
  expect(text).toContain('Final: over 30–1000 MHz U of 5.00 dB is at most Ucispr, 6.3 dB');
  expect(text).toContain(world.run.number);
});

test('a frequency that is asked for is stated, with its working open', async () => {
  const html = await markup(world.technician.actor, { mhz: '144,018' });
  expect(words(html)).toContain('Working correction at 144.018 MHz');
  expect(html).toMatch(/aria-label="correction at 144.018 MHz −14.0 dB\/m, show working" aria-expanded="true"/);
});

test('with a budget every figure opens its working, the final’s first: root of the sum of squares, k, U', async () => {
  await enterBudget();
  const html = await markup(world.technician.actor);
  const text = words(html);
  expect(text).toContain('U is ±10.0 dB for a final and ±10.0 dB for a prescan, from its budget.');
  expect(text).toContain('5.000 dB combined u root of the sum of their squares');
  expect(text).toContain('10.00 dB expanded U');
  expect(text).toContain('64 %');
  expect(text).toContain('is 3.70 dB above Ucispr, 6.3 dB');
  expect(html).toContain('aria-label="site imperfections, standard uncertainty 4.000 dB, show working"');
  expect(text).toContain('certificates of June');
});

test('the form opens with the budget as it stands, what it comes to, and Ucispr beside it', async () => {
  const { BudgetForm } = await import('@/app/(lab)/paths/[id]/BudgetForm');
  const path = await readPath(world.manager.actor, world.choice.pathId!);
  const html = renderToStaticMarkup(<BudgetForm path={path} onClose={() => {}} />);
  const text = words(html);
  expect(html.match(/value="site imperfections"/g)).toHaveLength(2);
  expect(text).toContain('u 5.000 dB, k 2.00, U 10.00 dB');
  expect(text).toContain('Over 30–1000 MHz U of 10.00 dB is 3.70 dB above Ucispr');
  expect(text).toContain('Enter revision 3 of P-1');
  expect(html.match(/\sstyle="[^"]*"/g) ?? []).toEqual([]);
});

test('an earlier revision stays readable, says so and offers no form', async () => {
  const html = await markup(world.manager.actor, { revision: '1' });
  expect(words(html)).toContain('An earlier revision; the newest is revision 2.');
  expect(html).not.toContain('data-key="E"');
});

test('only a manager revises; a designer finds nothing', async () => {
  expect(await markup(world.manager.actor)).toContain('data-key="E"');
  expect(await markup(world.technician.actor)).not.toContain('data-key="E"');
  await expect(markup(world.designer.actor)).rejects.toMatchObject({ digest: 'NEXT_HTTP_ERROR_FALLBACK;404' });
});

test('keeps the policy on styles, one heading, and never pass or fail', async () => {
  const html = await markup(world.manager.actor);
  expect(html.match(/\sstyle="[^"]*"/g) ?? []).toEqual([]);
  expect(html.match(/<h1/g)).toHaveLength(1);
  expect(words(html)).not.toMatch(/\b(pass|fail)(ed|es|s)?\b/i);
});
