import { Worker } from 'node:worker_threads';
import { Throttled } from '@/errors';

/** How many hashes are computed at once, and how many requests may wait; beyond that the next one is turned away. */
export const WORKERS = 2;
export const QUEUE_LIMIT = 40;

type Task = { hash: string; cost: number } | { verify: string; against: string };

interface Waiting {
  task: Task;
  resolve: (answer: string | boolean) => void;
  reject: (error: Error) => void;
}

interface Slot {
  worker: Worker;
  busy: Waiting | null;
}

/**
 * The worker is started from text, not from a file: a path beside this module does not survive bundling, while the
 * same text runs under Node, tsx, jest and the built server. bcryptjs is found from the directory the process was
 * started in, or from that of its main script.
 */
const CODE = `
const { parentPort, workerData } = require('node:worker_threads');
const bcrypt = require(require.resolve('bcryptjs', { paths: workerData }));
parentPort.on('message', (task) => {
  try {
    const answer = 'hash' in task ? bcrypt.hashSync(task.hash, task.cost) : bcrypt.compareSync(task.verify, task.against);
    parentPort.postMessage({ answer });
  } catch (error) {
    parentPort.postMessage({ failure: error instanceof Error ? error.message : 'unknown' });
  }
});
`;

interface Pool {
  slots: Slot[];
  queue: Waiting[];
}

// One pool per process: the server's bundles each hold their own copy of this module.
const holder = globalThis as typeof globalThis & { stillfieldPasswordPool?: Pool };

function pool(): Pool {
  holder.stillfieldPasswordPool ??= { slots: [], queue: [] };
  return holder.stillfieldPasswordPool;
}

/** Runs one bcrypt task off the event loop. @throws {Throttled} when QUEUE_LIMIT tasks wait already */
export function runBcrypt(task: Task): Promise<string | boolean> {
  const { queue } = pool();
  if (queue.length >= QUEUE_LIMIT) {
    throw new Throttled(5, 'Many people are signing in just now. Try again in a few seconds.');
  }
  return new Promise((resolve, reject) => {
    queue.push({ task, resolve, reject });
    next();
  });
}

/** Hands waiting tasks to idle workers, starting workers up to WORKERS. */
function next(): void {
  const { slots, queue } = pool();
  while (queue.length > 0) {
    let slot = slots.find(({ busy }) => busy === null);
    if (!slot) {
      if (slots.length >= WORKERS) return;
      slot = start();
    }
    slot.busy = queue.shift()!;
    slot.worker.ref();
    slot.worker.postMessage(slot.busy.task);
  }
}

function start(): Slot {
  const paths = [process.cwd(), ...(process.argv[1] ? [process.argv[1]] : [])];
  // None of the parent's flags: a loader of the parent (tsx, jest) has no business in here.
  const worker = new Worker(CODE, { eval: true, workerData: paths, execArgv: [], env: {} });
  const slot: Slot = { worker, busy: null };
  pool().slots.push(slot);
  worker.on('message', (reply: { answer?: string | boolean; failure?: string }) => {
    const done = slot.busy;
    slot.busy = null;
    // An idle worker does not keep a finished command alive.
    worker.unref();
    if (reply.answer === undefined) done?.reject(new Error(`bcrypt failed: ${reply.failure}`));
    else done?.resolve(reply.answer);
    next();
  });
  const drop = (error: Error) => {
    const { slots } = pool();
    const at = slots.indexOf(slot);
    if (at < 0) return;
    slots.splice(at, 1);
    slot.busy?.reject(error);
    slot.busy = null;
    next();
  };
  worker.on('error', drop);
  worker.on('exit', (code) => drop(new Error(`a password worker ended with code ${code}`)));
  return slot;
}

/** Ends the workers; tests call it last. */
export async function closePasswordWorkers(): Promise<void> {
  await Promise.all(pool().slots.map(({ worker }) => worker.terminate()));
}
