import type { Browser, Page } from 'playwright-core';
import { addDays } from '@/schemas/labTime';
import { launchBrowser, testOrigin } from '../support/browser';
import { violations } from './axe';
import { openAs, PHONE, type Window } from './people';

const SLOW = 120_000;

let browser: Browser;
let manager: Window;
beforeAll(async () => {
  browser = await launchBrowser();
  manager = await openAs(browser, 'anselm');
}, 60_000);
afterAll(() => browser.close());

const today = async (page: Page) =>
  (await page.locator('nav[aria-label="Days"] a').first().getAttribute('href'))!.split('=')[1]!;
/** A day nobody else books, and another one for each run of this test against a demo lab that stays. */
const quietDay = addDays(new Date().toISOString().slice(0, 10), 60 + (Math.floor(Date.now() / 60_000) % 300));

test(
  'the wordmark leads the lab’s people to their day; every booking stands in a lane and in the table',
  async () => {
    const { page } = manager;
    await page.goto(testOrigin());
    await page.waitForURL('**/day');
    expect(await page.locator('.top-nav [aria-current="page"]').innerText()).toContain('Day');
    const names = await page.locator('.lane-name strong').allInnerTexts();
    expect(names).toEqual(expect.arrayContaining(['3 m chamber', 'Mains bench', 'Loop', 'Cables and probes']));
    const rows = page.getByRole('table', { name: 'Bookings of this day' }).locator('tbody tr');
    const slips = page.locator('.lane-slip');
    expect(await slips.count()).toBe(await rows.count());
    expect(await slips.count()).toBeGreaterThan(3);
    expect(
      await slips.evaluateAll((all) => all.filter((one) => /TP-9 M0/.test(one.textContent ?? '')).length),
    ).toBeGreaterThan(0);
  },
  SLOW,
);

test(
  'the arrow keys turn the days, and the address says which',
  async () => {
    const { page } = manager;
    const before = await today(page);
    await page.keyboard.press('ArrowRight');
    await page.waitForURL(`**/day?day=${addDays(before, 2)}`);
    await page.getByRole('link', { name: 'Today' }).waitFor();
    await page.keyboard.press('ArrowLeft');
    await page.waitForURL(`**/day?day=${addDays(before, 1)}`);
    await page.keyboard.press('ArrowLeft');
    await page.waitForURL(`**/day?day=${before}`);
  },
  SLOW,
);

test(
  'a manager books with B; the slip hangs in its lane; the same time again is refused in words',
  async () => {
    const { page } = manager;
    await page.goto(`${testOrigin()}/day?day=${quietDay}`);
    await page.getByText('Book a position to fill this day.').waitFor();
    const fill = async () => {
      await page.keyboard.press('b');
      const form = page.getByRole('form', { name: 'Book a position' });
      await form.getByLabel('Test position').selectOption({ label: 'C, Loop' });
      await form.getByLabel('Technician').selectOption({ label: 'Mira Solt' });
      await form.getByLabel('Sample').selectOption({ label: 'TP-9, S-050' });
      expect(await form.getByLabel('State').locator('option:checked').innerText()).toBe('M0');
      await form.getByLabel('What is to be done').fill('magnetic field');
      await form.getByLabel('Start, time').selectOption('10:15');
      expect(await form.getByLabel('End, time').inputValue()).toBe('12:15');
      expect(await violations(manager.page)).toEqual([]);
      await form.getByRole('button', { name: 'Book it' }).click();
      return form;
    };
    await fill();
    const slip = page.getByRole('button', { name: /10:15 to 12:15, TP-9 M0, magnetic field, Mira Solt, position C/ });
    await slip.waitFor();
    await page.getByText('One booking; the first is').waitFor();
    const form = await fill();
    await form.getByText('This time is taken.').waitFor();
    expect(await form.locator('.message').innerText()).toMatch(
      /Position C, Loop, is taken .*, 10:15 to 12:15 by TP-9 M0 \(S-050\) with Mira Solt\. .* next free together .*, 12:15\./,
    );
    await page.keyboard.press('Escape');
  },
  SLOW,
);

test(
  'it is moved and then cancelled with a reason, each on the version that was read',
  async () => {
    const { page } = manager;
    await page.getByRole('button', { name: 'Move or change' }).click();
    const form = page.getByRole('form', { name: 'Move the booking' });
    await form.getByLabel('Start, time').selectOption('14:00');
    await form.getByRole('button', { name: 'Save the booking' }).click();
    await page.getByRole('button', { name: /14:00 to 16:00, TP-9 M0/ }).waitFor();
    await page.getByRole('button', { name: 'Cancel with a reason' }).click();
    await page.getByLabel('The reason').fill('the pump is away');
    await page.getByRole('button', { name: 'Cancel the booking of TP-9' }).click();
    await page.getByText('Book a position to fill this day.').waitFor();
    const query = `from=${quietDay}T00:00:00Z&to=${quietDay}T23:59:59Z&cancelled=with`;
    const answer = await manager.context.request.get(`${testOrigin()}/api/bookings?${query}`);
    const { items } = (await answer.json()) as { items: { version: number; cancelled: { reason: string } | null }[] };
    expect(items.map(({ version, cancelled }) => [version, cancelled?.reason])).toEqual([[3, 'the pump is away']]);
  },
  SLOW,
);

test(
  'a technician sees the own bookings marked, what to mind at the bench, the way to the upload, and books nothing',
  async () => {
    const window = await openAs(browser, 'mira');
    const { page } = window;
    await page.goto(`${testOrigin()}/day`);
    await page.locator('.lane-slip-own').first().waitFor();
    expect(await page.getByRole('button', { name: 'Book a position' }).count()).toBe(0);
    await page
      .getByRole('button', { name: /position B/ })
      .first()
      .click();
    await page.getByText('An AMN passes a large leakage current to protective earth.', { exact: false }).waitFor();
    await page.getByRole('button', { name: /TP-9 M0, .*, you, position A/ }).click();
    await page.getByText('Chamber door').waitFor();
    const upload = page.getByRole('link', { name: /Start a run of TP-9 M0/ });
    expect(await upload.getAttribute('href')).toMatch(/^\/sweeps\/new\?state=[0-9a-z]{16}$/);
    expect([...(await violations(window.page)), ...window.complaints]).toEqual([]);
    await window.context.close();
  },
  SLOW,
);

test(
  'on a phone the lanes scroll in their own frame and every slip is 44 px high',
  async () => {
    const window = await openAs(browser, 'mira', PHONE, 'dim');
    const { page } = window;
    await page.goto(`${testOrigin()}/day`);
    await page.locator('.lane-slip').first().waitFor();
    const heights = await page
      .locator('.lane-slip')
      .evaluateAll((all) => all.map((one) => one.getBoundingClientRect().height));
    expect(Math.min(...heights)).toBeGreaterThanOrEqual(44);
    expect(
      await page.evaluate(() => document.documentElement.scrollWidth <= document.documentElement.clientWidth + 1),
    ).toBe(true);
    expect([...(await violations(window.page)), ...window.complaints]).toEqual([]);
    await window.context.close();
  },
  SLOW,
);

test(
  'a designer has no day sheet, and an address that is no day is not found',
  async () => {
    const designer = await openAs(browser, 'teo');
    expect((await designer.page.goto(`${testOrigin()}/day`))!.status()).toBe(404);
    await designer.context.close();
    expect((await manager.page.goto(`${testOrigin()}/day?day=2026-13-01`))!.status()).toBe(404);
  },
  SLOW,
);
