import { OFFLINE, problemOf, retryAfterOf, UNREACHABLE, type Problem } from './problem';
import { untilAnswered, type Patience } from './untilAnswered';

/** The part of an API operation that a browser needs; every `operation(…)` of @/schemas fits. */
export interface Submittable {
  method: 'POST' | 'PATCH' | 'PUT' | 'DELETE' | 'GET';
  /** `/api/jobs/{id}`, or the path already filled in. */
  path: string;
}

export interface SendOptions {
  /** For `{id}` and the like in the path. */
  params?: Readonly<Record<string, string>>;
  /** The `version` the change was made on. */
  ifMatch?: number | string;
  signal?: AbortSignal;
  /** Told each time that it waits before it sends again; `waits` is for tests. */
  onWait?: Patience['onWait'];
  /** Ends the waiting, not what is on its way. */
  patience?: AbortSignal;
  waits?: Patience['waits'];
}

export type Outcome<Reply> =
  { ok: true; status: number; reply: Reply; version: string | null } | { ok: false; problem: Problem };

/** @throws Error when the path names a parameter that was not given */
export function filledPath(path: string, params: SendOptions['params'] = {}): string {
  return path.replace(/\{(\w+)\}/g, (_whole, name: string) => {
    const value = params[name];
    if (value === undefined) throw new Error(`${path} needs ${name}`);
    return encodeURIComponent(value);
  });
}

/**
 * Sends one operation to our own origin. Never throws for what the network or the server does. While no answer comes, or
 * a 502 to 504, it sends again by itself for about twenty seconds: a GET, or a POST under an Idempotency-Key, which the
 * server does once; anything else only where the server says that it may be repeated.
 */
export async function send<Reply>(
  operation: Submittable,
  body: unknown,
  options: SendOptions & { idempotencyKey?: string },
  doFetch: typeof fetch = fetch,
): Promise<Outcome<Reply>> {
  const { signal, patience, onWait, waits } = options;
  const once = operation.method === 'GET' || (operation.method === 'POST' && options.idempotencyKey !== undefined);
  return untilAnswered(() => sendOnce<Reply>(operation, body, options, doFetch), {
    once,
    signals: [signal, patience],
    onWait,
    waits,
  });
}

async function sendOnce<Reply>(
  operation: Submittable,
  body: unknown,
  { params, ifMatch, signal, idempotencyKey }: SendOptions & { idempotencyKey?: string },
  doFetch: typeof fetch,
): Promise<Outcome<Reply>> {
  const path = filledPath(operation.path, params);
  const headers: Record<string, string> = { accept: 'application/json, application/problem+json' };
  const form = typeof FormData !== 'undefined' && body instanceof FormData;
  if (body !== undefined && !form) headers['content-type'] = 'application/json';
  if (idempotencyKey) headers['idempotency-key'] = idempotencyKey;
  if (ifMatch !== undefined) headers['if-match'] = typeof ifMatch === 'number' ? `"${ifMatch}"` : ifMatch;
  try {
    const response = await doFetch(path, {
      method: operation.method,
      credentials: 'same-origin',
      headers,
      body: body === undefined ? undefined : form ? (body as FormData) : JSON.stringify(body),
      signal,
    });
    const text = await response.text();
    if (!response.ok) {
      const problem = problemOf(response.status, response.headers.get('content-type'), text);
      const retryAfterS = retryAfterOf(response.headers.get('retry-after'));
      return { ok: false, problem: retryAfterS === null ? problem : { ...problem, retryAfterS } };
    }
    const reply = (text === '' ? null : JSON.parse(text)) as Reply;
    return { ok: true, status: response.status, reply, version: response.headers.get('etag') };
  } catch {
    return { ok: false, problem: unreachable() };
  }
}

export function unreachable(): Problem {
  return typeof navigator !== 'undefined' && navigator.onLine === false ? OFFLINE : UNREACHABLE;
}

/** Something that tells one body from another; files count by name, size and date. */
function fingerprint(body: unknown): string {
  if (typeof FormData === 'undefined' || !(body instanceof FormData)) return JSON.stringify(body) ?? '';
  const parts = [...body.entries()].map(([name, value]) =>
    typeof value === 'string' ? [name, value] : [name, value.name, value.size, value.lastModified],
  );
  return JSON.stringify(parts);
}

/**
 * One key per thing asked for: a repeat of the same body after no answer (or a 5xx) carries the same key, so that a lost
 * reply is not done twice; a changed body or a settled answer takes a new one.
 */
export class IdempotencyKeys {
  private held: { key: string; of: string } | null = null;

  constructor(private readonly newKey: () => string = () => crypto.randomUUID()) {}

  keyFor(path: string, body: unknown): string {
    const of = `${path} ${fingerprint(body)}`;
    if (this.held?.of !== of) this.held = { key: this.newKey(), of };
    return this.held.key;
  }

  settle(outcome: Outcome<unknown>): void {
    if (outcome.ok || (outcome.problem.status > 0 && outcome.problem.status < 500)) this.held = null;
  }
}
