import { type DomainError, Invalid, StaleVersion, Throttled, Unreadable, type Issue } from '@/errors';

const STATUS: Record<string, { status: number; title: string }> = {
  unauthenticated: { status: 401, title: 'Not signed in' },
  forbidden: { status: 403, title: 'Not allowed' },
  'not-found': { status: 404, title: 'Not found' },
  invalid: { status: 400, title: 'Some entries need another look' },
  unreadable: { status: 422, title: 'The file could not be read as asked' },
  conflict: { status: 409, title: 'Conflict' },
  'stale-version': { status: 412, title: 'Changed by somebody else' },
  'version-needed': { status: 428, title: 'If-Match is needed' },
  'too-large': { status: 413, title: 'Too large' },
  'media-type': { status: 415, title: 'Unexpected content type' },
  throttled: { status: 429, title: 'Too many tries' },
  unavailable: { status: 503, title: 'The database does not answer' },
  internal: { status: 500, title: 'Something broke' },
};

export interface Problem {
  type: string;
  title: string;
  status: number;
  detail: string;
  errors?: Issue[];
  line?: number | null;
  found?: string;
  expected?: string;
  version?: number;
  /** The same may be sent again as it is: nothing was changed, or a repeat is done once. */
  repeatable?: boolean;
}

/** An RFC 9457 reply. `kind` is the last part of its type, a stable word for programs. */
export function problemResponse(kind: string, detail: string, more: Partial<Problem> = {}, headers: HeadersInit = {}) {
  const known = STATUS[kind] ?? STATUS.internal!;
  const problem: Problem = { type: `/problems/${kind}`, title: known.title, status: known.status, detail, ...more };
  return new Response(JSON.stringify(problem), {
    status: known.status,
    headers: { 'content-type': 'application/problem+json', 'cache-control': 'no-store', ...headers },
  });
}

/** Every zod issue as a JSON pointer (RFC 6901) with its message. */
export function issuesOf(error: {
  issues: { path: PropertyKey[]; message: string; keys?: string[]; code?: string }[];
}): Issue[] {
  return error.issues.flatMap((issue) => {
    const at = issue.path.map((part) => `/${String(part).replace(/~/g, '~0').replace(/\//g, '~1')}`).join('');
    if (issue.code === 'unrecognized_keys') {
      return (issue.keys ?? []).map((key) => ({ pointer: `${at}/${key}`, message: 'is not known here' }));
    }
    return [{ pointer: at, message: issue.message }];
  });
}

export function problemOf(error: DomainError): Response {
  if (error instanceof Invalid) return problemResponse('invalid', error.message, { errors: error.issues });
  if (error instanceof StaleVersion) return problemResponse('stale-version', error.message, { version: error.current });
  if (error instanceof Unreadable) {
    const { line, found, expected } = error;
    return problemResponse('unreadable', error.message, { line, found, expected });
  }
  if (error instanceof Throttled) {
    return problemResponse('throttled', error.message, {}, { 'retry-after': String(Math.ceil(error.retryAfterS)) });
  }
  const headers: HeadersInit =
    error.kind === 'unauthenticated' ? { 'www-authenticate': 'Bearer realm="stillfield"' } : {};
  return problemResponse(error.kind, error.message, {}, headers);
}
