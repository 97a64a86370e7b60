import { dropFiles } from '@fixtures/demo/dropFiles';
import { users } from '@fixtures/demo/people';
import type { Browser } from 'playwright-core';
import { launchBrowser, testOrigin } from '../support/browser';
import { findRun, LD40_OVER, openAs, PHONE, type Window } from './people';

let browser: Browser;
let technician: Window;
let kept = '';

beforeAll(async () => {
  browser = await launchBrowser();
  technician = await openAs(browser, null);
}, 60_000);
afterAll(() => browser.close());

const today = new Date().toISOString().slice(0, 10);
const lineL = dropFiles(today).find((file) => file.name.endsWith('_l.csv'))!;
const cut = dropFiles(today).find((file) => file.name.includes('cut'))!;
const asUpload = (file: { name: string; bytes: Uint8Array }) => ({
  name: file.name,
  mimeType: 'text/csv',
  buffer: Buffer.from(file.bytes),
});

test('a technician signs in with the keyboard alone', async () => {
  const { page } = technician;
  const { email, passphrase } = users.find(({ key }) => key === 'mira')!;
  await page.goto(`${testOrigin()}/sweeps`);
  await page.waitForURL('**/sign-in?next=%2Fsweeps');
  await page.getByLabel('Work e-mail').fill(email);
  await page.keyboard.press('Tab');
  await page.keyboard.type(passphrase);
  await page.keyboard.press('Enter');
  await page.waitForURL('**/sweeps');
  await page.getByRole('heading', { level: 1 }).waitFor();
}, 60_000);

test('a dropped file is recognised, judged before it is kept, and says what is still to be said', async () => {
  const { page } = technician;
  await page.keyboard.press('u');
  await page.waitForURL('**/sweeps/new**');
  await page.locator('input[type=file]').setInputFiles(asUpload(lineL));
  await page.getByRole('heading', { name: 'Recognise a sweep file' }).waitFor();
  await page.getByText(/Still to say: .*the operating mode/).waitFor();
  await page.getByText('needs a final').first().waitFor();
  expect(await page.getByLabel('Sample and state').inputValue()).not.toBe('');
}, 60_000);

test('it is kept with Enter and its verdict stands in the first sentence', async () => {
  const { page } = technician;
  await page.getByRole('radio', { name: 'Final' }).check();
  await page.getByLabel('Operating mode').fill('dimmed to 10 %');
  await page.getByText('Everything is said.').waitFor();
  await page.getByRole('button', { name: 'Keep as a run' }).click();
  await page.waitForURL(/\/sweeps\/[0-9a-z]{16}$/);
  kept = page.url().split('/').at(-1)!;
  expect(await page.locator('.finding').innerText()).toMatch(
    /^\d+\.\d dB (under|over) at \d\.\d{3} MHz.*: inconclusive\./,
  );
}, 60_000);

test('W opens a Working that adds up to the level in the table', async () => {
  const { page } = technician;
  await page.locator('canvas').first().waitFor();
  await page.keyboard.press('w');
  const working = page.getByRole('complementary').locator('dl').first();
  await working.getByText('limiter attenuation').waitFor();
  const rows = await working.locator('.sum-row').evaluateAll((list) =>
    list.map((row) => ({
      sign: row.querySelector('.sum-sign')!.textContent,
      figure: Number(row.querySelector('.sum-figure')!.textContent!.replace('\u2212', '-')),
      level: row.textContent!.includes('level'),
    })),
  );
  const at = rows.findIndex(({ level }) => level);
  const sum = rows.slice(0, at).reduce((total, { sign, figure }) => total + (sign === '\u2212' ? -figure : figure), 0);
  expect(Math.abs(sum - rows[at]!.figure)).toBeLessThan(0.25);
}, 60_000);

test('↓ moves the Working to the next candidate', async () => {
  const { page } = technician;
  const subject = page.locator('[data-section="working"] .column-subject');
  const before = await subject.innerText();
  await page.keyboard.press('ArrowDown');
  await page.waitForFunction(
    (text) => document.querySelector('[data-section="working"] .column-subject')?.textContent !== text,
    before,
  );
}, 60_000);

test('a truncated file is refused at its line, and nothing of it is kept', async () => {
  const { page } = technician;
  await page.goto(`${testOrigin()}/sweeps/new`);
  await page.locator('input[type=file]').setInputFiles(asUpload(cut));
  await page.getByRole('heading', { name: 'This file was not kept' }).waitFor();
  await page.getByText(/Line 4.211 has 2 columns/).waitFor();
}, 60_000);

test('the designer of that organisation sees the same sheet, without a way to change it', async () => {
  const designer = await openAs(browser, 'teo', PHONE);
  await designer.page.goto(`${testOrigin()}/sweeps/${kept}`);
  expect(await designer.page.locator('.finding').innerText()).toMatch(/inconclusive/);
  expect(await designer.page.getByRole('link', { name: /Upload/ }).count()).toBe(0);
  expect(designer.complaints).toEqual([]);
  await designer.context.close();
}, 60_000);

test('the designer of another organisation is told that there is no such page', async () => {
  const stranger = await openAs(browser, 'hanne');
  const answer = await stranger.page.goto(`${testOrigin()}/sweeps/${kept}`);
  expect(answer!.status()).toBe(404);
  expect(await stranger.page.content()).not.toMatch(/LD-40|Pell/);
  await stranger.context.close();
}, 60_000);

test('a designer is told that there is no such page where only the lab may go', async () => {
  const designer = await openAs(browser, 'teo');
  for (const path of ['/sweeps/new', '/equipment', '/jobs/new']) {
    expect((await designer.page.goto(testOrigin() + path))!.status()).toBe(404);
  }
  await designer.context.close();
}, 60_000);

test('the browser had nothing to complain of on the way', () => {
  expect(technician.complaints).toEqual([]);
});

test('zooming the chart asks for a finer window and keeps its candidates', async () => {
  const { page } = technician;
  await page.goto(`${testOrigin()}/sweeps/${(await findRun(technician, LD40_OVER)).id}`);
  await page.locator('canvas').first().waitFor();
  await page.locator('[data-rank="1"]').first().focus();
  const finer = page.waitForResponse((response) => response.url().includes('/window?'));
  await page.keyboard.press('+');
  await page.keyboard.press('+');
  expect((await finer).status()).toBe(200);
  expect(await page.locator('[data-rank="1"]').count()).toBeGreaterThan(0);
}, 60_000);
