import { users } from '@fixtures/demo/people';
import type { Browser, BrowserContext, Page } from 'playwright-core';
import { testOrigin } from '../support/browser';

export const DESK = { width: 1440, height: 900 };
export const PHONE = { width: 390, height: 844 };

export interface Window {
  context: BrowserContext;
  page: Page;
  /** What the browser complained of: errors, and anything the content security policy stopped. */
  complaints: string[];
}

/** A window of its own, signed in as somebody of the demo lab (by key) or as nobody. */
export async function openAs(browser: Browser, key: string | null, viewport = DESK, room = 'paper'): Promise<Window> {
  const phone = viewport.width < 760;
  const context = await browser.newContext({ viewport, hasTouch: phone, isMobile: phone, reducedMotion: 'reduce' });
  await context.addCookies([{ name: 'room', value: room, url: testOrigin() }]);
  if (key !== null) {
    const { email, passphrase: password } = users.find((user) => user.key === key)!;
    const answer = await context.request.post(`${testOrigin()}/api/session`, {
      data: { email, password },
      headers: { origin: testOrigin() },
    });
    if (!answer.ok()) throw new Error(`${key} could not sign in: ${answer.status()} ${await answer.text()}`);
  }
  const page = await context.newPage();
  awaken(page);
  const complaints: string[] = [];
  page.on('console', (message) => message.type() === 'error' && complaints.push(message.text()));
  page.on('pageerror', (error) => complaints.push(error.message));
  return { context, page, complaints };
}

/** Every `goto` of the page waits until its controls and keys are listened to: a key pressed before that goes nowhere. */
function awaken(page: Page): void {
  const go = page.goto.bind(page);
  page.goto = async (...to) => {
    const answer = await go(...to);
    if (answer?.headers()['content-type']?.includes('text/html')) await page.waitForFunction(isAwake);
    return answer;
  };
}

function isAwake(): boolean {
  const controls = [...document.querySelectorAll('button, input:not([type=hidden]), select, textarea')];
  const heard = (element: Element) => Object.keys(element).some((key) => key.startsWith('__reactProps'));
  const keys = document.querySelector('header.top') === null || document.documentElement.dataset.keys !== undefined;
  return keys && controls.every(heard);
}

/** What a run of the demo lab is, in the words of the API's list. */
export interface What {
  product: string;
  state: string;
  port: string;
  purpose: string;
  /** Of the mains, a conductor; of the enclosure, a polarisation. */
  position: string;
  trial?: string | null;
}

/** A development server compiles what is asked for first. */
const PATIENT = { timeout: 90_000 };

export interface FoundRun {
  id: string;
  number: string;
  stateId: string;
  sampleId: string;
}

/** The newest run that is this, as somebody who may see it. */
export async function findRun({ context }: Window, what: What): Promise<FoundRun> {
  const answer = await context.request.get(`${testOrigin()}/api/sweeps?limit=200`, PATIENT);
  const { items } = (await answer.json()) as { items: Record<string, string | boolean | null>[] };
  const { trial = null, position, ...rest } = what;
  const wanted = (run: (typeof items)[number]) =>
    Object.entries(rest).every(([key, value]) => run[key] === value) &&
    (run.line ?? run.polarisation) === position &&
    run.trial === trial &&
    run.voided === false;
  const found = items.find(wanted);
  if (!found) throw new Error(`the demo lab has no run that is ${JSON.stringify(what)}`);
  const run = await context.request.get(`${testOrigin()}/api/sweeps/${found.id as string}`, PATIENT);
  const { id, number, state, sample } = (await run.json()) as {
    id: string;
    number: string;
    state: { id: string };
    sample: { id: string };
  };
  return { id, number, stateId: state.id, sampleId: sample.id };
}

/** The horizontal final of the LD-40 in M2: 6.2 dB over at 144.018 MHz. */
export const LD40_OVER: What = {
  product: 'LD-40',
  state: 'M2',
  port: 'enclosure',
  purpose: 'final',
  position: 'horizontal',
};
