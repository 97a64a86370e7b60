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
  const complaints: string[] = [];
  page.on('console', (message) => message.type() === 'error' && complaints.push(message.text()));
  page.on('pageerror', (error) => complaints.push(error.message));
  return { context, page, complaints };
}

/** The public id of a run by its number, as somebody who may see it. */
export async function runId({ context }: Window, number: string): Promise<string> {
  const answer = await context.request.get(`${testOrigin()}/api/sweeps?limit=200`);
  const { items } = (await answer.json()) as { items: { id: string; number: string }[] };
  return items.find((item) => item.number.endsWith(number))!.id;
}
