import { problemOf, retryAfterOf } from './problem';
import { filledPath, unreachable, type Outcome, type Submittable } from './send';
import { untilAnswered, type Patience } from './untilAnswered';

export interface SendFileOptions extends Pick<Patience, 'onWait' | 'waits'> {
  params?: Readonly<Record<string, string>>;
  /** The same for every try of the same file, also those a person starts again: it is then kept once. */
  idempotencyKey: string;
  /** How much of it has left this device, 0 to 1. */
  onShare?: (share: number) => void;
  signal?: AbortSignal;
}

/**
 * Sends a form with a file in it and tells how far it is. While no answer comes, the server is busy or its database is
 * gone, it sends again by itself under the same key. A signal stops it at once. Never throws for what the network does.
 */
export function sendFile<Reply>(
  operation: Submittable,
  form: FormData,
  options: SendFileOptions,
): Promise<Outcome<Reply>> {
  const { onWait, waits, signal } = options;
  const patience = { once: true, queues: true, signals: [signal], onWait, waits };
  return untilAnswered(() => sendOnce<Reply>(operation, form, options), patience);
}

function sendOnce<Reply>(
  operation: Submittable,
  form: FormData,
  { params, idempotencyKey, onShare, signal }: SendFileOptions,
): Promise<Outcome<Reply>> {
  return new Promise((resolve) => {
    const request = new XMLHttpRequest();
    const cut = () => request.abort();
    const settle = (outcome: Outcome<Reply>) => {
      signal?.removeEventListener('abort', cut);
      resolve(outcome);
    };
    const lost = () => settle({ ok: false, problem: unreachable() });
    request.open(operation.method, filledPath(operation.path, params));
    request.setRequestHeader('accept', 'application/json, application/problem+json');
    request.setRequestHeader('idempotency-key', idempotencyKey);
    request.upload.onprogress = ({ loaded, total }) => onShare?.(total > 0 ? loaded / total : 0);
    request.onerror = lost;
    request.onabort = lost;
    request.onload = () => settle(outcomeOf<Reply>(request));
    if (signal?.aborted) return lost();
    signal?.addEventListener('abort', cut);
    onShare?.(0);
    request.send(form);
  });
}

function outcomeOf<Reply>(request: XMLHttpRequest): Outcome<Reply> {
  const { status, responseText } = request;
  if (status >= 200 && status < 300) {
    try {
      return { ok: true, status, reply: JSON.parse(responseText) as Reply, version: request.getResponseHeader('etag') };
    } catch {
      return { ok: false, problem: unreachable() };
    }
  }
  const problem = problemOf(status, request.getResponseHeader('content-type'), responseText);
  return { ok: false, problem: { ...problem, retryAfterS: retryAfterOf(request.getResponseHeader('retry-after')) } };
}
