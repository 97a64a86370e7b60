import type { Browser } from 'playwright-core';
import { launchBrowser } from '../support/browser';
import { wrongOnPages, wrongSignedOut } from './pages';
import { PHONE } from './people';

let browser: Browser;
beforeAll(async () => {
  browser = await launchBrowser();
}, 60_000);
afterAll(() => browser.close());

test.each(['anselm', 'mira', 'teo'])(
  '%s at a phone: in neither room has a page an accessibility violation, is wider than its window or makes the browser complain',
  async (key) => expect(await wrongOnPages(browser, key, PHONE)).toEqual([]),
  300_000,
);

test('no page for somebody who is not signed in has an accessibility violation at a phone, in either room', async () => {
  expect(await wrongSignedOut(browser, PHONE)).toEqual([]);
}, 120_000);
