import { readFileSync } from 'node:fs';
import type { Browser, Page } from 'playwright-core';
import { launchBrowser, testOrigin } from '../support/browser';
import { violations } from './axe';
import { openAs, PHONE, type Window } from './people';

/* Factor tables and limit lines: dropped, looked at beside the revision before, entered as the next one. */

const SLOW = 240_000;
const WAIT = { timeout: SLOW / 2 };

let browser: Browser;
beforeAll(async () => {
  browser = await launchBrowser();
}, 60_000);
afterAll(() => browser.close());

const unique = () => Math.random().toString(36).slice(2, 8);
/** Hands a file to the sheet once the page listens for it. */
async function drop(page: Page, name: string, text: string): Promise<void> {
  await page.waitForFunction(() => {
    const input = document.querySelector('input[type=file]');
    return input !== null && Object.keys(input).some((key) => key.startsWith('__reactProps'));
  });
  await page.setInputFiles('input[type=file]', { name, mimeType: 'text/csv', buffer: Buffer.from(text) });
}

/** The public id of an item of the demo lab that no signal path adds a table of. */
async function itemId({ context }: Window, identifier: string): Promise<string> {
  const answer = await context.request.get(`${testOrigin()}/api/equipment?find=${identifier}`, WAIT);
  return ((await answer.json()) as { items: { id: string }[] }).items[0]!.id;
}

const tooWide = (page: Page) =>
  page.evaluate(() => document.documentElement.scrollWidth > document.documentElement.clientWidth + 1);

/** On an item's upload sheet: says what a file leaves open and enters it. */
async function enterTable(page: Page, certificate: string): Promise<void> {
  await page.getByLabel('Calibration', { exact: true }).selectOption('new');
  await page.getByLabel('Certificate').fill(certificate);
  await page.getByLabel('Laboratory').fill('Ostrick Measurement House (invented)');
  await page.getByLabel('Calibrated on').fill('2026-03-04');
  await page.getByLabel('Source').fill(`${certificate}, page 2`);
  await page.getByLabel('Reason').fill('yearly calibration');
}

test(
  'a factor table: questions, chart, entered; its next revision is shown beside it with the difference in words',
  async () => {
    const window = await openAs(browser, 'anselm');
    const { page } = window;
    page.setDefaultTimeout(SLOW / 2);
    const id = await itemId(window, 'RX-1');
    const name = `RX-1 input pad ${unique()}`;

    await page.goto(`${testOrigin()}/equipment/${id}`);
    await page.getByRole('link', { name: 'Upload a factor table' }).click();
    await page.waitForURL('**/upload');
    await page.getByText('Drop a factor table anywhere').waitFor();
    await drop(page, 'pad.csv', 'Frequency;Correction (dB)\n30;9,8\n144;10,0\n1000;10,3\n');
    await page.getByText('loss or gain').first().waitFor();
    expect(await page.locator('.sheet-finding').innerText()).toContain('the unit of the frequencies, loss or gain');
    await page.getByLabel('Frequencies in').selectOption('MHz');
    await page.getByLabel('Name').fill(name);
    await page.getByLabel('Its figures are').selectOption('loss');
    await enterTable(page, 'OM-9001');
    await page.getByRole('button', { name: `Enter ${name}` }).click();
    await page.getByRole('heading', { name: 'The table is entered' }).waitFor();
    await page.getByText('no path uses it yet').waitFor();
    await page.getByRole('link', { name: 'Open the sheet of RX-1' }).click();
    await page.waitForURL('**?table=*');
    await page.getByRole('img', { name: /3 rows over 30–1000 MHz/ }).waitFor();

    // What is downloaded, with one row changed and a shorter range.
    const download = page.waitForEvent('download');
    await page.getByRole('link', { name: 'Download revision 1 as CSV' }).click();
    const text = readFileSync(await (await download).path(), 'utf8');
    expect(text).toContain('Frequency (Hz);Loss (dB)\r\n30000000;9.8\r\n144000000;10\r\n1000000000;10.3\r\n');
    await page.goto(`${testOrigin()}/equipment/${id}/upload`);
    await page.getByText('Drop a factor table anywhere').waitFor();
    await drop(
      page,
      'pad-2.csv',
      text.replace('144000000;10', '144000000;10.6').replace('1000000000;10.3', '900000000;10.3'),
    );
    await page.getByText('At most 0.6 dB higher than revision 1, at 144 MHz.').waitFor();
    await page.getByText('From now on nothing above 900 MHz has a factor').waitFor();
    expect(await page.getByLabel('Enters as').locator('option:checked').innerText()).toBe(`revision 2 of ${name}`);
    expect(await violations(page)).toEqual([]);
    await enterTable(page, 'OM-9002');
    await page.getByRole('button', { name: `Enter revision 2 of ${name}` }).click();
    await page.getByRole('heading', { name: 'The table is entered' }).waitFor();
    await page.getByText('No run since the calibration used an older revision.').waitFor();
    await page.getByRole('link', { name: 'Open the sheet of RX-1' }).click();
    await page.getByText('At most 0.6 dB higher than revision 1, at 144 MHz.').waitFor();
    await page.getByRole('link', { name: 'revision 1' }).first().waitFor();
    expect(window.complaints).toEqual([]);
    await window.context.close();
  },
  SLOW,
);

test(
  'a file that is no factor table is refused at its line, with what was found and expected',
  async () => {
    const window = await openAs(browser, 'anselm', PHONE);
    const { page } = window;
    page.setDefaultTimeout(SLOW / 2);
    await page.goto(`${testOrigin()}/equipment/${await itemId(window, 'RX-1')}/upload`);
    await page.getByText('Drop a factor table anywhere').waitFor();
    await drop(page, 'twice.csv', 'Frequency (MHz);Loss (dB)\n30;1\n100;2\n100;3\n300;3\n');
    await page.getByRole('heading', { name: 'This file is not a factor table of RX-1' }).waitFor();
    expect(await page.locator('.sheet-finding').innerText()).toContain('Line 4: 100000000 Hz stands twice');
    await page.getByRole('definition').filter({ hasText: 'each frequency once' }).waitFor();
    expect([await violations(page), await tooWide(page)]).toEqual([[], false]);
    await window.context.close();
  },
  SLOW,
);

test(
  'a limit line: asked, entered, put into a set; its revision takes the set along and the old one is withdrawn',
  async () => {
    const window = await openAs(browser, 'anselm');
    const { page } = window;
    page.setDefaultTimeout(SLOW / 2);
    const name = `Client line ${unique()}, 3 m, quasi-peak`;

    await page.goto(`${testOrigin()}/limits/new`);
    await page.getByText('Drop a limit line anywhere').waitFor();
    await drop(page, 'line.csv', 'Frequency;Limit (dBuV/m)\n30;40\n230;40\n230;47\n1000;47\n');
    await page.getByLabel('Frequencies in').selectOption('MHz');
    await page.getByRole('img', { name: /The limit of .* over 30–1000 MHz/ }).waitFor();
    await page.getByLabel('Name').fill(name);
    await page.getByLabel('Document').fill('Client letter of 2 Mar 2026');
    await page.getByLabel('Class').fill('B');
    await page.getByLabel('Port', { exact: true }).fill('enclosure');
    await page.getByLabel('Detector').selectOption('quasi-peak');
    await page.getByLabel('Bandwidth').fill('120');
    await page.getByLabel('Distance').fill('3');
    await page.getByLabel('Source').fill('page 2');
    await page.getByLabel('How sure it is').selectOption('verified');
    await page.getByLabel('Reason').fill('asked for by the client');
    await page.getByRole('button', { name: 'Enter the line' }).click();
    await page.getByRole('link', { name: 'Make a set with it' }).click();
    await page.waitForURL('**/limits/sets/new**');
    await page.getByLabel('Name').fill(`Set of ${name}`);
    await page.getByLabel('Reason').fill('asked for by the client');
    await page.getByRole('button', { name: 'Make the set' }).click();
    await page.getByRole('rowheader', { name: new RegExp(`^Set of ${name}`) }).waitFor();

    await page.getByRole('link', { name, exact: true }).click();
    await page.getByRole('link', { name: 'Upload revision 2' }).click();
    await page.getByText('Drop a limit line anywhere').waitFor();
    await drop(page, 'line-2.csv', 'Start MHz;Stop MHz;Limit dBuV/m\n30;230;39\n230;1000;47\n');
    await page.getByText('At most 1.0 dB lower than revision 1, at 30 MHz.').waitFor();
    await page.getByRole('checkbox', { name: `Set of ${name}, to revision 2` }).waitFor();
    expect(await violations(page)).toEqual([]);
    await page.getByLabel('How sure it is').selectOption('from memory');
    await page.getByLabel('Reason').fill('a tighter lower half');
    await page.getByRole('button', { name: 'Enter revision 2' }).click();
    await page.getByText(`Set of ${name} is at revision 2 now.`).waitFor();
    await page.getByRole('link', { name: 'Open the line' }).click();
    await page.getByText('The figures are from memory').waitFor();
    await page.getByText('At most 1.0 dB lower than revision 1, at 30 MHz.').waitFor();

    const answer = await window.context.request.get(`${testOrigin()}/api/limit-sets?limit=200&withdrawn=with`, WAIT);
    const { items } = (await answer.json()) as {
      items: { name: string; revision: number; withdrawnAt: string | null }[];
    };
    const own = items.filter((set) => set.name === `Set of ${name}`);
    expect(own.map(({ revision, withdrawnAt }) => [revision, withdrawnAt === null])).toEqual([
      [2, true],
      [1, false],
    ]);
    expect(window.complaints).toEqual([]);
    await window.context.close();
  },
  SLOW,
);

test(
  'a technician reads the tables and lines and finds no way to upload one',
  async () => {
    const window = await openAs(browser, 'mira');
    const { page, context } = window;
    const lines = await context.request.get(`${testOrigin()}/api/limit-lines?limit=1`, WAIT);
    const line = ((await lines.json()) as { items: { id: string }[] }).items[0]!.id;
    const item = await itemId(window, 'ANT-02');
    for (const path of ['/limits', `/limits/${line}`, `/equipment/${item}`]) {
      expect((await page.goto(testOrigin() + path))!.status()).toBe(200);
      expect(await page.getByRole('link', { name: /^Upload/ }).count()).toBe(0);
    }
    for (const path of ['/limits/new', '/limits/sets/new', `/equipment/${item}/upload`]) {
      expect((await page.goto(testOrigin() + path))!.status()).toBe(404);
    }
    await context.close();
  },
  SLOW,
);

test(
  'a designer finds no equipment and no limits sheet; on paper the chart page shows its chart',
  async () => {
    const designer = await openAs(browser, 'teo');
    for (const path of ['/limits', '/equipment']) {
      expect((await designer.page.goto(testOrigin() + path, { timeout: SLOW / 2 }))!.status()).toBe(404);
    }
    await designer.context.close();
    const window = await openAs(browser, 'mira');
    await window.page.goto(`${testOrigin()}/equipment/${await itemId(window, 'ANT-02')}`, { timeout: SLOW / 2 });
    await window.page.emulateMedia({ media: 'print' });
    expect(await window.page.locator('figure.revision-chart svg').first().isVisible()).toBe(true);
    expect(await window.page.locator('.sheet-actions').count()).toBe(0);
    expect((await window.page.pdf({ format: 'A4' })).length).toBeGreaterThan(10_000);
    await window.context.close();
  },
  SLOW,
);
