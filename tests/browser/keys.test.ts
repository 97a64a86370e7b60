import type { Browser } from 'playwright-core';
import { launchBrowser, testOrigin } from '../support/browser';
import { openAs, type Window } from './people';

/* The single keys of the design's section 9 that have something to act on, and when they are silent. */

let browser: Browser;
beforeAll(async () => {
  browser = await launchBrowser();
}, 60_000);
afterAll(() => browser.close());

async function anyRun({ context }: Window): Promise<string> {
  const answer = await context.request.get(`${testOrigin()}/api/sweeps?limit=1`);
  return ((await answer.json()) as { items: { id: string }[] }).items[0]!.id;
}

test('/ from any sheet goes to Find with the cursor in its field, and Enter finds', async () => {
  const window = await openAs(browser, 'mira');
  const { page } = window;
  await page.goto(`${testOrigin()}/equipment`);
  await page.getByRole('heading', { level: 1 }).waitFor();
  await page.keyboard.press('/');
  await page.waitForURL('**/find');
  await page.waitForFunction(() => document.activeElement?.getAttribute('name') === 'q');
  await page.keyboard.type('LISN');
  await page.keyboard.press('Enter');
  await page.locator('.find-row').first().waitFor();
  await page.keyboard.press('ArrowDown');
  expect(await page.evaluate(() => document.activeElement?.textContent)).toMatch(/^AMN-/);
  expect(window.complaints).toEqual([]);
  await window.context.close();
}, 60_000);

test('N opens a note where the column is, and Esc closes it with nothing written', async () => {
  const window = await openAs(browser, 'mira');
  const { page } = window;
  await page.goto(`${testOrigin()}/sweeps/${await anyRun(window)}`);
  await page.locator('canvas').first().waitFor();
  await page.keyboard.press('n');
  const field = page.getByLabel('Note', { exact: true });
  await field.waitFor();
  await page.keyboard.type('n w l / are letters here');
  expect(await field.inputValue()).toBe('n w l / are letters here');
  await page.keyboard.press('Escape');
  await field.waitFor({ state: 'detached' });
  await window.context.close();
}, 60_000);

test('? lists the keys of the sheet, Esc closes the list, and turned off the keys are silent', async () => {
  const window = await openAs(browser, 'mira');
  const { page } = window;
  await page.goto(`${testOrigin()}/sweeps/${await anyRun(window)}`);
  await page.locator('canvas').first().waitFor();
  await page.keyboard.press('?');
  const dialog = page.getByRole('dialog');
  await dialog.waitFor();
  for (const says of ['working', 'margin or level', 'write a note', 'Upload sweep files', 'Find']) {
    await dialog.getByText(says, { exact: true }).first().waitFor();
  }
  await dialog.getByRole('radio', { name: 'off' }).check();
  await page.keyboard.press('Escape');
  await dialog.waitFor({ state: 'hidden' });
  await page.keyboard.press('/');
  await page.keyboard.press('n');
  await page.waitForTimeout(300);
  expect(page.url()).toMatch(/\/sweeps\/[0-9a-z]{16}$/);
  expect(await page.getByLabel('Note', { exact: true }).count()).toBe(0);
  await window.context.close();
}, 60_000);

test('a note is written once by a double click, and the designer reads it only when it is for both sides', async () => {
  const lab = await openAs(browser, 'mira');
  const id = await (async () => {
    const answer = await lab.context.request.get(`${testOrigin()}/api/sweeps?limit=200`);
    const { items } = (await answer.json()) as { items: { id: string; organisation: { name: string } }[] };
    return items.find(({ organisation }) => organisation.name.startsWith('Pell'))!.id;
  })();
  const words = `lead held to the plane ${Date.now()}`;
  const { page } = lab;
  await page.goto(`${testOrigin()}/sweeps/${id}`);
  await page.locator('canvas').first().waitFor();
  await page.keyboard.press('n');
  await page.getByLabel('Note', { exact: true }).fill(words);
  await page.getByLabel('The client’s designers read it too').check();
  await page.getByRole('button', { name: 'Write it for both sides' }).dblclick();
  await page.locator('.column-note', { hasText: words }).waitFor();
  const answer = await lab.context.request.get(`${testOrigin()}/api/notes?sweepId=${id}`);
  const { items } = (await answer.json()) as { items: { text: string }[] };
  expect(items.filter(({ text }) => text === words)).toHaveLength(1);
  const designer = await openAs(browser, 'teo');
  await designer.page.goto(`${testOrigin()}/sweeps/${id}`);
  await designer.page.locator('.column-note', { hasText: words }).waitFor();
  await lab.context.close();
  await designer.context.close();
}, 60_000);
