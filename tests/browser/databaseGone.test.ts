import type { Browser, BrowserContext, Page } from 'playwright-core';
import { closeDatabase } from '@/models/database';
import { closePasswordWorkers } from '@/auth/passwordWorker';
import { PASSWORD } from '../auth/people';
import { launchBrowser } from '../support/browser';
import { goneDatabase, type GoneDatabase } from '../support/goneDatabase';
import { type RunningServer, startServer } from '../support/server';
import { enterWorld, pixel, type World } from '../support/world';
import { violations } from './axe';

/* A server and a database of this file's own: what a person sees while the database is gone, and when it is back. */

/** From the database's first answer to the page; the longest wait between two questions is 8 s. */
const BACK_WITHIN_MS = 30_000;

let database: GoneDatabase;
let server: RunningServer;
let world: World;
let browser: Browser;
let context: BrowserContext;
let page: Page;

beforeAll(async () => {
  database = await goneDatabase(3717);
  const secret = 'a session secret that only the tests use';
  const own = { DATABASE_URL: database.databaseUrl, SESSION_SECRET: secret, APP_ORIGIN: 'http://localhost:3000' };
  Object.assign(process.env, own);
  world = await enterWorld();
  server = await startServer(database);
  browser = await launchBrowser();
  context = await browser.newContext({ viewport: { width: 1440, height: 900 } });
  await signIn(context);
  page = await context.newPage();
}, 300_000);
afterAll(async () => {
  await browser?.close();
  await server?.stop();
  await closePasswordWorkers();
  await closeDatabase();
  await database?.remove();
}, 90_000);

async function signIn(who: BrowserContext): Promise<void> {
  const data = { email: world.technician.actor.email, password: PASSWORD };
  const answer = await who.request.post(`${server.origin}/api/session`, { data, headers: { origin: server.origin } });
  if (!answer.ok()) throw new Error(`${answer.status()} ${await answer.text()}`);
}
const heading = (name: string | RegExp) => page.getByRole('heading', { level: 1, name });
const gone = () => heading('The database does not answer').waitFor({ timeout: 60_000 });

/** Runs `work` while the database is gone, and brings it back whatever comes of it. */
async function whileGone(end: () => unknown, work: () => Promise<void>): Promise<void> {
  await end();
  try {
    await work();
  } finally {
    await database.startAgain();
  }
}

test('a page says what is certain, shows nothing of the inside, and comes back by itself to the same person', async () => {
  await page.goto(`${server.origin}/sweeps`);
  await page.getByRole('heading', { level: 1 }).waitFor();
  const title = await page.getByRole('heading', { level: 1 }).innerText();
  await whileGone(
    () => database.kill(),
    async () => {
      await page.goto(`${server.origin}/sweeps`);
      await gone();
      const words = await page.locator('body').innerText();
      expect(words).toMatch(/Nothing that was acknowledged is lost/);
      expect(words).toMatch(/you stay signed in/);
      expect(words).not.toMatch(/Sequelize|ECONN|SQLState| at .*\.[jt]s|mariadb/i);
      expect(await violations(page)).toEqual([]);
      for (const width of [1440, 390]) {
        await page.setViewportSize({ width, height: 844 });
        expect(await page.evaluate(() => document.documentElement.scrollWidth <= window.innerWidth)).toBe(true);
      }
      await page.getByText(/^Asked (once|\d+ times), last at/).waitFor();
      expect((await context.cookies()).some(({ name }) => name.includes('stillfield'))).toBe(true);
    },
  );
  await page.setViewportSize({ width: 1440, height: 900 });
  await heading(title).waitFor({ timeout: BACK_WITHIN_MS });
  expect(new URL(page.url()).pathname).toBe('/sweeps');
}, 180_000);

test('a link followed while it is gone leads, by itself, to where it goes', async () => {
  await page.goto(`${server.origin}/sweeps`);
  const link = page.getByRole('link', { name: world.run.number });
  await link.waitFor();
  await whileGone(
    () => database.stop(),
    async () => {
      await link.click();
      await gone();
    },
  );
  await heading(/Lumen strip driver/).waitFor({ timeout: BACK_WITHIN_MS });
  expect(new URL(page.url()).pathname).toBe(`/sweeps/${world.run.id}`);
}, 180_000);

/** How many the run has of something, asked until there are so many and the page asks for nothing more. */
async function countOf(what: string, wanted: number): Promise<number> {
  for (const until = Date.now() + BACK_WITHIN_MS; ; await page.waitForTimeout(300)) {
    const answer = await context.request.get(`${server.origin}/api/sweeps/${world.run.id}/${what}`);
    const { items } = (await answer.json()) as { items: unknown[] };
    const sent = (await section().locator('[aria-busy=true], [role=progressbar]').count()) === 0;
    if ((sent && items.length >= wanted) || Date.now() > until) return items.length;
  }
}
const section = () => page.locator('[data-section="set-up"]');
async function openSetUp(): Promise<void> {
  await page.goto(`${server.origin}/sweeps/${world.run.id}`);
  const fold = section().locator('h2 button');
  await fold.waitFor();
  if ((await fold.getAttribute('aria-expanded')) === 'false') await fold.click();
}

test('what is typed into a form stays, is sent by itself when it is back, and is done once', async () => {
  await openSetUp();
  await section().getByRole('button', { name: 'Record the set-up' }).click();
  await section().getByLabel('Cable layout').fill('lead bundled 0.4 m above the plane');
  await section().getByLabel('Temperature').fill('21,5');
  await whileGone(
    () => database.kill(),
    async () => {
      await section().locator('button[type=submit]').click();
      await section().getByText('The lab’s database does not answer just now.').waitFor();
      await section()
        .getByText(/still here and is sent again by itself/)
        .waitFor();
      expect(await section().getByLabel('Cable layout').inputValue()).toBe('lead bundled 0.4 m above the plane');
    },
  );
  expect(await countOf('setup/revisions', 1)).toBe(1);
  await section().locator('button[type=submit]').waitFor({ state: 'detached' });
  await section().getByText('lead bundled 0.4 m above the plane').waitFor();
}, 180_000);

test('a photograph that was being sent is kept once', async () => {
  await openSetUp();
  const before = world.photos.length;
  await section()
    .getByLabel('Photographs', { exact: true })
    .setInputFiles({
      name: 'table.png',
      mimeType: 'image/png',
      buffer: Buffer.from(pixel().bytes),
    });
  await section().getByLabel('Caption of photograph 1').fill('sent while it was gone');
  await whileGone(
    () => database.stop(),
    async () => {
      await section().getByRole('button', { name: 'Keep 1 photograph' }).click();
      await section().getByText('The lab’s database does not answer just now.').waitFor();
    },
  );
  expect(await countOf('photos', before + 1)).toBe(before + 1);
  await section().getByRole('img', { name: 'Sent while it was gone' }).first().waitFor();
}, 180_000);

test('signing in while it is gone waits, says so, and leads in when it is back', async () => {
  const stranger = await browser.newContext();
  const door = await stranger.newPage();
  await door.goto(`${server.origin}/sign-in?next=%2Fsweeps`);
  await door.getByLabel('Work e-mail').fill(world.technician.actor.email);
  await door.getByLabel('Password', { exact: true }).fill(PASSWORD);
  await whileGone(
    () => database.kill(),
    async () => {
      await door.getByRole('button', { name: 'Sign in' }).click();
      await door.getByText('The lab’s database does not answer just now.').waitFor();
    },
  );
  await door.waitForURL('**/sweeps', { timeout: BACK_WITHIN_MS });
  await stranger.close();
}, 180_000);
