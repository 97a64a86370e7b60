import { readFileSync } from 'node:fs';
import type { APIResponse, Browser } from 'playwright-core';
import { launchBrowser, testOrigin } from '../support/browser';
import { violations } from './axe';
import { DESK, openAs, PHONE, type Window } from './people';

/* The retest queue as a technician works it, on a sample of this test's own. */

let browser: Browser;
let technician: Window;
let sampleId = '';
let runId = '';

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
  const sample = await post(`jobs/${job.id}/samples`, { serial: `RT-${Date.now()}` });
  const [state] = sample.states as { id: string }[];
  const file = await technician.context.request
    .post(`${testOrigin()}/api/sweep-files`, {
      headers: headers(),
      multipart: { file: { name: 'retests.csv', mimeType: 'text/csv', buffer: sweepFile() } },
    })
    .then(ok);
  const path = (await list('signal-paths')).find(({ code }) => code === 'P-3')!;
  const set = (await list('limit-sets')).find(({ name }) => /CISPR 32 class B.*3 m/.test(name) && !/GHz/.test(name))!;
  const run = await post('sweeps', {
    ...{ fileId: file.id, stateId: state!.id, pathId: path.id, limitSetId: set.id, operatingMode: 'full load' },
    ...{
      purpose: 'prescan',
      port: 'enclosure',
      polarisation: 'horizontal',
      distanceM: 3,
      heightM: 1.5,
      azimuthDeg: 48,
    },
    ...{ valuesHold: 'receiver-input', frequencyUnit: 'MHz' },
    traces: [{ index: 0, name: 'Peak', unit: 'dBuV', detector: 'peak', rbwHz: 120e3 }],
  });
  [sampleId, runId] = [sample.id, run.id];
}, 180_000);
afterAll(() => browser.close());

const open = async ({ page }: Window, query = `?sample=${sampleId}`) => {
  await page.goto(`${testOrigin()}/retests${query}`, { waitUntil: 'load' });
  await page.getByRole('heading', { level: 1, name: 'Retests' }).waitFor();
};
const rows = ({ page }: Window) => page.locator('.retest-rows tbody tr');

test('the queue opens with its finding, and the chosen row shows what it asks and its history', async () => {
  const { page } = technician;
  await open(technician);
  expect(await page.locator('.finding').innerText()).toMatch(/^\s*Three need a final\.$/);
  expect(await rows(technician).count()).toBe(3);
  const column = page.getByRole('complementary');
  await column.getByText(/^Opened: needs a final in R-/).waitFor();
  await column.getByText('Measure quasi-peak in').waitFor();
  const before = await column.locator('[data-section="retest"] .column-subject').innerText();
  await page.keyboard.press('ArrowDown');
  await page.waitForFunction(
    (text) => document.querySelector('[data-section="retest"] .column-subject')?.textContent !== text,
    before,
  );
}, 90_000);

test('R places the chosen retest on a day; it can be taken off the plan again', async () => {
  const { page } = technician;
  await open(technician);
  await page.keyboard.press('r');
  await page.getByLabel('Day, if it is known').fill('2031-03-04');
  await page.getByLabel('Note').fill('with the long cable');
  await page.keyboard.press('Enter');
  await rows(technician).filter({ hasText: 'for 4 Mar' }).waitFor();
  await page.getByText('Two need a final. One is scheduled.').waitFor();
  await page.getByRole('complementary').getByText('Scheduled: with the long cable, for 4 Mar 2031').waitFor();
  await page.getByRole('button', { name: 'Take off the plan' }).click();
  await page.getByLabel('The reason').fill('the cable is away');
  await page.getByRole('button', { name: /^Reopen T-/ }).click();
  await page.getByText('Three need a final.').waitFor();
}, 120_000);

test('withdrawn with a reason it leaves the open queue, and the filter in the address finds it', async () => {
  const { page } = technician;
  await open(technician);
  await page.getByRole('button', { name: 'Withdraw', exact: true }).click();
  await page.getByRole('button', { name: /^Withdraw T-/ }).click();
  await page.getByText('The reason is needed.').waitFor();
  await page.getByLabel('The reason').fill('a broadcast, also with the EUT off');
  await page.getByRole('button', { name: /^Withdraw T-/ }).click();
  await page.getByText('Two need a final.').waitFor();
  await page.getByLabel('Status').selectOption('withdrawn');
  await page.waitForURL(/status=withdrawn/);
  await page.getByRole('complementary').getByText('Withdrawn: a broadcast, also with the EUT off').first().waitFor();
  expect(await rows(technician).count()).toBe(1);
  await page.goBack();
  await page.waitForURL((url) => !url.search.includes('withdrawn'));
  await page.getByText('Two need a final.').waitFor();
}, 120_000);

test('the frequencies are taken away as a file, with one row for each that is to be measured', async () => {
  const { page } = technician;
  await open(technician);
  const [download] = await Promise.all([
    page.waitForEvent('download'),
    page.getByRole('link', { name: 'Take 2 frequencies' }).click(),
  ]);
  expect(download.suggestedFilename()).toBe('frequency-list.csv');
  const lines = readFileSync(await download.path(), 'utf8')
    .trimEnd()
    .split('\r\n');
  expect(lines[0]).toMatch(/^Ref,Sample,Serial,State,Port,Measure in,Frequency \(MHz\)/);
  expect(lines).toHaveLength(3);
}, 90_000);

test('on paper it is the list for the receiver, with room to write', async () => {
  const { page } = technician;
  await open(technician);
  await page.emulateMedia({ media: 'print' });
  expect(await page.locator('.retest-rows').isVisible()).toBe(false);
  expect(await page.locator('.retest-print tbody tr').count()).toBe(2);
  expect(await page.locator('.retest-print').isVisible()).toBe(true);
  const fits = await page.evaluate(() => {
    const table = document.querySelector('.retest-print table')!;
    return table.scrollWidth <= table.parentElement!.clientWidth + 1;
  });
  expect(fits).toBe(true);
  expect((await page.pdf({ format: 'A4' })).length).toBeGreaterThan(5000);
  await page.emulateMedia({ media: null });
}, 90_000);

test('the run says what it asked for, and the sample how many are open', async () => {
  const { page } = technician;
  await page.goto(`${testOrigin()}/sweeps/${runId}`, { waitUntil: 'load' });
  await page.getByRole('button', { name: 'Retests' }).click();
  await page.getByRole('link', { name: 'Show 3 in the queue' }).waitFor();
  await page.goto(`${testOrigin()}/samples/${sampleId}`, { waitUntil: 'load' });
  await page.getByRole('link', { name: '2 retests are open' }).click();
  await page.waitForURL(/\/retests\?sample=/);
  await page.getByText('Two need a final.').waitFor();
}, 120_000);

test('the demo lab: LD-40 waits for M3 on its day, MA-2 for one harmonic, and one is withdrawn with its reason', async () => {
  const { page } = technician;
  await open(technician, '');
  await rows(technician)
    .filter({ hasText: /LD-40.*M2/ })
    .filter({ hasText: '144.018' })
    .filter({ hasText: /for \d+ \w+/ })
    .waitFor();
  const waiting = rows(technician).filter({ hasText: 'MA-2' }).filter({ hasText: 'waiting' });
  expect(await waiting.count()).toBe(1);
  expect(await waiting.innerText()).toMatch(/147\.4\d\d/);
  await open(technician, '?status=withdrawn');
  expect(await rows(technician).filter({ hasText: 'LD-40' }).count()).toBeGreaterThan(0);
  await page.goto(`${testOrigin()}/day`, { waitUntil: 'load' });
  expect(
    await page
      .getByRole('navigation', { name: 'Sections' })
      .getByRole('link', { name: /^Retests.*\d+ waiting/ })
      .count(),
  ).toBeGreaterThan(0);
}, 120_000);

test('a designer sees their own and cannot change it; another client’s finds no such address', async () => {
  const teo = await openAs(browser, 'teo');
  await open(teo);
  expect(await rows(teo).count()).toBe(2);
  expect(await teo.page.locator('.retest-acts').count()).toBe(0);
  const hanne = await openAs(browser, 'hanne');
  expect((await hanne.page.goto(`${testOrigin()}/retests?sample=${sampleId}`))!.status()).toBe(404);
  for (const { context } of [teo, hanne]) await context.close();
}, 120_000);

/* The queue itself is looked at with every page; here with what this file put into it, and what was cleared of it. */
const looks = [
  { viewport: DESK, room: 'paper' },
  { viewport: PHONE, room: 'dim' },
];

test.each(looks)(
  'at $viewport.width in $room: no accessibility violation, not wider than its window, no complaint',
  async ({ viewport, room }) => {
    const window = await openAs(browser, 'mira', viewport, room);
    const wrong: string[] = [];
    for (const query of [`?sample=${sampleId}`, `?sample=${sampleId}&status=cleared`]) {
      await open(window, query);
      const found = await violations(window.page);
      wrong.push(...found.map((text) => `${query} ${text}`));
      const wide = await window.page.evaluate(
        () => document.documentElement.scrollWidth > document.documentElement.clientWidth + 1,
      );
      if (wide) wrong.push(`${query}: wider than its window`);
    }
    expect([...wrong, ...window.complaints]).toEqual([]);
    await window.context.close();
  },
  120_000,
);
