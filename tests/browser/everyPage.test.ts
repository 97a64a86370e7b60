import type { Browser } from 'playwright-core';
import { launchBrowser, testOrigin } from '../support/browser';
import { wrongOnPages, wrongSignedOut } from './pages';
import { DESK, openAs } from './people';

let browser: Browser;
beforeAll(async () => {
  browser = await launchBrowser();
}, 60_000);
afterAll(() => browser.close());

test.each(['anselm', 'mira', 'teo'])(
  '%s at a desk: in neither room has a page an accessibility violation, is wider than its window or makes the browser complain',
  async (key) => expect(await wrongOnPages(browser, key, DESK)).toEqual([]),
  300_000,
);

test('no page for somebody who is not signed in has an accessibility violation at a desk, in either room', async () => {
  expect(await wrongSignedOut(browser, DESK)).toEqual([]);
}, 120_000);

test('the first Tab reaches a link past the top line, and it leads to the sheet', async () => {
  const window = await openAs(browser, 'mira');
  await window.page.goto(`${testOrigin()}/sweeps`);
  await window.page.keyboard.press('Tab');
  await window.page.keyboard.press('Enter');
  expect(await window.page.evaluate(() => document.activeElement?.id)).toBe('sheet');
  await window.context.close();
}, 60_000);
