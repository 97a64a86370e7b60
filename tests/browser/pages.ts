import type { Browser } from 'playwright-core';
import { testOrigin } from '../support/browser';
import { COLOURS, violations } from './axe';
import { type DESK, findRun, LD40_OVER, openAs, type Window } from './people';

/* Every page as each role that may see it, looked at in both rooms. */

type Room = 'paper' | 'dim';

/** Whether the page is wider than its window; content may scroll inside its own frame, the page may not. */
const tooWide = ({ page }: Window) =>
  page.evaluate(() => document.documentElement.scrollWidth > document.documentElement.clientWidth + 1);

/** Addresses of the records that the pages below show, looked up as the person who opens them. */
async function pagesFor(window: Window, key: string): Promise<string[]> {
  const first = async (list: string) => {
    const answer = await window.context.request.get(
      `${testOrigin()}/api/${list}${list.includes('?') ? '&' : '?'}limit=1`,
    );
    return ((await answer.json()) as { items: { id: string }[] }).items[0]!.id;
  };
  const over = await findRun(window, LD40_OVER);
  const before = await findRun(window, { ...LD40_OVER, state: 'M1' });
  const trial = await findRun(window, { ...LD40_OVER, purpose: 'prescan', trial: 'foil on lid' });
  const shared = [
    '/sweeps',
    `/sweeps/${over.id}`,
    `/sweeps/${trial.id}`,
    `/compare?a=${before.id}&b=${over.id}`,
    `/compare?b=${over.id}`,
    `/samples/${over.sampleId}`,
    '/jobs',
    `/jobs/${await first('jobs')}`,
    `/samples/${await first('samples')}`,
    '/products',
    `/products/${await first('products')}`,
    '/find?q=LD-40',
    '/retests',
    '/calculator',
    '/calculator?pane=field&unit=dBuV&reading=52.1&af=14.3&loss=2.1&gain=x&rule=20&f=10&from=3&to=10',
    '/calculator?pane=mismatch&as=vswr&vs=2&vl=1.5&show=low',
    '/account',
  ];
  if (key === 'teo') return shared;
  const lab = [
    ...shared,
    '/day',
    '/sweeps/new',
    `/finals?state=${over.stateId}&port=enclosure`,
    '/jobs/new',
    '/equipment',
    `/equipment/${await first('equipment?find=ANT-02')}`,
    `/paths/${await first('signal-paths')}`,
    '/limits',
    `/limits/${await first('limit-lines')}`,
  ];
  if (key === 'mira') return lab;
  const managers = [`/equipment/${await first('equipment?find=ANT-02')}/upload`, '/limits/new', '/limits/sets/new'];
  return [...lab, ...managers, '/people', '/people/new', `/people/${await first('people')}`];
}

/** The other room, as its toggle enters it; only colours change. */
async function enterRoom({ page }: Window, room: Room): Promise<void> {
  await page.evaluate((to) => {
    if (to === 'dim') document.documentElement.dataset.room = to;
    else delete document.documentElement.dataset.room;
  }, room);
}

/** What is wrong with any page that the person may open, and what the browser complained of on the way. */
export async function wrongOnPages(browser: Browser, key: string, viewport: typeof DESK): Promise<string[]> {
  // a page comes in one room and is then looked at in the other
  const rooms: [Room, Room] = key === 'mira' ? ['dim', 'paper'] : ['paper', 'dim'];
  const window = await openAs(browser, key, viewport, rooms[0]);
  const wrong: string[] = [];
  for (const path of await pagesFor(window, key)) {
    const answer = await window.page.goto(testOrigin() + path, { waitUntil: 'load' });
    if (answer!.status() !== 200) wrong.push(`${path}: ${answer!.status()}`);
    if (/^\/sweeps\/[0-9a-z]{16}$|^\/compare\?a/.test(path)) await window.page.locator('canvas').first().waitFor();
    for (const found of await violations(window.page)) wrong.push(`${path}: ${found}`);
    if (await tooWide(window)) wrong.push(`${path}: wider than its window`);
    await enterRoom(window, rooms[1]);
    for (const found of await violations(window.page, COLOURS)) wrong.push(`${path}, ${rooms[1]}: ${found}`);
    await enterRoom(window, rooms[0]);
  }
  await window.context.close();
  return [...wrong, ...window.complaints];
}

const SIGNED_OUT = ['/sign-in', '/forgotten-password', '/reset#nothing', '/invitation#nothing', '/letters'];

/** The same for the pages of somebody who is not signed in. */
export async function wrongSignedOut(browser: Browser, viewport: typeof DESK): Promise<string[]> {
  const wrong: string[] = [];
  for (const room of ['paper', 'dim']) {
    const window = await openAs(browser, null, viewport, room);
    for (const path of SIGNED_OUT) {
      await window.page.goto(testOrigin() + path);
      for (const found of await violations(window.page)) wrong.push(`${path}: ${found}`);
      if (await tooWide(window)) wrong.push(`${path}: wider than its window`);
    }
    wrong.push(...window.complaints);
    await window.context.close();
  }
  return wrong;
}
