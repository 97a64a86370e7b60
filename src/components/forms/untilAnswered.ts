import type { Problem } from './problem';

/** Before each repeat, in milliseconds: about twenty seconds in all, as long as a person waits at a bench. */
const WAITS_MS = [1000, 2000, 4000, 6000, 8000];
const LONGEST_ASKED_MS = 10_000;

export interface Patience {
  /** A repeat cannot be done twice: it only reads, or it carries an Idempotency-Key. */
  once: boolean;
  /** Any of these ends the waiting; the last answer is then the answer. */
  signals?: readonly (AbortSignal | undefined)[];
  /** Told before each wait, with what was answered. */
  onWait?: (problem: Problem) => void;
  /** Also waits where the server asks for it because it is busy (429). */
  queues?: boolean;
  waits?: readonly number[];
}

type Answer = { ok: true } | { ok: false; problem: Problem };

/** Whether the same may be sent again, and help: the server or its database was not there. */
function worthRepeating({ type, status, repeatable }: Problem, { once, queues }: Patience): boolean {
  if (status === 429) return queues === true;
  // Our own server says whether; a proxy's word says nothing.
  if (status === 503 && type === '/problems/unavailable') return repeatable === true;
  return once && [0, 502, 503, 504].includes(status);
}

/** Does `send` again, a little later each time, until there is an answer that settles it or patience ends. */
export async function untilAnswered<A extends Answer>(send: () => Promise<A>, patience: Patience): Promise<A> {
  const { signals = [], onWait, waits = WAITS_MS } = patience;
  for (const wait of waits) {
    const answer = await send();
    if (answer.ok || !worthRepeating(answer.problem, patience) || signals.some((signal) => signal?.aborted))
      return answer;
    onWait?.(answer.problem);
    const asked = waits === WAITS_MS ? Math.min((answer.problem.retryAfterS ?? 0) * 1000, LONGEST_ASKED_MS) : 0;
    // Not everybody at once when a database comes back.
    const whole = await pause(Math.max(wait, asked) * (0.8 + Math.random() * 0.4), signals);
    if (!whole) return answer;
  }
  return send();
}

/** False when a signal cut it short. A network that comes back ends it early. */
function pause(milliseconds: number, signals: Patience['signals'] = []): Promise<boolean> {
  return new Promise((resolve) => {
    const done = (whole: boolean) => {
      clearTimeout(timer);
      globalThis.removeEventListener?.('online', back);
      for (const signal of signals) signal?.removeEventListener('abort', cut);
      resolve(whole);
    };
    const back = () => done(true);
    const cut = () => done(false);
    const timer = setTimeout(back, milliseconds);
    globalThis.addEventListener?.('online', back);
    for (const signal of signals) signal?.addEventListener('abort', cut);
  });
}
