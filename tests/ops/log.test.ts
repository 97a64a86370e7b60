import { spawn } from 'node:child_process';
import path from 'node:path';

const LOG = path.resolve(__dirname, '../../src/ops/log.ts');

/** A process that writes lines to somebody who is gone; what it does at last it says over the channel. */
function writer(first: string): Promise<{ code: number | null; said: unknown[] }> {
  const script = `
    import log from ${JSON.stringify(LOG)};
    ${first}
    let lines = 0;
    const timer = setInterval(() => {
      log.logLine('info', 'line');
      if (++lines === 20) {
        clearInterval(timer);
        process.send('twenty lines', () => process.disconnect());
      }
    }, 10);`;
  const child = spawn(process.execPath, ['--import', 'tsx', '--input-type=module', '-e', script], {
    stdio: ['ignore', 'pipe', 'ignore', 'ipc'],
  });
  child.stdout!.destroy();
  const said: unknown[] = [];
  child.on('message', (message) => said.push(message));
  return new Promise((resolve) => child.once('exit', (code) => resolve({ code, said })));
}

test('a process whose output nobody collects any more goes on', async () => {
  expect(await writer('log.outliveReader();')).toEqual({ code: 0, said: ['twenty lines'] });
}, 60_000);

test('without it the first failed write is an error of the process', async () => {
  expect((await writer('')).code).not.toBe(0);
}, 60_000);
