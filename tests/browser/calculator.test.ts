import type { Browser } from 'playwright-core';
import { launchBrowser, testOrigin } from '../support/browser';
import { DESK, openAs, PHONE, type Window } from './people';

/* The calculator as it is used: typed, linked, walked through by keys, and on a phone. */

let browser: Browser;
beforeAll(async () => {
  browser = await launchBrowser();
}, 60_000);
afterAll(() => browser.close());

/** A development server compiles what is asked for first. */
async function opened(key: string, viewport = DESK): Promise<Window> {
  const window = await openAs(browser, key, viewport);
  window.context.setDefaultTimeout(90_000);
  return window;
}

const finding = ({ page }: Window) => page.locator('.calc-says').innerText();
const heading = ({ page }: Window, name: string) => page.getByRole('heading', { level: 2, name }).waitFor();

test('from the menu under the name: a level is typed with a comma, its working opens, and the address holds it', async () => {
  const window = await opened('teo');
  const { page } = window;
  await page.goto(`${testOrigin()}/account`);
  await page.getByRole('button', { name: /^Teo Lind/ }).click();
  await page.getByRole('link', { name: 'Calculator' }).click();
  await page.waitForURL('**/calculator');
  await heading(window, 'Level units');
  await page.getByLabel('Level is in').selectOption('dBm');
  await page.getByLabel('Level, in dBm').fill('-68,5');
  await page.getByLabel('Impedance, in ohm').fill('0');
  await page.getByText('0 is not above zero.').waitFor();
  await page.getByRole('button', { name: 'Impedance 50 ohm' }).click();
  expect(await finding(window)).toMatch(/^[−-]68\.50\s*dBm in 50\s*ohm is 38\.49\s*dBµV\.$/);
  await page.getByRole('button', { name: /^Voltage 84\.04 µV, show working/ }).click();
  await page.getByRole('region', { name: 'Working' }).getByText('definition of dBµV').waitFor();
  await page.waitForURL('**/calculator?pane=levels&unit=dBm&level=-68%2C5&ohm=50&show=volts');
  await page.reload();
  expect(await page.getByLabel('Level, in dBm').inputValue()).toBe('-68,5');
  expect(window.complaints).toEqual([]);
  await window.context.close();
}, 180_000);

test('↓ goes to the next calculation, Back comes back to what was typed, and a link opens it elsewhere', async () => {
  const window = await opened('mira');
  const { page } = window;
  await page.goto(`${testOrigin()}/calculator?pane=eirp&have=field&level=43.5`);
  await page.getByLabel('Distance, in m').fill('3');
  await page.getByRole('heading', { level: 1 }).click();
  await page.keyboard.press('ArrowDown');
  await heading(window, 'Electric and magnetic field');
  await page.keyboard.press('ArrowUp');
  await heading(window, 'EIRP, ERP and field strength');
  await page.goBack();
  await heading(window, 'Electric and magnetic field');
  await page.goBack();
  await heading(window, 'EIRP, ERP and field strength');
  expect(await page.getByLabel('Distance, in m').inputValue()).toBe('3');
  expect(await finding(window)).toMatch(/is [−-]51\.73\s*dBm EIRP\.$/);
  const other = await opened('anselm');
  await other.page.goto(page.url());
  expect(await finding(other)).toBe(await finding(window));
  await other.context.close();
  await window.context.close();
}, 120_000);

test('on a phone one calculation at a time is chosen from a field, and the drawer shows its working', async () => {
  const window = await opened('mira', PHONE);
  const { page } = window;
  await page.goto(`${testOrigin()}/calculator`);
  expect(await page.locator('.calc-list').isVisible()).toBe(false);
  await page.getByLabel('Calculation', { exact: true }).selectOption({ label: 'Mismatch' });
  await page.getByLabel('Ports are given as').selectOption('vswr');
  await page.getByLabel('Source port, in VSWR').fill('2');
  await page.getByLabel('Load port, in VSWR').fill('2');
  await page.getByRole('button', { name: /^Reads low by at most 1\.02 dB/ }).click();
  await page.locator('.column[data-reach="half"]').getByText('LAB34 3.4.3').first().waitFor();
  const low = await page
    .getByRole('table')
    .getByRole('button')
    .evaluateAll((buttons) => buttons.length);
  expect(low).toBe(5);
  expect(window.complaints).toEqual([]);
  await window.context.close();
}, 120_000);
