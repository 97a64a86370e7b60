import type { Browser } from 'playwright-core';
import { launchBrowser, testOrigin } from '../support/browser';
import { violations } from './axe';
import { findRun, openAs, type Window } from './people';

/* What a product is declared to run at, as its designer declares it and as the run sheet uses it. */

let browser: Browser;
let designer: Window;
let technician: Window;

beforeAll(async () => {
  browser = await launchBrowser();
  designer = await openAs(browser, 'teo');
  technician = await openAs(browser, 'mira');
  // A development server compiles what is asked for first.
  for (const { page } of [designer, technician]) page.setDefaultTimeout(90_000);
}, 180_000);
afterAll(async () => {
  await browser.close();
});

test('a designer declares a clock, corrects it and withdraws it with a reason', async () => {
  const { page, context } = designer;
  const answer = await context.request.get(`${testOrigin()}/api/products?limit=200`);
  const { items } = (await answer.json()) as { items: { id: string; code: string }[] };
  const name = `bus ${Date.now()}`;
  await page.goto(`${testOrigin()}/products/${items.find(({ code }) => code === 'LD-40')!.id}`);
  await page.getByRole('button', { name: 'Declare a clock' }).click();
  const form = page.getByRole('form', { name: 'Declare it' });
  await form.getByLabel('Name').fill(name);
  await form.getByRole('button', { name: 'Declare it' }).click();
  await form.getByText('The frequency is a figure with its unit').waitFor();
  expect(await violations(page)).toEqual([]);
  await form.getByLabel('Frequency').fill('7,3728');
  await form.getByRole('button', { name: 'Declare it' }).click();
  const row = page.locator('li.clock', { hasText: name });
  await row.getByText('7.3728 MHz').waitFor();
  await row.getByRole('button', { name: 'Correct' }).click();
  await row.getByLabel('Spread, whole width').fill('0.5');
  await row.getByRole('button', { name: 'Save the correction' }).click();
  await row.getByText('spread 0.5 % down').waitFor();
  await row.getByRole('button', { name: 'Withdraw', exact: true }).click();
  await row.getByLabel('Reason').fill('not fitted');
  await row.getByRole('button', { name: `Withdraw ${name}` }).click();
  await page.getByText('not fitted').last().waitFor();
  expect(await row.count()).toBe(0);
}, 180_000);

test('the run sheet says how it was read, and draws the harmonics of a declared clock', async () => {
  const { page } = technician;
  const prescan = { product: 'LD-40', state: 'M2', port: 'enclosure', purpose: 'prescan', position: 'vertical' };
  const { id } = await findRun(technician, prescan);
  await page.goto(`${testOrigin()}/sweeps/${id}`);
  await page.getByRole('button', { name: 'Receiver', exact: true }).click();
  await page.getByText('Step 75 kHz is wider than half the RBW (60 kHz).').first().waitFor();
  await page.getByRole('button', { name: 'Likely sources', exact: true }).click();
  await page.getByRole('button', { name: 'Draw harmonics of 12 MHz' }).click();
  const clock = page.getByLabel('Harmonics of this clock frequency');
  expect(await clock.inputValue()).toBe('12.000 MHz');
  await page.getByRole('button', { name: 'Drawn: harmonics of 12 MHz', pressed: true }).waitFor();
  expect(await violations(page)).toEqual([]);
  await page.getByRole('button', { name: 'Drawn: harmonics of 12 MHz' }).click();
  expect(await clock.inputValue()).toBe('');
}, 180_000);
