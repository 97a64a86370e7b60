/** What the API answers when it does not do what was asked: application/problem+json (RFC 9457). */

export interface FieldIssue {
  /** JSON pointer into the body that was sent (RFC 6901), `/traces/0/unit`. */
  pointer: string;
  message: string;
}

export interface Problem {
  type: string;
  title: string;
  /** HTTP status; 0 when no answer came. */
  status: number;
  detail: string | null;
  errors: FieldIssue[];
  /** Of a file that was refused: where it stopped, what stood there, what was expected. */
  refusal: { line: number | null; found: string; expected: string } | null;
  /** The server says that the same may be sent again as it is. */
  repeatable?: boolean;
  /** How long the server asks to be left alone. */
  retryAfterS?: number | null;
  /** No end yet: it is sent again by itself. */
  waiting?: boolean;
}

/** Error by field: keys as in the body, nested ones with slashes, `traces/0/unit`; the first message of each. */
export type FieldErrors = Readonly<Record<string, string>>;

export function fieldErrorsOf(problem: Problem | null): FieldErrors {
  const found: Record<string, string> = {};
  for (const { pointer, message } of problem?.errors ?? []) found[fieldOf(pointer)] ??= message;
  return found;
}

/** Issues that belong to no field of the body, to be said above the form. */
export function wholeFormIssues(problem: Problem | null): string[] {
  return (problem?.errors ?? []).filter(({ pointer }) => fieldOf(pointer) === '').map(({ message }) => message);
}

/** `/a~1b/0` and its URI form `#/a~1b/0` are both `a/b/0`. */
function fieldOf(pointer: string): string {
  const bare = pointer.startsWith('#') ? decoded(pointer.slice(1)) : pointer;
  return bare.replace(/^\//, '').replaceAll('~1', '/').replaceAll('~0', '~');
}

function decoded(text: string): string {
  try {
    return decodeURIComponent(text);
  } catch {
    return text;
  }
}

/** No answer came: what was typed is kept by the form, and a repeat with the same key cannot be done twice. */
export const UNREACHABLE: Problem = {
  type: 'about:blank',
  title: 'The lab’s server did not answer.',
  status: 0,
  detail:
    'What you entered is still here. Check the network and press again; it is done once, however often you press.',
  errors: [],
  refusal: null,
};

/** The same where the browser knows that it is the device itself that is cut off. */
export const OFFLINE: Problem = {
  ...UNREACHABLE,
  title: 'This device has no network.',
  detail: 'What you entered is still here. Press again when the network is back; it is done once, however often.',
};

/** What is said while something is sent again by itself. */
export function waitingFor(problem: Problem): Problem {
  const title =
    problem.status === 503
      ? 'The lab’s database does not answer just now.'
      : 'The lab’s server does not answer just now.';
  return {
    ...problem,
    title: problem === OFFLINE ? OFFLINE.title : title,
    detail: 'What you entered is still here and is sent again by itself; it is done once.',
    waiting: true,
  };
}

const PLAIN: Record<number, [title: string, detail: string]> = {
  401: ['You are signed out.', 'What you entered is still here. Sign in again in another tab, then press again.'],
  403: ['Your role does not allow this.', 'Ask a manager of the lab.'],
  404: ['This is not here any more.', 'Reload the page to see what is.'],
  409: ['Somebody else changed this first.', 'Reload the page to see the change, then make yours again.'],
  412: ['Somebody else changed this first.', 'Reload the page to see the change, then make yours again.'],
  413: ['This is larger than the server takes.', 'Send it in smaller parts.'],
  429: ['Too many attempts.', 'Wait a minute, then press again.'],
  503: ['The lab’s database does not answer.', 'What you entered is still here. Wait a minute, then press again.'],
};

/** Seconds of a Retry-After header; null for none, and for a date, which our server does not send. */
export function retryAfterOf(header: string | null): number | null {
  return header !== null && /^\d{1,5}$/.test(header) ? Number(header) : null;
}

/** Reads an answer that is not 2xx. One that is no problem document still becomes a sentence with a next step. */
export function problemOf(status: number, contentType: string | null, text: string): Problem {
  const [title, detail] = PLAIN[status] ?? [
    status >= 500 ? 'The server could not do this.' : 'The server refused this.',
    `What you entered is still here. Press again; if it stays so, give the lab this number: ${status}.`,
  ];
  const plain: Problem = { type: 'about:blank', title, status, detail, errors: [], refusal: null };
  if (!contentType?.includes('json')) return plain;
  const sent = parsed(text);
  if (typeof sent !== 'object' || sent === null) return plain;
  const {
    type,
    title: said,
    detail: more,
    errors,
    line,
    found,
    expected,
    repeatable,
  } = sent as Record<string, unknown>;
  return {
    type: typeof type === 'string' ? type : plain.type,
    title: typeof said === 'string' && said !== '' ? said : title,
    status,
    detail: typeof more === 'string' ? more : typeof said === 'string' ? null : detail,
    errors: Array.isArray(errors) ? errors.filter(isIssue) : [],
    refusal:
      typeof found === 'string' && typeof expected === 'string'
        ? { line: typeof line === 'number' ? line : null, found, expected }
        : null,
    ...(repeatable === true && { repeatable }),
  };
}

function isIssue(value: unknown): value is FieldIssue {
  if (typeof value !== 'object' || value === null) return false;
  const { pointer, message } = value as Record<string, unknown>;
  return typeof pointer === 'string' && typeof message === 'string';
}

function parsed(text: string): unknown {
  try {
    return JSON.parse(text);
  } catch {
    return null;
  }
}
