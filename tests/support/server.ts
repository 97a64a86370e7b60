import { type ChildProcess, spawn } from 'node:child_process';
import { existsSync } from 'node:fs';
import { createServer } from 'node:net';
import path from 'node:path';
import type { SchemaUrls } from '../../src/ops/testDatabase';

const ROOT = path.resolve(__dirname, '../..');
/** Where `npm test` builds; NEXT_DIST_DIR chooses another one. */
export const TEST_BUILD = process.env.NEXT_DIST_DIR ?? '.stillfield-test/next';

/** STILLFIELD_TEST_DEV=1: without a build, pages are compiled as they are asked for. For one test file at a time. */
const DEV = process.env.STILLFIELD_TEST_DEV === '1';

export interface RunningServer {
  /** like http://127.0.0.1:41234 */
  origin: string;
  /** what the process has written so far, JSON lines */
  log(): string;
  /** the process itself, for tests that signal it */
  process: ChildProcess;
  /** Drains and waits for the end; resolves to the exit code. */
  stop(): Promise<number | null>;
}

export function freePort(): Promise<number> {
  return new Promise((resolve, reject) => {
    const probe = createServer();
    probe.once('error', reject);
    probe.listen(0, '127.0.0.1', () => {
      const address = probe.address();
      probe.close(() => resolve(typeof address === 'object' && address ? address.port : 0));
    });
  });
}

export interface RunningEntry {
  process: ChildProcess;
  /** what it has written so far */
  words(): string;
  /** its exit code, null when a signal ended it */
  ended: Promise<number | null>;
}

/** Starts a TypeScript entry point; it drains by itself when this process is gone. */
export function startEntry(file: string, args: string[], env: Record<string, string>): RunningEntry {
  const child = spawn(process.execPath, ['--import', 'tsx', path.join(ROOT, file), ...args], {
    cwd: ROOT,
    env: { ...process.env, ...env },
    stdio: ['ignore', 'pipe', 'pipe', 'ipc'],
  });
  let words = '';
  child.stdout?.on('data', (chunk: Buffer) => (words += chunk.toString()));
  child.stderr?.on('data', (chunk: Buffer) => (words += chunk.toString()));
  const ended = new Promise<number | null>((resolve) => child.once('exit', resolve));
  return { process: child, words: () => words, ended };
}

/** Runs a TypeScript entry point to its end; throws with its words when it fails. */
export async function runEntry(file: string, args: string[], env: Record<string, string>): Promise<string> {
  const entry = startEntry(file, args, env);
  const code = await entry.ended;
  if (code !== 0) throw new Error(`${file} ended with ${code}:\n${entry.words()}`);
  return entry.words();
}

/** What a server or an entry point of the tests runs with. */
export function testEnvironment(urls: SchemaUrls, port: number): Record<string, string> {
  return {
    DATABASE_URL: urls.databaseUrl,
    SESSION_SECRET: 'a session secret that only the tests use',
    APP_ORIGIN: `http://127.0.0.1:${port}`,
    HOST: '127.0.0.1',
    PORT: String(port),
    NODE_ENV: DEV ? 'development' : 'production',
    NEXT_DIST_DIR: TEST_BUILD,
    NEXT_TELEMETRY_DISABLED: '1',
  };
}

const built = () => existsSync(path.join(ROOT, TEST_BUILD, 'BUILD_ID'));

/**
 * Starts the built product on a free port with the given schema and waits until it is ready.
 * @param urls as `freshDatabase` answers
 * @param extra further environment variables
 */
export async function startServer(urls: SchemaUrls, extra: Record<string, string> = {}): Promise<RunningServer> {
  if (!DEV && !built()) {
    throw new Error(
      `there is no build in ${TEST_BUILD}: npm test makes it, or NEXT_DIST_DIR=${TEST_BUILD} npx next build`,
    );
  }
  return startListening('src/ops/server.ts', DEV ? ['--dev'] : [], urls, extra, DEV ? 180_000 : 30_000);
}

/** The built product, as `npm test` makes it; without a build the API alone (routeServer.ts), for tests of the API. */
export async function startApi(urls: SchemaUrls): Promise<RunningServer> {
  return built() ? startServer(urls) : startListening('tests/support/routeServer.ts', [], urls, {}, 90_000);
}

async function startListening(
  file: string,
  args: string[],
  urls: SchemaUrls,
  extra: Record<string, string>,
  atMostMs: number,
): Promise<RunningServer> {
  const port = await freePort();
  const environment = { ...testEnvironment(urls, port), ...extra };
  const { process: child, words, ended } = startEntry(file, args, environment);
  const origin = `http://127.0.0.1:${port}`;
  const until = Date.now() + atMostMs;
  for (;;) {
    const ready = await fetch(`${origin}/api/ready`)
      .then((answer) => answer.ok)
      .catch(() => false);
    if (ready) break;
    if (child.exitCode !== null || Date.now() > until) {
      child.kill('SIGKILL');
      throw new Error(`the server did not get ready:\n${words()}`);
    }
    await new Promise((resolve) => setTimeout(resolve, 100));
  }
  return {
    origin,
    log: words,
    process: child,
    stop: () => {
      child.kill('SIGTERM');
      return ended;
    },
  };
}
