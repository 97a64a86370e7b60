import { existsSync } from 'node:fs';
import type { Page } from 'playwright-core';
import { quantile, rounded, say } from './measure';
import type { Product } from './product';

/** How long each frame took while `act` went on, in milliseconds. */
async function frames(page: Page, act: () => Promise<void>): Promise<number[]> {
  await page.evaluate(() => {
    const times: number[] = [];
    Object.assign(window, { frameTimes: times, watchingFrames: true });
    const frame = (at: number) => {
      times.push(at);
      if ((window as never as { watchingFrames: boolean }).watchingFrames) requestAnimationFrame(frame);
    };
    requestAnimationFrame(frame);
  });
  await act();
  const times = await page.evaluate(() => {
    const watched = window as never as { watchingFrames: boolean; frameTimes: number[] };
    watched.watchingFrames = false;
    return watched.frameTimes;
  });
  return times.slice(1).map((at, i) => at - times[i]!);
}

const MOVES = 120;

/** First paint of the sheet, and frames per second while its chart is dragged and zoomed, in chromium. */
export async function benchChart({ origin, cookie }: Product, runId: string): Promise<void> {
  const executablePath = ['/usr/bin/chromium', '/usr/bin/chromium-browser'].find((file) => existsSync(file));
  if (!executablePath) {
    say({ bench: 'chart', left: 'no chromium on this machine' });
    return;
  }
  const { chromium } = await import('playwright-core');
  const browser = await chromium.launch({ executablePath, args: process.getuid?.() === 0 ? ['--no-sandbox'] : [] });
  try {
    const context = await browser.newContext({ viewport: { width: 1440, height: 900 } });
    // What compiles this file names every function by a helper that no page has.
    await context.addInitScript('globalThis.__name = (named) => named;');
    const [name, value] = cookie.split(/=(.*)/s) as [string, string];
    await context.addCookies([{ name, value, url: origin }]);
    const paints: number[] = [];
    const charts: number[] = [];
    const page = await context.newPage();
    for (let i = 0; i < 5; i++) {
      await page.goto(`${origin}/sweeps/${runId}`);
      await page.locator('canvas').first().waitFor();
      charts.push(await page.evaluate(() => performance.now()));
      paints.push(await page.evaluate(() => performance.getEntriesByName('first-contentful-paint')[0]?.startTime ?? 0));
    }
    const box = (await page.locator('canvas').first().boundingBox())!;
    const [x, y] = [box.x + box.width / 2, box.y + box.height / 2];
    await page.mouse.move(x, y);
    const zoom = await frames(page, async () => {
      await page.keyboard.down('Control');
      for (let i = 0; i < MOVES; i++) await page.mouse.wheel(0, i < MOVES / 2 ? -12 : 12);
      for (let i = 0; i < 20; i++) await page.mouse.wheel(0, -12);
      await page.keyboard.up('Control');
    });
    const pan = await frames(page, async () => {
      await page.mouse.down();
      for (let i = 0; i < MOVES; i++) await page.mouse.move(x + 200 * Math.sin(i / 12), y);
      await page.mouse.up();
    });
    const idle = await frames(page, () => page.waitForTimeout(1000));
    const rate = (list: number[]) => ({
      frames: list.length,
      perSecond: rounded((1000 * list.length) / list.reduce((sum, ms) => sum + ms, 0)),
      p95Ms: rounded(quantile(list, 0.95)),
      longestMs: rounded(Math.max(...list)),
    });
    say({
      bench: 'chart',
      firstPaintMs: rounded(quantile(paints, 0.5)),
      traceDrawnMs: rounded(quantile(charts, 0.5)),
      ...{ pan: rate(pan), zoom: rate(zoom), idle: rate(idle) },
    });
  } finally {
    await browser.close();
  }
}
