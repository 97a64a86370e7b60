import { type ChildProcess, spawn, spawnSync } from 'node:child_process';
import { existsSync } from 'node:fs';
import path from 'node:path';
import { users } from '@fixtures/demo/people';

export interface Product {
  origin: string;
  pid: number;
  cookie: string;
  stop(): Promise<void>;
}

/** The built product on the port of APP_ORIGIN, built first when it is not, and somebody signed in. */
export async function startProduct(): Promise<Product> {
  const root = process.cwd();
  const dist = process.env.NEXT_DIST_DIR || '.next';
  if (!existsSync(path.join(root, dist, 'BUILD_ID'))) {
    const built = spawnSync(process.execPath, ['node_modules/next/dist/bin/next', 'build'], { cwd: root });
    if (built.status !== 0) throw new Error(`next build failed: ${built.stderr}`);
  }
  const origin = process.env.APP_ORIGIN!;
  const child = spawn(process.execPath, ['--import', 'tsx', 'src/ops/server.ts'], {
    cwd: root,
    env: { ...process.env, PORT: new URL(origin).port, HOST: '127.0.0.1' },
    stdio: 'ignore',
  });
  try {
    await untilReady(origin, child);
    return { origin, pid: child.pid!, cookie: await signIn(origin), stop: () => stop(child) };
  } catch (error) {
    await stop(child);
    throw error;
  }
}

async function untilReady(origin: string, child: ChildProcess): Promise<void> {
  const until = Date.now() + 120_000;
  while (Date.now() < until && child.exitCode === null) {
    const ready = await fetch(`${origin}/api/ready`).catch(() => null);
    if (ready?.ok) return;
    await new Promise((resolve) => setTimeout(resolve, 200));
  }
  throw new Error('the built product did not get ready');
}

async function signIn(origin: string): Promise<string> {
  const { email, passphrase } = users.find(({ key }) => key === 'mira')!;
  const answer = await fetch(`${origin}/api/session`, {
    method: 'POST',
    headers: { 'content-type': 'application/json', origin },
    body: JSON.stringify({ email, password: passphrase }),
  });
  if (!answer.ok) throw new Error(`nobody could sign in: ${answer.status} ${await answer.text()}`);
  return answer.headers.get('set-cookie')!.split(';')[0]!;
}

async function stop(child: ChildProcess): Promise<void> {
  if (child.exitCode !== null) return;
  child.kill('SIGTERM');
  await new Promise((resolve) => child.once('exit', resolve));
}
