import type { Browser, Page, Route } from 'playwright-core';
import { launchBrowser, testOrigin } from '../support/browser';
import { openAs, PHONE, type Window } from './people';

/* Several files in one drop, broken files, saved shapes and trials, as a technician meets them. */

let browser: Browser;
beforeAll(async () => {
  browser = await launchBrowser();
}, 60_000);
afterAll(() => browser.close());

const LONG = 400_000;
const word = () => Array.from({ length: 8 }, () => 'abcdefghij'[Math.floor(Math.random() * 10)]).join('');

interface Written {
  /** Makes a shape of its own: the key of a line of the preamble. */
  mark?: string;
  /** States unit, detector and RBW; otherwise only the layout shows. */
  stated?: boolean;
  points?: number;
  /** Cut behind the separator of this row. */
  cutAt?: number;
  level?: number;
}

/** A small radiated sweep in decimal points and semicolons. */
function text({ mark = 'bench', stated = true, points = 400, cutAt, level = 20 }: Written = {}): string {
  const head = stated
    ? [`${mark};on`, 'Detector;Peak', 'RBW;120;kHz', `Points;${points}`, 'Frequency [MHz];Peak [dBuV]']
    : [`${mark};on`, 'X;Y'];
  const rows = Array.from(
    { length: points },
    (_, i) => `${(30 + i * 0.1).toFixed(3)};${(level + ((i * 7) % 13) / 10).toFixed(2)}`,
  );
  if (cutAt === undefined) return [...head, ...rows, ''].join('\n');
  return [...head, ...rows.slice(0, cutAt), rows[cutAt]!.replace(/;.*/, ';')].join('\n');
}
const asUpload = (name: string, more: Written = {}) => ({
  name,
  mimeType: 'text/csv',
  buffer: Buffer.from(text(more)),
});

const row = (page: Page, name: string) => page.getByRole('row', { name: new RegExp(name.replaceAll('.', '\\.')) });
const input = (page: Page) => page.locator('input[type=file]');

/** A window that waits as long as a busy machine needs. */
async function technicianAt(...window: Parameters<typeof openAs>): Promise<Window> {
  const opened = await openAs(...window);
  opened.page.setDefaultTimeout(120_000);
  return opened;
}

async function drop(page: Page, files: ReturnType<typeof asUpload>[]): Promise<void> {
  await page.goto(`${testOrigin()}/sweeps/new`);
  await page.getByRole('heading', { name: 'Drop sweep files anywhere on this sheet' }).waitFor();
  await input(page).setInputFiles(files);
}
async function recognised(page: Page, names: string[]): Promise<void> {
  for (const name of names) await page.getByRole('button', { name, exact: true }).waitFor();
}
async function say(page: Page, mode: string): Promise<void> {
  await page.getByLabel('Operating mode').fill(mode);
}
/** Back in the list: rows are there again. */
const allFiles = (page: Page) => page.getByRole('button', { name: /^All \d+ files$/ }).click();

describe('a drop of several files', () => {
  const names = ['ld40_m2_h_100.csv', 'ld40_m2_v_100.csv', 'ld40_m2_v_200.csv', 'ld40_m2_h_200.csv'];
  const mark = word();
  let technician: Window;
  beforeAll(async () => {
    technician = await technicianAt(browser, 'mira');
  }, LONG);
  afterAll(() => technician.context.close());

  test(
    'at most two are sent at once; each has its row, with what its name proposes and what is still to be said',
    async () => {
      const { page } = technician;
      let flying = 0;
      let most = 0;
      await page.route('**/api/sweep-files', async (route) => {
        most = Math.max(most, ++flying);
        const response = await route.fetch({ timeout: 120_000 });
        flying--;
        await route.fulfill({ response });
      });
      const cut = asUpload(names[3]!, { mark, cutAt: 300 });
      await drop(page, [...names.slice(0, 3).map((name) => asUpload(name, { mark })), cut]);
      await recognised(page, names);
      expect(most).toBe(2);
      expect(new URL(page.url()).searchParams.getAll('file')).toHaveLength(4);
      await page.getByRole('heading', { level: 1, name: '4 files' }).waitFor();
      const said = await row(page, names[1]!).innerText();
      expect(said).toMatch(/400 points/);
      expect(said).toMatch(/V, 1 m/);
      expect(said).toMatch(/LD-40\s+(?:state\s+)?M2/);
      expect(said).toMatch(/still to say: the operating mode/);
      expect(await row(page, names[3]!).innerText()).toMatch(/refused at line 306; 300 points could be kept/);
    },
    LONG,
  );

  test(
    'rows are walked with the arrows, Enter opens one, and back is the list',
    async () => {
      const { page } = technician;
      await page.keyboard.press('ArrowDown');
      await page.keyboard.press('ArrowDown');
      await page.keyboard.press('Enter');
      await page.getByText('file 2 of 4').waitFor();
      await page.keyboard.press(']');
      await page.getByText('file 3 of 4').waitFor();
      await page.keyboard.press('[');
      await page.getByText('file 2 of 4').waitFor();
      await page.goBack();
      await page.goBack();
      await page.goBack();
      await page.getByRole('heading', { level: 1, name: '4 files' }).waitFor();
    },
    LONG,
  );

  test(
    'what was said survives a reload, and the others take the same',
    async () => {
      const { page } = technician;
      await page.getByRole('button', { name: names[0], exact: true }).click();
      await say(page, 'full brightness');
      await page.getByText('Everything is said.').waitFor();
      await page.reload();
      await page.getByText('Everything is said.').waitFor();
      expect(await page.getByLabel('Operating mode').inputValue()).toBe('full brightness');
      await allFiles(page);
      await page.getByRole('button', { name: 'Same as last for 2 files' }).click();
      await page.getByRole('button', { name: /^Keep 3 files/ }).waitFor();
      // The polarisation stays as each name proposes it.
      expect(await row(page, names[1]!).innerText()).toMatch(/V, 1 m/);
      expect(await row(page, names[0]!).innerText()).toMatch(/H, 1 m/);
    },
    LONG,
  );

  test(
    'a failure of one leaves the others and says which; a double click keeps each once',
    async () => {
      const { page } = technician;
      const keys: (string | undefined)[] = [];
      const refuseVertical = async (route: Route) => {
        const body = route.request().postDataJSON() as { polarisation: string; heightM: number };
        keys.push(route.request().headers()['idempotency-key']);
        if (body.polarisation !== 'vertical' || body.heightM !== 2) return route.continue();
        const problem = {
          type: 'about:blank',
          title: 'Job HL-2611 is closed.',
          status: 409,
          detail: 'Reopen it first.',
        };
        return route.fulfill({ status: 409, contentType: 'application/problem+json', body: JSON.stringify(problem) });
      };
      await page.route('**/api/sweeps', refuseVertical);
      await page.getByRole('button', { name: /^Keep 3 files/ }).dblclick();
      await row(page, names[0]!)
        .getByRole('link', { name: /^kept, R-/ })
        .waitFor();
      await row(page, names[1]!)
        .getByRole('link', { name: /^kept, R-/ })
        .waitFor();
      await row(page, names[2]!)
        .getByText(/not kept: Job HL-2611 is closed\./)
        .filter({ visible: true })
        .waitFor();
      expect(keys).toHaveLength(3);
      expect(new Set(keys).size).toBe(3);
      await page.unroute('**/api/sweeps', refuseVertical);
      await page.getByRole('button', { name: /^Keep 1 file/ }).click();
      await row(page, names[2]!)
        .getByRole('link', { name: /^kept, R-/ })
        .waitFor();
    },
    LONG,
  );

  test(
    'the refused one shows its line, a box where the missing part belongs, and what was not read',
    async () => {
      const { page } = technician;
      await page.getByRole('button', { name: names[3], exact: true }).click();
      await page.getByRole('heading', { name: 'This file was not kept' }).waitFor();
      expect(await page.locator('.finding').innerText()).toMatch(
        /^Line 306 has 1 column; the lines before it have 2\. The file ends there, after 59\.900 MHz\./,
      );
      const lines = page.getByRole('region', { name: 'Lines around line 306' });
      expect(await lines.locator('tr', { hasText: 'Peak is missing' }).innerText()).toMatch(/306\s+60\.000;/);
      expect(await lines.getByRole('row').count()).toBe(6);
      await page.getByText('not read', { exact: true }).waitFor();
      await page.getByText(/3 others of this drop in the same layout end at/).waitFor();
    },
    LONG,
  );

  test(
    'it is kept in part on purpose only, and marked so in its sheet, its list and its port',
    async () => {
      const { page } = technician;
      await page.getByRole('button', { name: 'Keep 300 points as partial' }).click();
      await page.getByRole('heading', { name: 'Recognise a sweep file' }).waitFor();
      await page.getByText('Still to say: the operating mode.').waitFor();
      await page.getByRole('button', { name: /^Same as ld40/ }).click();
      await page.getByRole('button', { name: /^Keep 300 points as partial/ }).click();
      await row(page, names[3]!)
        .getByRole('link', { name: /^kept, R-/ })
        .waitFor();
      await row(page, names[3]!)
        .getByRole('link', { name: /^kept, R-/ })
        .click();
      await page.waitForURL(/\/sweeps\/[0-9a-z]{16}$/);
      await page.getByRole('heading', { level: 1, name: /partial/ }).waitFor();
      const finding = await page.locator('.finding').innerText();
      expect(finding).toMatch(/Partial: its file breaks off at line 306, after 59\.900 MHz; nothing of it is under\./);
      expect(finding).not.toMatch(/(?:^|\. )Under/);
      const answer = await page.request.get(`${testOrigin()}/api/sweeps/${page.url().split('/').at(-1)}`);
      const run = (await answer.json()) as { evaluation: { verdict: string; counts: { under: number } } };
      expect(run.evaluation.counts.under).toBe(0);
      expect(run.evaluation.verdict).not.toBe('under');
      await page.goto(`${testOrigin()}/sweeps`);
      expect(await page.getByRole('row').nth(1).innerText()).toMatch(/partial/);
    },
    LONG,
  );

  test('the browser had nothing to complain of on the way', () => {
    const own = technician.complaints.filter((line) => !/inline style|409/.test(line));
    expect(own).toEqual([]);
  });
});

describe('when the lab or the network is busy', () => {
  test(
    '429 with Retry-After waits and goes on; without a network it waits and goes on by itself',
    async () => {
      const technician = await technicianAt(browser, 'mira');
      const { page, context } = technician;
      let asked = 0;
      await page.route('**/api/sweep-files', (route) => {
        if (++asked > 1) return route.continue();
        return route.fulfill({
          status: 429,
          headers: { 'retry-after': '1' },
          contentType: 'application/problem+json',
          body: JSON.stringify({ type: 'about:blank', title: 'Several files are being received.', status: 429 }),
        });
      });
      await drop(page, [asUpload('busy_h.csv')]);
      await page
        .getByText(/sent again by itself/)
        .filter({ visible: true })
        .first()
        .waitFor();
      await page.getByRole('heading', { name: 'Recognise a sweep file' }).waitFor();
      expect(asked).toBe(2);
      await context.setOffline(true);
      await input(page).setInputFiles([asUpload('offline_v.csv')]);
      await row(page, 'offline_v.csv').waitFor();
      await page.waitForTimeout(1500);
      expect(await page.getByRole('button', { name: 'offline_v.csv', exact: true }).count()).toBe(0);
      await context.setOffline(false);
      await recognised(page, ['busy_h.csv', 'offline_v.csv']);
      await context.close();
    },
    LONG,
  );

  test(
    'a lost answer and a second press keep one run',
    async () => {
      const technician = await technicianAt(browser, 'mira');
      const { page, context } = technician;
      await drop(page, [asUpload('ld40_m2_h_150.csv', { level: 21 })]);
      await page.getByRole('heading', { name: 'Recognise a sweep file' }).waitFor();
      await say(page, 'answer lost');
      let lost = false;
      const kept: string[] = [];
      await page.route('**/api/sweeps', async (route) => {
        const answer = await route.fetch({ timeout: 120_000 });
        kept.push(((await answer.json()) as { id: string }).id);
        if (lost) return route.fulfill({ response: answer });
        lost = true;
        return route.abort();
      });
      await page.getByRole('button', { name: /^Keep as a run/ }).click();
      await page.waitForURL(/\/sweeps\/[0-9a-z]{16}$/);
      expect(kept.length).toBeGreaterThanOrEqual(2);
      expect(new Set(kept).size).toBe(1);
      await context.close();
    },
    LONG,
  );
});

describe('leaving', () => {
  test(
    'a link asks first with files that are not kept; staying keeps the sheet, leaving and back bring it back',
    async () => {
      const { page, context } = await technicianAt(browser, 'mira');
      await drop(page, [asUpload('ld40_m2_h_100.csv'), asUpload('ld40_m2_v_100.csv')]);
      await recognised(page, ['ld40_m2_h_100.csv', 'ld40_m2_v_100.csv']);
      const address = page.url();
      await page.getByRole('link', { name: 'Jobs' }).click();
      await page.getByRole('dialog').getByText('Leave with 2 files not kept?').waitFor();
      await page.keyboard.press('Escape');
      await page.getByRole('dialog').waitFor({ state: 'hidden' });
      expect(page.url()).toBe(address);
      await page.getByRole('link', { name: 'Jobs' }).click();
      await page.getByRole('button', { name: 'Leave 2 files' }).click();
      await page.waitForURL('**/jobs');
      await page.goBack();
      await recognised(page, ['ld40_m2_h_100.csv', 'ld40_m2_v_100.csv']);
      await context.close();
    },
    LONG,
  );

  test(
    'closing the page asks too',
    async () => {
      const { page, context } = await technicianAt(browser, 'mira');
      await drop(page, [asUpload('ld40_m2_h_100.csv')]);
      await page.getByRole('heading', { name: 'Recognise a sweep file' }).waitFor();
      await say(page, 'asked');
      const asked = page.waitForEvent('dialog');
      void page.close({ runBeforeUnload: true });
      const dialog = await asked;
      expect(dialog.type()).toBe('beforeunload');
      await dialog.accept();
      await context.close();
    },
    LONG,
  );

  test(
    'a file that is held no longer is said to be',
    async () => {
      const { page, context } = await technicianAt(browser, 'mira');
      await page.goto(`${testOrigin()}/sweeps/new?file=aaaaaaaaaaaaaaaa`);
      await page.getByText('One file is held no longer. Drop again what is missing.').waitFor();
      await context.close();
    },
    LONG,
  );
});

test(
  'files dropped on the list of runs are taken in',
  async () => {
    const { page, context } = await technicianAt(browser, 'mira');
    await page.goto(`${testOrigin()}/sweeps`);
    await page.getByRole('heading', { level: 1 }).waitFor();
    await page.waitForLoadState('networkidle');
    const data = await page.evaluateHandle((content) => {
      const transfer = new DataTransfer();
      for (const name of ['tp9_m0_h.csv', 'tp9_m0_v.csv']) transfer.items.add(new File([content], name));
      return transfer;
    }, text());
    await page.dispatchEvent('body', 'dragover', { dataTransfer: data });
    await page.getByText('Drop to take these files in').waitFor();
    await page.dispatchEvent('body', 'drop', { dataTransfer: data });
    await page.waitForURL('**/sweeps/new**');
    await recognised(page, ['tp9_m0_h.csv', 'tp9_m0_v.csv']);
    await context.close();
  },
  LONG,
);

test(
  'the last file of a shape proposes for the next, says so, and has to be confirmed; a trial speaks for nothing',
  async () => {
    const { page, context } = await technicianAt(browser, 'mira');
    const mark = word();
    await drop(page, [asUpload('ld40_m2_h_100.csv', { mark, stated: false })]);
    await page.getByRole('heading', { name: 'Recognise a sweep file' }).waitFor();
    await page.getByLabel('Frequencies in').selectOption('MHz');
    await page.getByLabel('Level in').selectOption('dBuV');
    await page.getByLabel('Detector').selectOption('peak');
    await page.getByLabel('RBW').fill('120');
    await page.getByLabel('Trial, if it is one').fill('foil on lid');
    await page.getByText('A trial never speaks for its state: it counts for no verdict of the port.').waitFor();
    await say(page, 'full brightness');
    await page.getByRole('button', { name: /^Keep as a trial/ }).click();
    await page.waitForURL(/\/sweeps\/[0-9a-z]{16}$/);
    await page.getByRole('heading', { level: 1, name: /trial foil on lid/ }).waitFor();

    await drop(page, [asUpload('ld40_m2_v_100.csv', { mark, stated: false, level: 22 })]);
    await page.getByRole('heading', { name: 'Recognise a sweep file' }).waitFor();
    const taken = page.getByText(/^Taken as in R-\d\d-\d{3}: frequencies in MHz, dBµV, peak, RBW 120 kHz\.$/);
    await taken.waitFor();
    expect(await page.getByLabel('Level in').inputValue()).toBe('dBuV');
    expect(await page.getByText(/not stated; as in R-\d\d-\d{3}/).count()).toBe(4);
    // What was tried last is in the list to choose from, and is not taken by itself.
    expect(await page.getByLabel('Trial, if it is one').inputValue()).toBe('');
    expect(await page.locator('datalist option[value="foil on lid"]').count()).toBe(1);
    await say(page, 'full brightness');
    await page.getByText(/Still to say: whether it is as in R-/).waitFor();
    expect(await page.getByRole('button', { name: /^Keep as a run/ }).count()).toBe(0);
    await page.getByRole('button', { name: 'It holds for this file' }).click();
    await page.getByRole('button', { name: /^Keep as a run/ }).waitFor();
    await context.close();
  },
  LONG,
);

test(
  'one of several sweeps is described by its own preamble once it is chosen',
  async () => {
    const { page, context } = await technicianAt(browser, 'mira');
    const two = `${text()}${text().replace('Detector;Peak', 'Detector;Average')}`;
    await drop(page, [{ name: 'ld40_m2_h_100.csv', mimeType: 'text/csv', buffer: Buffer.from(two) }]);
    await page.getByRole('heading', { name: 'Recognise a sweep file' }).waitFor();
    expect(await page.getByLabel('Detector').inputValue()).toBe('');
    await page.getByLabel('Which sweep').selectOption('1');
    await page.waitForFunction(
      () => [...document.querySelectorAll('select')].some((select) => select.value === 'average'),
      null,
      { timeout: 60_000 },
    );
    await context.close();
  },
  LONG,
);

test(
  'a name that would be something else is shown as it is',
  async () => {
    const { page, context, complaints } = await technicianAt(browser, 'mira');
    const name = `<img src=x onerror=alert(1)>\u202evsc.csv`;
    await drop(page, [asUpload(name), asUpload('second.csv')]);
    await page.getByText('<img src=x onerror=alert(1)>·vsc.csv').first().waitFor();
    expect(await page.locator('img[src=x]').count()).toBe(0);
    await page.getByRole('button', { name: 'second.csv', exact: true }).waitFor();
    expect(complaints.filter((line) => !/inline style/.test(line))).toEqual([]);
    await context.close();
  },
  LONG,
);

test(
  'on a phone: rows, the refused sheet and keeping, without a sideways scroll',
  async () => {
    const { page, context } = await technicianAt(browser, 'mira', PHONE);
    const names = ['ld40_m2_h_110.csv', 'ld40_m2_v_110.csv'];
    await drop(page, [asUpload(names[0]!), asUpload(names[1]!, { cutAt: 200 })]);
    await recognised(page, names);
    const fits = () => page.evaluate(() => document.documentElement.scrollWidth <= window.innerWidth);
    expect(await fits()).toBe(true);
    const small = await page
      .getByRole('table')
      .getByRole('button')
      .evaluateAll((all) =>
        all.filter((one) => one.getBoundingClientRect().height < 43.5).map((one) => one.textContent),
      );
    expect(small).toEqual([]);
    await page.getByRole('button', { name: names[1], exact: true }).tap();
    await page.getByRole('heading', { name: 'This file was not kept' }).waitFor();
    expect(await fits()).toBe(true);
    await page.getByRole('button', { name: 'Keep 200 points as partial' }).tap();
    await page.getByRole('heading', { name: 'Recognise a sweep file' }).waitFor();
    expect(await fits()).toBe(true);
    await context.close();
  },
  LONG,
);
