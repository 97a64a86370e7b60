import { waitingFor, type Problem } from '@/components/forms/problem';
import { sendFile } from '@/components/forms/sendFile';
import { createSweepFile, type SweepFileView } from '@/schemas/sweepFile';
import type { DropEntry } from './dropEntry';

/** Each may take the server 100 MB of memory, and a bench's network is shared. */
const AT_ONCE = 2;
const AGAIN_MS = 5000;
const BUSY_OR_AWAY = [0, 429, 502, 503, 504];

type Progress = Pick<Partial<DropEntry>, 'share' | 'problem'>;

interface Told {
  onProgress: (key: string, change: Progress) => void;
  onHeld: (key: string, file: SweepFileView) => void;
}

/**
 * Sends files, at most two at once, each with its own progress. A server that is busy or away is waited for and the
 * file sent again, for as long as the page stands; only a refusal ends it.
 */
export class UploadQueue {
  private waiting: { key: string; file: File }[] = [];
  private readonly flying = new Map<string, AbortController>();

  constructor(private readonly told: Told) {}

  add(files: readonly { key: string; file: File }[]): void {
    this.waiting.push(...files);
    this.next();
  }

  stop(key: string): void {
    this.waiting = this.waiting.filter((one) => one.key !== key);
    this.flying.get(key)?.abort();
  }

  close(): void {
    this.waiting = [];
    for (const stop of this.flying.values()) stop.abort();
  }

  private next(): void {
    while (this.flying.size < AT_ONCE) {
      const one = this.waiting.shift();
      if (!one) return;
      const stop = new AbortController();
      this.flying.set(one.key, stop);
      void this.send(one.key, one.file, stop.signal).finally(() => {
        this.flying.delete(one.key);
        this.next();
      });
    }
  }

  private async send(key: string, file: File, signal: AbortSignal): Promise<void> {
    const { onProgress, onHeld } = this.told;
    while (!signal.aborted) {
      const form = new FormData();
      form.append('file', file);
      const outcome = await sendFile<SweepFileView>(createSweepFile, form, {
        idempotencyKey: key,
        signal,
        onShare: (share) => !signal.aborted && onProgress(key, { share, problem: null }),
        onWait: (problem) => !signal.aborted && onProgress(key, { share: null, problem: waitsFor(problem) }),
      });
      if (signal.aborted) return;
      if (outcome.ok) return onHeld(key, outcome.reply);
      const { problem } = outcome;
      const waits = BUSY_OR_AWAY.includes(problem.status);
      onProgress(key, { share: null, problem: waits ? waitsFor(problem) : problem });
      if (!waits) return;
      await pause(Math.max(AGAIN_MS, (problem.retryAfterS ?? 0) * 1000), signal);
    }
  }
}

function waitsFor(problem: Problem): Problem {
  if (problem.status !== 429) return waitingFor(problem);
  return {
    ...problem,
    title: 'The lab takes in other files just now; this one is sent again by itself.',
    waiting: true,
  };
}

/** A network that comes back, or stopping, ends it early. */
function pause(milliseconds: number, signal: AbortSignal): Promise<void> {
  return new Promise((resolve) => {
    const done = () => {
      clearTimeout(timer);
      window.removeEventListener('online', done);
      signal.removeEventListener('abort', done);
      resolve();
    };
    const timer = setTimeout(done, milliseconds);
    window.addEventListener('online', done);
    signal.addEventListener('abort', done);
  });
}
