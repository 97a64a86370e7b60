import { users } from '@fixtures/demo/people';
import type { Browser, Page } from 'playwright-core';
import { launchBrowser, testOrigin } from '../support/browser';
import { violations } from './axe';
import { type DESK, openAs, PHONE, type Window } from './people';

/* E-mail end to end, read where the demo catches it. Needs the outbox and the catcher beside the server. */

const PASSWORD = 'a lantern on the quiet mole';
const AGAIN = 'seven kelp lines at low water';

const PATIENCE_MS = 90_000;
const LIMIT_MS = 400_000;

const stamp = `${Date.now().toString(36)}`;
const EMAIL = `odo.${stamp}@kettlevane.example`;
const CLIENT = `Kettle & Vane ${stamp}`;

let browser: Browser;
let manager: Window;
let invited: Window;

beforeAll(async () => {
  browser = await launchBrowser();
  manager = await open('anselm');
  invited = await open(null);
}, 120_000);
afterAll(() => browser.close());

/** With patience for a server that compiles its pages as they are asked for. */
async function open(key: string | null, ...how: [viewport?: typeof DESK, room?: string]): Promise<Window> {
  const window = await openAs(browser, key, ...how);
  window.page.setDefaultTimeout(PATIENCE_MS);
  return window;
}

/** Opens the letters until one to that address with that subject is there, and answers the address of its link. */
async function linkIn(page: Page, address: string, subject: RegExp, not?: string): Promise<string> {
  for (const until = Date.now() + 150_000; Date.now() < until;) {
    await page.goto(`${testOrigin()}/letters`);
    const letter = page.getByRole('article').filter({ hasText: address }).filter({ hasText: subject }).first();
    const link = (await letter.count()) > 0 ? await letter.getByRole('link').first().getAttribute('href') : null;
    if (link && link !== not) return link;
    await page.waitForTimeout(500);
  }
  throw new Error(`no letter to ${address} about ${String(subject)}`);
}

const signedIn = async ({ context }: Window) =>
  (await context.request.get(`${testOrigin()}/api/session`)).status() === 200;

test(
  'a manager invites a designer of a new client, and sees the e-mail go',
  async () => {
    const { page } = manager;
    await page.goto(`${testOrigin()}/people`);
    await page.getByRole('link', { name: 'Invite a person' }).click();
    await page.waitForURL('**/people/new');
    await page.waitForLoadState('networkidle');
    await page.getByRole('radio', { name: 'New client' }).check();
    await page.getByLabel('Name of the client').fill(CLIENT);
    await page.getByLabel('Name', { exact: true }).fill('Odo Fenn');
    await page.getByLabel('Work e-mail').fill(EMAIL);
    await page.getByRole('button', { name: 'Enter them and send the invitation' }).click();
    await page.waitForURL(/\/people\/[0-9a-z]{16}$/);
    await page.getByText(/Invited: e-mail sent/).waitFor({ timeout: 90_000 });
    await page.goto(`${testOrigin()}/people`);
    await page.getByRole('row').filter({ hasText: EMAIL }).getByText('invited').waitFor();
  },
  LIMIT_MS,
);

test(
  'the letter is read signed out; its link sets the first password and signs in',
  async () => {
    const { page } = invited;
    const requests: string[] = [];
    page.on('request', (request) => requests.push(`${request.url()} ${request.headers().referer ?? ''}`));
    const link = await linkIn(page, EMAIL, /your invitation to Stillfield/);
    expect(await violations(page)).toEqual([]);
    const token = link.split('#')[1]!;
    await page.goto(link);
    await page.getByText('Odo Fenn').waitFor();
    await page.getByText(CLIENT).waitFor();
    await page.getByLabel('New password').fill('short');
    await page.keyboard.press('Enter');
    await page.getByText(/takes at least 12 characters/).waitFor();
    await page.getByLabel('New password').fill(PASSWORD);
    await page.getByRole('button', { name: 'Set it and sign in' }).click();
    await page.waitForURL((url) => !url.pathname.startsWith('/invitation'));
    expect(await signedIn(invited)).toBe(true);
    // no server and no Referer has seen the token
    expect(requests.filter((line) => line.includes(token) && !line.split('#')[1])).toEqual([]);
    await page.goto(link);
    await page.getByText('This link opens nothing.').waitFor();
  },
  LIMIT_MS,
);

test(
  'a forgotten password comes back by e-mail, works once, and ends the sessions',
  async () => {
    expect(await signedIn(invited)).toBe(true);
    const stranger = await open(null, PHONE);
    const { page } = stranger;
    await page.goto(`${testOrigin()}/sign-in`);
    await page.getByRole('link', { name: 'Forgotten password' }).click();
    await page.waitForURL('**/forgotten-password');
    await page.waitForLoadState('networkidle');
    await page.getByLabel('Work e-mail').fill(EMAIL);
    await page.getByRole('button', { name: 'Send me a link' }).click();
    await page.getByText('Asked for.').waitFor();
    const first = await linkIn(page, EMAIL, /choose a new password/);
    // asking again ends the earlier link
    await page.goto(`${testOrigin()}/forgotten-password`, { waitUntil: 'networkidle' });
    await page.getByLabel('Work e-mail').fill(EMAIL);
    await page.getByRole('button', { name: 'Send me a link' }).click();
    await page.getByText('Asked for.').waitFor();
    const second = await linkIn(page, EMAIL, /choose a new password/, first);
    await page.goto(first);
    await page.getByText('This link opens nothing.').waitFor();
    await page.goto('about:blank');
    await page.goto(second);
    await page.getByLabel('New password').fill(AGAIN);
    await page.getByRole('button', { name: 'Set the new password' }).click();
    await page.getByText('Your new password is set.').waitFor();
    expect(new URL(page.url()).hash).toBe('');
    expect(await signedIn(invited)).toBe(false);
    await page.getByRole('link', { name: 'Sign in' }).click();
    await page.waitForURL('**/sign-in');
    await page.waitForLoadState('networkidle');
    await page.getByLabel('Work e-mail').fill(EMAIL);
    await page.getByLabel('Password', { exact: true }).fill(AGAIN);
    await page.keyboard.press('Enter');
    await page.waitForURL((url) => !url.pathname.startsWith('/sign-in'));
    expect(await signedIn(stranger)).toBe(true);
    expect(stranger.complaints.filter((line) => !/409|401/.test(line))).toEqual([]);
    await stranger.context.close();
  },
  LIMIT_MS,
);

test(
  'an unknown address is answered in the same words',
  async () => {
    const nobody = await open(null);
    await nobody.page.goto(`${testOrigin()}/forgotten-password`, { waitUntil: 'networkidle' });
    await nobody.page.getByLabel('Work e-mail').fill(`nobody.${stamp}@kettlevane.example`);
    await nobody.page.getByRole('button', { name: 'Send me a link' }).click();
    await nobody.page.getByText('Asked for.').waitFor();
    await nobody.context.close();
  },
  LIMIT_MS,
);

test(
  'a manager disables the person with a reason, and they are out at once',
  async () => {
    const { page } = manager;
    await page.goto(`${testOrigin()}/people`);
    await page.getByRole('row').filter({ hasText: EMAIL }).getByRole('link').click();
    await page.waitForURL(/\/people\/[0-9a-z]{16}$/);
    await page.waitForLoadState('networkidle');
    await page.getByRole('button', { name: 'Disable with a reason' }).click();
    await page.getByLabel('The reason').fill('the project ended');
    await page.getByRole('button', { name: 'Disable Odo Fenn' }).click();
    await page.getByText(/Disabled: since .*: the project ended/).waitFor();
    const context = await browser.newContext();
    const refused = await context.request.post(`${testOrigin()}/api/session`, {
      data: { email: EMAIL, password: AGAIN },
      headers: { origin: testOrigin() },
    });
    expect(refused.status()).toBe(401);
    await context.close();
  },
  LIMIT_MS,
);

test(
  'one’s own password is changed with the old one',
  async () => {
    const { email, passphrase } =
      users.find(({ key }) => key === 'ines') ?? users.find(({ role }) => role === 'designer')!;
    const window = await open(users.find((user) => user.email === email)!.key);
    const { page } = window;
    const change = async (current: string, password: string) => {
      await page.goto(`${testOrigin()}/account`, { waitUntil: 'networkidle' });
      await page.getByRole('button', { name: 'Change the password' }).click();
      await page.getByLabel('Password you have now').fill(current);
      await page.getByLabel('New password').fill(password);
      await page.getByRole('button', { name: 'Set the new password' }).click();
    };
    await change('not this one at all', AGAIN);
    await page.getByText('The password is not the one you have now.').waitFor();
    await change(passphrase, AGAIN);
    await page.getByText(/Your new password is set/).waitFor();
    // and back, so that the demo's sign-ins stay as they are printed
    await change(AGAIN, passphrase);
    await page.getByText(/Your new password is set/).waitFor();
    expect(await signedIn(window)).toBe(true);
    await window.context.close();
  },
  LIMIT_MS,
);

test(
  'a technician and a designer find no people, in the top line or behind it',
  async () => {
    for (const key of ['mira', 'teo']) {
      const window = await open(key);
      await window.page.goto(testOrigin());
      expect(await window.page.getByRole('link', { name: 'People' }).count()).toBe(0);
      for (const path of ['/people', '/people/new', '/people/0000000000000000']) {
        expect((await window.page.goto(testOrigin() + path))!.status()).toBe(404);
      }
      await window.context.close();
    }
  },
  LIMIT_MS,
);

test('the browser had nothing to complain of on the way', () => {
  // a spent link is answered 409, somebody signed out 401
  const expected = /status of (400|401|404|409)/;
  expect([...manager.complaints, ...invited.complaints].filter((line) => !expected.test(line))).toEqual([]);
});
