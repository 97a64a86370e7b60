import type { Browser } from 'playwright-core';
import { launchBrowser, testOrigin } from '../support/browser';
import { findRun, LD40_OVER, openAs, PHONE, type FoundRun, type Window } from './people';

/* Two runs of the demo lab's LD-40 laid over each other: its M2 final beside its M1 final, and its trials. */

let browser: Browser;
let technician: Window;
let m1: FoundRun;
let m2: FoundRun;

beforeAll(async () => {
  browser = await launchBrowser();
  technician = await openAs(browser, 'mira');
  technician.context.setDefaultTimeout(90_000);
  m1 = await findRun(technician, { ...LD40_OVER, state: 'M1' });
  m2 = await findRun(technician, LD40_OVER);
}, 120_000);
afterAll(() => browser.close());

const finding = ({ page }: Window) => page.locator('.finding').innerText();
const beside = (a: FoundRun, b: FoundRun) => `${testOrigin()}/compare?a=${a.id}&b=${b.id}`;

test('the finding says what M2 moved against M1, and the table says it of each emission', async () => {
  const { page } = technician;
  await page.goto(beside(m1, m2));
  await page.locator('canvas').waitFor();
  expect(await finding(technician)).toMatch(
    /^M2 beside M1: \d+\.\d dB lower at \d+\.\d{3} MHz.*M2 is over, and so is M1\.$/s,
  );
  const row = page.getByRole('row', { name: /144\.018/ });
  expect((await row.innerText()).replace(/\s+/g, ' ')).toMatch(/8\.0 over 6\.2 over 1\.8 lower over over/);
  const table = await page.getByRole('table', { name: /Emissions of M2 beside M1/ }).innerText();
  expect(table).not.toMatch(/[−-]\d/);
}, 120_000);

test('the strip below shows the difference, each emission has a mark that says what moved', async () => {
  const { page } = technician;
  const mark = page.locator('[data-rank="1"]');
  expect(await mark.getAttribute('aria-label')).toBe(
    'Emission 1; 144.018 MHz; M1 8.0 over, over; M2 6.2 over, over; 1.8 lower',
  );
  await page.getByText('10lower').first().waitFor();
}, 60_000);

test('↓ chooses the next row, arrows in the chart go from emission to emission, + asks for a finer difference, L shows levels', async () => {
  const { page } = technician;
  await page.keyboard.press('ArrowDown');
  await page.locator('tr[data-chosen]', { hasText: '156.020' }).waitFor();
  await page.locator('[data-rank="1"]').focus();
  await page.keyboard.press('ArrowRight');
  await page.waitForFunction(() => !['1', null].includes(document.activeElement!.getAttribute('data-rank')));
  const finer = page.waitForResponse((response) => response.url().includes('/api/comparisons?'));
  await page.keyboard.press('+');
  await page.keyboard.press('+');
  const answer = await finer;
  expect(answer.status()).toBe(200);
  expect(answer.url()).toContain('only=columns');
  await page.keyboard.press('0');
  await page.keyboard.press('l');
  await page.getByRole('group', { name: 'Level chart of both runs' }).waitFor();
  await page.keyboard.press('Shift+ArrowRight');
  await page.locator('[aria-live="polite"]', { hasText: /MHz, M2 .*, M1 / }).waitFor({ state: 'attached' });
}, 60_000);

test('turned round, what was lower is higher', async () => {
  const { page } = technician;
  await page.getByRole('button', { name: /Turn round/ }).click();
  await page.waitForURL(`**/compare?a=${m2.id}&b=${m1.id}`);
  await page
    .getByText(/M1 beside M2/)
    .first()
    .waitFor();
  expect(await finding(technician)).toMatch(/M1 beside M2: \d+\.\d dB higher at/);
}, 60_000);

test('from the run sheet: O goes to the choice of runs, the likeliest first, and the form leads here', async () => {
  const { page } = technician;
  await page.goto(`${testOrigin()}/sweeps/${m2.id}`);
  await page.locator('canvas').first().waitFor();
  await page.keyboard.press('o');
  const choice = page.getByLabel(`Lay ${m2.number} over`);
  expect(await choice.evaluate((element) => element === document.activeElement)).toBe(true);
  expect(await choice.locator('option:checked').innerText()).toContain('M1, enclosure, horizontal, final');
  await page.getByRole('button', { name: 'Lay over each other' }).click();
  await page.waitForURL(`**/compare?b=${m2.id}&a=${m1.id}`);
  await page
    .getByText(/M2 beside M1/)
    .first()
    .waitFor();
}, 120_000);

test('the sample sheet lists trials apart, with what each moved, and leads to the two over each other', async () => {
  const { page } = technician;
  await page.goto(`${testOrigin()}/samples/${m2.sampleId}`);
  const trials = page.getByRole('table', { name: /Trials under M2/ });
  // The story's own; other tests may try foil again.
  const row = trials.getByRole('row', { name: /foil on lid/ }).last();
  expect((await row.innerText()).replace(/\s+/g, ' ')).toMatch(/5\.4 over 1\.1 lower at 144\.000 MHz/);
  const runs = page.getByRole('table', { name: 'Runs of M2' });
  expect(await runs.innerText()).not.toContain('foil on lid');
  await row.getByRole('link', { name: /lower at/ }).click();
  await page.waitForURL('**/compare?**');
  await page
    .getByText(/M2 with foil on lid beside M2: /)
    .first()
    .waitFor();
}, 120_000);

test('a trial is marked on its sheet, on the list, and is not among the runs that speak for its port', async () => {
  const { page } = technician;
  const trial = await findRun(technician, { ...LD40_OVER, purpose: 'prescan', trial: 'lead twisted' });
  await page.goto(`${testOrigin()}/sweeps/${trial.id}`);
  expect(await page.getByRole('heading', { level: 1 }).innerText()).toContain('trial lead twisted');
  expect(await finding(technician)).toContain('A trial under M2, lead twisted: it speaks for nothing but itself.');
  await page.goto(`${testOrigin()}/sweeps`);
  expect(await page.getByRole('row', { name: new RegExp(trial.number) }).innerText()).toContain('trial lead twisted');
}, 120_000);

test('on a phone the sheet of two runs fits, and their designer may read it; another client’s is told there is no such page', async () => {
  const designer = await openAs(browser, 'teo', PHONE, 'dim');
  await designer.page.goto(beside(m1, m2));
  await designer.page.locator('canvas').waitFor();
  expect(await finding(designer)).toContain('M2 beside M1');
  const wide = await designer.page.evaluate(() => document.documentElement.scrollWidth - innerWidth);
  expect(wide).toBeLessThanOrEqual(1);
  expect(designer.complaints).toEqual([]);
  await designer.context.close();

  const stranger = await openAs(browser, 'hanne');
  expect((await stranger.page.goto(beside(m1, m2)))!.status()).toBe(404);
  expect(await stranger.page.content()).not.toMatch(/LD-40|Pell/);
  await stranger.context.close();
}, 120_000);

test('the browser had nothing to complain of on the way', () => {
  expect(technician.complaints).toEqual([]);
});
