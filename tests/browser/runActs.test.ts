import type { Browser } from 'playwright-core';
import { launchBrowser, testOrigin } from '../support/browser';
import { openAs, type Window } from './people';

/* Correcting kept runs in a browser: void and restore, re-evaluate, re-file to another client. */

let browser: Browser;
let technician: Window;
let run: { id: string; number: string };
/** A sample of the other client to move it to. */
let target: { code: string };

const mark = Date.now().toString(36).toUpperCase();

/** What an API call as somebody answers; fails with its text. */
async function api<T>({ context }: Window, path: string, data?: unknown): Promise<T> {
  const url = `${testOrigin()}/api${path}`;
  const headers = { origin: testOrigin() };
  const answer = data ? await context.request.post(url, { data, headers }) : await context.request.get(url);
  if (!answer.ok()) throw new Error(`${path}: ${answer.status()} ${await answer.text()}`);
  return (await answer.json()) as T;
}

/** A new product, job and sample of a client, so that nothing of the demo story is touched. */
async function newSample(manager: Window, client: RegExp, code: string) {
  const { items } = await api<{ items: { id: string; name: string }[] }>(manager, '/organisations?limit=200');
  const organisationId = items.find(({ name }) => client.test(name))!.id;
  const product = await api<{ id: string }>(manager, '/products', { organisationId, code, name: 'Test set' });
  const job = await api<{ id: string }>(manager, '/jobs', { productId: product.id, title: `${code}, acts` });
  return api<{ code: string; states: { id: string }[] }>(manager, `/jobs/${job.id}/samples`, { serial: code });
}

/** 9 701 points from 30 to 1000 MHz with one emission. */
function fileWith(mhz: number, level: number): Buffer {
  const rows = Array.from({ length: 9701 }, (_, i) => {
    const f = (300 + i) / 10;
    return `${f.toFixed(3)},${(f === mhz ? level : 18).toFixed(2)}`;
  });
  return Buffer.from(['RBW,120 kHz', 'Detector,Peak', 'Frequency (MHz),Level (dBuV)', ...rows, ''].join('\n'));
}

beforeAll(async () => {
  browser = await launchBrowser();
  technician = await openAs(browser, 'mira');
  technician.context.setDefaultTimeout(90_000);
  const manager = await openAs(browser, 'anselm');
  const sample = await newSample(manager, /^Pell/, `A-${mark}`);
  target = await newSample(manager, /^Tidewater/, `B-${mark}`);
  await manager.context.close();

  const file = { name: `acts-${mark}.csv`, mimeType: 'text/csv', buffer: fileWith(144, 55) };
  const sent = await technician.context.request.post(`${testOrigin()}/api/sweep-files`, {
    multipart: { file },
    headers: { origin: testOrigin() },
  });
  const { id: fileId } = (await sent.json()) as { id: string };
  const paths = await api<{ items: { id: string; code: string }[] }>(technician, '/signal-paths?limit=200');
  const sets = await api<{ items: { id: string; name: string }[] }>(technician, '/limit-sets?limit=200');
  run = await api(technician, '/sweeps', {
    fileId,
    stateId: sample.states[0]!.id,
    purpose: 'prescan',
    port: 'enclosure',
    operatingMode: 'full light',
    polarisation: 'horizontal',
    distanceM: 3,
    heightM: 1,
    pathId: paths.items.find(({ code }) => code === 'P-3')!.id,
    limitSetId: sets.items.find(({ name }) => /CISPR 32 class B radiated, 3 m$/.test(name))!.id,
    valuesHold: 'receiver-input',
    frequencyUnit: 'MHz',
    traces: [{ index: 0, name: 'Peak', unit: 'dBuV', detector: 'peak', rbwHz: 120e3 }],
  });
}, 180_000);
afterAll(() => browser.close());

const open = async ({ page }: Window) => {
  await page.goto(`${testOrigin()}/sweeps/${run.id}`);
  await page.locator('canvas').first().waitFor();
};
const title = ({ page }: Window) => page.getByRole('heading', { level: 1 }).innerText();

test('voiding needs a reason, is told to everybody on the sheet and on the list, and can be taken back', async () => {
  const { page } = technician;
  await open(technician);
  await page.getByRole('button', { name: 'Void', exact: true }).click();
  const act = page.getByRole('button', { name: `Void ${run.number}` });
  await act.click();
  await page.getByText('Reason is needed.').waitFor();
  await page.getByLabel('Reason').fill('the mast stood still');
  await act.click();
  await page.getByText(/so it speaks for nothing: the mast stood still\. It read: /).waitFor();
  expect(await title(technician)).toContain('voided');

  const designer = await openAs(browser, 'teo');
  await open(designer);
  expect(await title(designer)).toContain('voided');
  expect(await designer.page.getByRole('button', { name: /Restore|Void|Re-file|Re-evaluate/ }).count()).toBe(0);
  await designer.context.close();

  await page.goto(`${testOrigin()}/sweeps`);
  expect(await page.getByRole('row', { name: new RegExp(run.number) }).innerText()).toContain('voided');

  await open(technician);
  await page.getByRole('button', { name: 'Restore this run' }).click();
  await page.getByLabel('Reason').fill('the log says it moved');
  await page.getByRole('button', { name: `Restore ${run.number}` }).click();
  await page.getByRole('button', { name: 'Void', exact: true }).waitFor();
  expect(await title(technician)).not.toContain('voided');
}, 180_000);

test('re-evaluated with nothing newer: the same figures, and the history lists both evaluations', async () => {
  const { page } = technician;
  await open(technician);
  await page.getByRole('button', { name: 'Re-evaluate' }).click();
  await page.getByText('Nothing is newer than what it was judged with').waitFor();
  await page.getByLabel('Reason').fill('to be sure');
  await page.getByRole('button', { name: `Re-evaluate ${run.number}` }).click();
  await page.getByText(`${run.number} is judged again: the same figures, bit for bit`).waitFor();
  const history = page.locator('[data-section="history"]');
  await history.getByText('2 evaluations').waitFor();
  await history.getByRole('button').first().click();
  await history.getByText('The same figures as before, bit for bit.').waitFor();
  await history.getByText('Reason: the mast stood still').waitFor();
  await history.getByRole('button', { name: 'Show its candidates' }).first().click();
  await history.locator('ol').getByText(/MHz/).first().waitFor();
}, 180_000);

test('moving it to another client asks first, on the safe choice; then the first client finds it no more', async () => {
  const { page } = technician;
  await open(technician);
  await page.getByRole('button', { name: 'Re-file' }).click();
  const choice = page.getByLabel('It was measured on');
  await choice.locator('option', { hasText: target.code }).waitFor({ state: 'attached' });
  await choice.selectOption(await choice.locator('option', { hasText: target.code }).getAttribute('value'));
  await page.getByText(/Tidewater.* will see this run, and Pell.* will see it no more\./).waitFor();
  await page.getByLabel('Reason').fill('dropped on the wrong sample');
  await page.getByRole('button', { name: `Re-file ${run.number}` }).click();

  const dialog = page.getByRole('dialog', { name: new RegExp(`Tidewater.* will see ${run.number}`) });
  await dialog.waitFor();
  expect(await page.evaluate(() => document.activeElement?.textContent)).toContain('Not yet');
  await page.keyboard.press('Escape');
  await dialog.waitFor({ state: 'hidden' });
  expect(await page.getByText('Pell & Orrin').first().isVisible()).toBe(true);

  await page.getByRole('button', { name: `Re-file ${run.number}` }).click();
  await dialog.getByRole('button', { name: new RegExp(`Move ${run.number} to Tidewater`) }).click();
  await page.getByText(`${run.number} stands under M0 of ${target.code}`).waitFor();
  await page.getByText('Tidewater').first().waitFor();

  const [first, second] = [await openAs(browser, 'teo'), await openAs(browser, 'hanne')];
  expect((await first.page.goto(`${testOrigin()}/sweeps/${run.id}`))!.status()).toBe(404);
  expect((await second.page.goto(`${testOrigin()}/sweeps/${run.id}`))!.status()).toBe(200);
  await first.context.close();
  await second.context.close();
}, 180_000);

test('the browser had nothing to complain of on the way', () => {
  // voiding without a reason is refused
  expect(technician.complaints.filter((text) => !text.includes('status of 400'))).toEqual([]);
});
