import { renderToStaticMarkup } from 'react-dom/server';
import type { Actor } from '@/auth/actor';
import { closePasswordWorkers } from '@/auth/passwordWorker';
import { changeJob, createJob } from '@/services/jobs';
import { createState } from '@/services/samples';
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

type Page = (props: {
  params: Promise<{ id: string }>;
  searchParams: Promise<Record<string, string | string[] | undefined>>;
}) => Promise<React.ReactNode>;

const PAGES = {
  jobs: () => import('@/app/(lab)/jobs/page'),
  'jobs/new': () => import('@/app/(lab)/jobs/new/page'),
  'jobs/[id]': () => import('@/app/(lab)/jobs/[id]/page'),
  'samples/[id]': () => import('@/app/(lab)/samples/[id]/page'),
  products: () => import('@/app/(lab)/products/page'),
  'products/[id]': () => import('@/app/(lab)/products/[id]/page'),
  sweeps: () => import('@/app/(lab)/sweeps/page'),
  equipment: () => import('@/app/(lab)/equipment/page'),
};
type Name = keyof typeof PAGES;

const idFor = (name: Name) =>
  name.startsWith('jobs') ? world.job.id : name.startsWith('samples') ? world.sample.id : world.product.id;

async function markup(
  who: Actor,
  name: Name,
  { id, query = {} }: { id?: string; query?: Record<string, string> } = {},
): Promise<string> {
  reader = who;
  const page = (await PAGES[name]()).default as Page;
  return renderToStaticMarkup(
    await page({ params: Promise.resolve({ id: id ?? idFor(name) }), searchParams: Promise.resolve(query) }),
  );
}
const words = (html: string) =>
  html
    .replace(/<[^>]+>/g, ' ')
    .replace(/\s+/g, ' ')
    .replace(/ ([.,:;])/g, '$1');
const NOT_FOUND = { digest: 'NEXT_HTTP_ERROR_FALLBACK;404' };

describe.each(Object.keys(PAGES) as Name[])('/%s', (name) => {
  test('keeps the policy on styles: none stands in the markup', async () => {
    expect((await markup(world.manager.actor, name)).match(/\sstyle="[^"]*"/g) ?? []).toEqual([]);
  });
  test('says under, over and the rest, never pass or fail', async () => {
    expect(words(await markup(world.manager.actor, name))).not.toMatch(/\b(pass|fail)(ed|es|s)?\b/i);
  });
  test('has one heading of its own and no bare sign before a margin', async () => {
    const html = await markup(world.technician.actor, name);
    expect(html.match(/<h1/g)).toHaveLength(1);
    expect(words(html)).not.toMatch(/[−+]\d+\.\d dB\b/);
  });
});

describe('a designer', () => {
  test.each(['jobs/[id]', 'samples/[id]', 'products/[id]'] as const)(
    'of another organisation finds nothing at /%s',
    async (name) => {
      await expect(markup(world.outsider.actor, name)).rejects.toMatchObject(NOT_FOUND);
    },
  );
  test.each(['equipment', 'jobs/new'] as const)('finds nothing at /%s', async (name) => {
    await expect(markup(world.designer.actor, name)).rejects.toMatchObject(NOT_FOUND);
  });
  test.each(['jobs', 'products', 'sweeps'] as const)('sees only their own organisation in /%s', async (name) => {
    expect(words(await markup(world.designer.actor, name))).toContain('LD-40');
    expect(words(await markup(world.outsider.actor, name))).not.toContain('LD-40');
  });
  const acts = (html: string) =>
    html.match(/<button[^>]*class="btn (?!btn-plain column-opener)[^>]*>[^<]*|sweeps\/new|jobs\/new/g) ?? [];
  test.each(['jobs/[id]', 'samples/[id]', 'sweeps', 'jobs'] as const)(
    'reads /%s without anything to change and without the history',
    async (name) => {
      const html = await markup(world.designer.actor, name);
      expect(acts(html)).toEqual([]);
      expect(words(html)).not.toContain('History');
    },
  );
  test('changes nothing of an own product but what it is declared to run at', async () => {
    const html = await markup(world.designer.actor, 'products/[id]');
    expect(acts(html).map((act) => act.replace(/<[^>]*>/, ''))).toEqual(['Declare a clock']);
    expect(words(html)).not.toContain('History');
  });
});

describe('what the sheets say of the one run', () => {
  test('the sample stands not covered while one polarisation is missing, and names it', async () => {
    const text = words(await markup(world.technician.actor, 'samples/[id]'));
    expect(text).toContain('Enclosure is not covered in M0. Vertical polarisation is not measured.');
    expect(text).toContain('port not covered');
    expect(text).toContain(world.run.number);
  });
  test('its chart is drawn from the kept layer and leads to the run', async () => {
    const html = await markup(world.designer.actor, 'samples/[id]');
    const cells = html.matchAll(/<a[^>]*data-cell[^>]*href="([^"]+)"[^>]*><figure role="img" aria-label="([^"]+)"/g);
    const drawn = new Map([...cells].map(([, href, label]) => [href, label]));
    expect(drawn.get(`/sweeps/${world.run.id}`)).toBe('M0, enclosure: worst 6.2 over, needs a final');
  });
  test('upload leads to the newest fitted state, by key too', async () => {
    const html = await markup(world.technician.actor, 'samples/[id]');
    expect(/<a[^>]*data-key="U"[^>]*href="([^"]+)"/.exec(html)?.[1]).toBe(
      `/sweeps/new?state=${world.sample.states[0]!.id}`,
    );
  });
  test('the list of one sample shows its runs, of another organisation nothing', async () => {
    const query = { sample: world.sample.id };
    expect(words(await markup(world.designer.actor, 'sweeps', { query }))).toContain(world.run.number);
    await expect(markup(world.outsider.actor, 'sweeps', { query })).rejects.toMatchObject(NOT_FOUND);
  });
  test('equipment says how sure each limit line is, and what its tables hold', async () => {
    const text = words(await markup(world.technician.actor, 'equipment'));
    expect(text).toContain('every line is verified against its source');
    expect(text).toMatch(/30–230 MHz: 40\.0 dBµV\/m/);
    expect(text).toContain('2 rows, revision 1');
  });
});

test.each(['jobs', 'products', 'sweeps', 'equipment'] as const)(
  'a cursor of no list is no address of /%s',
  async (name) => {
    await expect(markup(world.manager.actor, name, { query: { after: 'bm9uZQ' } })).rejects.toMatchObject(NOT_FOUND);
  },
);

test('a planned state says what it has to bring, and waits for being fitted', async () => {
  await createState(world.technician.actor, world.sample.id, { description: 'ferrite on the lead', planned: true });
  const text = words(await markup(world.technician.actor, 'samples/[id]'));
  expect(text).toMatch(/M1, enclosure|state M1, planned/);
  expect(text).toContain('planned, not fitted yet');
  expect(text).toContain('Mark as fitted');
  expect(text).not.toContain('Upload to M1');
});

test('a declined job says why, to its designer too, and takes no sample', async () => {
  const reason = 'the limit runs to 40 GHz; position A ends at 6 GHz';
  await changeJob(world.manager.actor, world.job.id, world.job.version, { state: 'declined', stateReason: reason });
  expect(words(await markup(world.designer.actor, 'jobs/[id]'))).toContain(`Declined: ${reason}.`);
  expect(words(await markup(world.technician.actor, 'jobs/[id]'))).toContain('waits for the job to be open');
  expect(words(await markup(world.manager.actor, 'jobs/[id]'))).toMatch(/declined \d+ \w+ \d{4} by manager/);
});

test('a long list goes onward by its cursor and back to the first page, each job once', async () => {
  const { id: productId } = world.product;
  for (let i = 0; i < 30; i++) {
    await createJob(world.manager.actor, { productId, title: `another ${i}`, decisionRule: 'guarded-by-u' });
  }
  const numbers = (html: string) => html.match(/HL-\d{4,}(?=<\/a>)/g) ?? [];
  const first = await markup(world.manager.actor, 'jobs');
  const after = /href="\/jobs\?after=([\w-]+)"[^>]*>Next/.exec(first)?.[1];
  const second = await markup(world.manager.actor, 'jobs', { query: { after: after! } });
  expect(words(first)).toContain('Of these 25 jobs 25 are open.');
  expect([numbers(first).length, numbers(second).length]).toEqual([25, 6]);
  expect(new Set([...numbers(first), ...numbers(second)]).size).toBe(31);
  expect(second).toMatch(/href="\/jobs"[^>]*>First/);
});
