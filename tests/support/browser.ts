import { existsSync } from 'node:fs';
import { type Browser, chromium } from 'playwright-core';

const PATHS = ['/usr/bin/chromium', '/usr/bin/chromium-browser', '/usr/bin/google-chrome'];

/** Debian's chromium, or the one CHROMIUM_PATH names. */
export function launchBrowser(): Promise<Browser> {
  const executablePath = process.env.CHROMIUM_PATH ?? PATHS.find((path) => existsSync(path));
  if (!executablePath) throw new Error('there is no chromium: npm test installs it, or set CHROMIUM_PATH');
  const args = process.getuid?.() === 0 ? ['--no-sandbox'] : [];
  return chromium.launch({ executablePath, args: [...args, '--disable-dev-shm-usage'] });
}

/** Address of the server that the test file has for itself. */
export function testOrigin(): string {
  const origin = process.env.STILLFIELD_TEST_ORIGIN;
  if (!origin) throw new Error('browser tests run in the browser project: npx jest --selectProjects browser');
  return origin;
}
