import { readFileSync } from 'node:fs';
import type { APIResponse, Browser } from 'playwright-core';
import { launchBrowser, testOrigin } from '../support/browser';
import { DESK, openAs, PHONE, type Window } from './people';

/* Finals typed at the bench, on a sample of this test's own. */

const AXE = readFileSync(require.resolve('axe-core/axe.min.js'), 'utf8');

let browser: Browser;
let technician: Window;
let runId = '';
let stateId = '';

const ok = async (answer: APIResponse) => {
  if (!answer.ok()) throw new Error(`${answer.url()}: ${answer.status()} ${await answer.text()}`);
  return (await answer.json()) as { id: string } & Record<string, unknown>;
};
const headers = () => ({ origin: testOrigin() });
const get = (path: string) => technician.context.request.get(`${testOrigin()}/api/${path}`).then(ok);
const post = (path: string, data: object) =>
  technician.context.request.post(`${testOrigin()}/api/${path}`, { data, headers: headers() }).then(ok);

/** 30 to 1000 MHz in steps of 100 kHz at 34 dBµV, three readings a peak prescan cannot decide, below 230 MHz. */
function sweepFile(): Buffer {
  const high: Record<number, number> = { 50: 61, 120: 56.5, 190: 57 };
  const rows = Array.from({ length: 9701 }, (_, i) => `${((300 + i) / 10).toFixed(3)},${high[(300 + i) / 10] ?? 34}`);
  return Buffer.from(['RBW,120 kHz', 'Detector,Peak', 'Frequency (MHz),Level (dBuV)', ...rows, ''].join('\n'));
}

beforeAll(async () => {
  browser = await launchBrowser();
  technician = await openAs(browser, 'mira');
  type Named = { items: { id: string; number: string; state: string; code: string; name: string }[] };
  const list = async (path: string) => ((await get(`${path}?limit=200`)) as unknown as Named).items;
  const job = (await list('jobs')).find(({ number, state }) => number.endsWith('11') && state === 'open')!;
  const sample = await post(`jobs/${job.id}/samples`, { serial: `FN-${Date.now()}` });
  const [state] = sample.states as { id: string }[];
  const file = await technician.context.request
    .post(`${testOrigin()}/api/sweep-files`, {
      headers: headers(),
      multipart: { file: { name: 'finals.csv', mimeType: 'text/csv', buffer: sweepFile() } },
    })
    .then(ok);
  const path = (await list('signal-paths')).find(({ code }) => code === 'P-3')!;
  const set = (await list('limit-sets')).find(({ name }) => /CISPR 32 class B.*3 m/.test(name) && !/GHz/.test(name))!;
  const run = await post('sweeps', {
    ...{ fileId: file.id, stateId: state!.id, pathId: path.id, limitSetId: set.id, operatingMode: 'full load' },
    ...{ purpose: 'prescan', port: 'enclosure', polarisation: 'horizontal', distanceM: 3, heightSwept: true },
    ...{ valuesHold: 'receiver-input', frequencyUnit: 'MHz' },
    traces: [{ index: 0, name: 'Peak', unit: 'dBuV', detector: 'peak', rbwHz: 120e3 }],
  });
  [stateId, runId] = [state!.id, run.id];
}, 180_000);
afterAll(() => browser.close());

const open = async ({ page }: Window, query = `?run=${runId}`) => {
  await page.goto(`${testOrigin()}/finals${query}`, { waitUntil: 'load' });
  await page.getByRole('heading', { level: 1, name: 'Finals, enclosure' }).waitFor();
};
const rows = ({ page }: Window) => page.locator('li.final');
const focused = ({ page }: Window) =>
  page.evaluate(() => document.activeElement?.closest('.final-cell')?.querySelector('label')?.textContent ?? '');

test('F on the run opens its finals, and they are typed without the mouse', async () => {
  const { page } = technician;
  await page.goto(`${testOrigin()}/sweeps/${runId}`, { waitUntil: 'load' });
  await page.keyboard.press('f');
  await page.waitForURL(/\/finals\?run=/);
  await rows(technician).first().waitFor();
  expect(await rows(technician).count()).toBe(3);
  await page.waitForFunction(() => document.documentElement.dataset.keys !== undefined);
  await page.keyboard.press('ArrowDown');
  expect(await focused(technician)).toMatch(/^Quasi-peak/);
  await page.keyboard.type('41,5');
  await page.keyboard.press('Enter');
  expect(await focused(technician)).toMatch(/^Height/);
  await page.keyboard.type('1,2');
  await page.keyboard.press('ArrowDown');
  expect(await focused(technician)).toMatch(/^Height/);
  await page.keyboard.type('9');
  await page.keyboard.press('Escape');
  expect(
    await page
      .locator('li.final')
      .nth(1)
      .getByLabel(/^Height/)
      .inputValue(),
  ).toBe('');
  await rows(technician)
    .first()
    .getByText(/ under$/)
    .first()
    .waitFor();
  expect(await page.getByRole('button', { name: 'Keep 1 final' }).count()).toBe(1);
  expect(technician.complaints).toEqual([]);
}, 120_000);

test('what is no figure is said at its cell, and nothing is kept until it is put right', async () => {
  const { page } = technician;
  const second = rows(technician).nth(1);
  await second.getByLabel(/^Quasi-peak/).fill('4l,5');
  await second.getByText('no figure', { exact: true }).waitFor();
  expect(await page.getByRole('button', { name: 'Keep finals' }).getAttribute('aria-disabled')).toBe('true');
  await second.getByLabel(/^Quasi-peak/).fill('');
}, 60_000);

test('leaving asks first, and staying keeps what is typed', async () => {
  const { page } = technician;
  await page.getByRole('link', { name: 'Show in the queue' }).click();
  await page.getByText('Leave with 1 final not kept?').waitFor();
  await page.getByRole('button', { name: 'Stay' }).click();
  expect(
    await rows(technician)
      .first()
      .getByLabel(/^Quasi-peak/)
      .inputValue(),
  ).toBe('41,5');
}, 60_000);

test('without a network nothing is lost; with it a double click keeps once, and what is empty stays waiting', async () => {
  const { page, context } = technician;
  await context.setOffline(true);
  await page.getByRole('button', { name: 'Keep 1 final' }).click();
  await page.getByText('What you entered is still here', { exact: false }).first().waitFor();
  await context.setOffline(false);
  const kept = page.locator('.message-under').filter({ hasText: '1 final kept.' });
  await page
    .getByRole('button', { name: 'Keep 1 final' })
    .dblclick({ timeout: 5000 })
    .catch(() => undefined);
  await kept.waitFor({ timeout: 60_000 });
  expect(await kept.innerText()).toMatch(/T-\d\d-\d+ cleared: under in R-\d\d-\d+/);
  await page.waitForFunction(() => document.querySelectorAll('li.final').length === 2);
  type Runs = { items: { purpose: string; id: string }[] };
  const { items } = (await get(`sweeps?limit=50&stateId=${stateId}`)) as unknown as Runs;
  expect(items.filter(({ purpose }) => purpose === 'final')).toHaveLength(1);
  await kept.getByRole('link').first().click();
  await page.waitForURL(/\/sweeps\/[0-9a-z]{16}$/);
  await page.locator('canvas').first().waitFor();
  technician.complaints = technician.complaints.filter((one) => !/ERR_INTERNET_DISCONNECTED/.test(one));
  expect(technician.complaints).toEqual([]);
}, 180_000);

test('on a phone each emission is a card; nothing is wider than the screen, nothing too small to touch', async () => {
  const phone = await openAs(browser, 'mira', PHONE);
  await open(phone, `?state=${stateId}&port=enclosure`);
  const wide = await phone.page.evaluate(() => document.documentElement.scrollWidth - window.innerWidth);
  expect(wide).toBeLessThanOrEqual(1);
  const box = await rows(phone).first().locator('.field-box').first().boundingBox();
  expect(box!.height).toBeGreaterThanOrEqual(44);
  await phone.page.evaluate(AXE);
  const found = await phone.page.evaluate(async () => {
    const { axe } = window as unknown as { axe: { run(): Promise<{ violations: { id: string }[] }> } };
    return (await axe.run()).violations.map(({ id }) => id);
  });
  expect(found).toEqual([]);
  await phone.context.close();
}, 120_000);

test('a designer has no such sheet', async () => {
  const designer = await openAs(browser, 'teo', DESK);
  const answer = await designer.page.goto(`${testOrigin()}/finals?run=${runId}`);
  expect(answer!.status()).toBe(404);
  await designer.context.close();
}, 60_000);
