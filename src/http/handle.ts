import type { z } from 'zod';
import type { Actor } from '@/auth/actor';
import { mayRole } from '@/auth/permissions';
import { env } from '@/config/env';
import { DomainError, Forbidden, Invalid, Unauthenticated, type Issue } from '@/errors';
import type { Operation } from '@/schemas/operation';
import { TokenRefused } from '@/services/apiTokens';
import { once, staged } from '@/services/idempotency';
import { actorOf, SignInRefused } from '@/services/sessions';
import { issuesOf, problemOf, problemResponse } from './problem';
import { withApiHeaders } from './securityHeaders';
import { securityLog } from './securityLog';

export interface Context<P, Q, B, F = undefined> {
  actor: Actor | null;
  params: P;
  query: Q;
  body: B;
  /** What `receive` made of an upload. */
  file: F;
  /** The version named in If-Match; set whenever the operation asks for it. */
  version: number;
  request: Request;
  address: string;
  agent: string;
  /** Headers to add to the reply, e.g. a cookie. */
  headers: Headers;
}

type Out<T> = T extends z.ZodType ? z.output<T> : undefined;
/** A file that came with a request, and the other fields of its form; they are the body. */
export interface Received {
  /** Hex, of the bytes that came: with the body it tells one upload from another under the same Idempotency-Key. */
  sha256: string;
  fields: Record<string, string>;
  /** Called when the request is over, whatever became of it. */
  close?: () => Promise<void>;
}
/**
 * A use-case that writes much: `stage` does so in small transactions that show nothing, `publish` shows it in one short
 * one, with the reply under its Idempotency-Key; `drop` undoes what was staged and not published.
 */
export interface InStages<C, S> {
  stage: (context: C) => Promise<S>;
  publish: (context: C, staged: S) => Promise<unknown>;
  drop: (staged: S) => Promise<void>;
}
type Extra = { params?: Promise<Record<string, string | string[] | undefined>> };
export type RouteHandler = ((request: Request, extra?: Extra) => Promise<Response>) & { operation: Operation };

const MAX_JSON_BYTES = 1024 * 1024;

/**
 * Turns a declared operation and the use-case it calls into a Next.js route handler. An upload is taken in by `receive`
 * before the work begins, since a stream cannot be read again when the unit is.
 */
export function handle<
  P extends z.ZodType,
  Q extends z.ZodType,
  B extends z.ZodType,
  R extends z.ZodType,
  F extends Received | undefined = undefined,
  S = undefined,
>(
  op: Operation<P, Q, B, R>,
  run:
    | ((context: Context<Out<P>, Out<Q>, Out<B>, F>) => Promise<unknown>)
    | InStages<Context<Out<P>, Out<Q>, Out<B>, F>, S>,
  receive?: (request: Request, actor: Actor | null) => Promise<F>,
): RouteHandler {
  const stages: InStages<Context<Out<P>, Out<Q>, Out<B>, F>, S> = typeof run === 'function' ? inOne(run) : run;
  const route = async (request: Request, extra?: Extra): Promise<Response> => {
    const address = request.headers.get('x-forwarded-for')?.split(',')[0]?.trim() || '127.0.0.1';
    let actor: Actor | null = null;
    let reached: Reached = 'input';
    let file = undefined as F;
    try {
      actor = await actorOf(request.headers, address);
      checkOrigin(request, op, actor);
      if (op.permission !== null) {
        // The service authorises too; this keeps a stranger from learning how a body is judged.
        if (!actor) throw new Unauthenticated();
        if (!mayRole(actor.role, op.permission)) throw new Forbidden();
      }
      file = (await receive?.(request, actor)) as F;
      const context: Context<Out<P>, Out<Q>, Out<B>, F> = {
        actor,
        file,
        ...(await readInput(op, request, extra, file)),
        request,
        address,
        agent: (request.headers.get('user-agent') ?? '').slice(0, 200),
        headers: new Headers({ 'cache-control': 'no-store' }),
      };
      const key = op.idempotent || (op.ifMatch && op.method === 'POST') ? readKey(request) : null;
      const steps = { prepare: () => stages.stage(context), drop: stages.drop };
      const work = async (prepared: S) => checkReply(op, await stages.publish(context, prepared));
      let reply: unknown;
      if (key && actor) {
        reached = 'keyed work';
        const done = await once(actor, key, op.id, asked(context), op.status, steps, work);
        if (done.repeated) context.headers.set('idempotency-replayed', 'true');
        reply = done.reply;
      } else {
        reached = 'work';
        reply = await staged(steps, work);
      }
      return withApiHeaders(respond(op, reply, context.params, context.headers));
    } catch (error) {
      return withApiHeaders(refuse(error, op, { reached, actor, address }));
    } finally {
      await file?.close?.().catch(() => undefined);
    }
  };
  return Object.assign(route, { operation: op as unknown as Operation });
}

/** A use-case that is done in one unit: there is nothing to stage and nothing to drop. */
function inOne<C, S>(run: (context: C) => Promise<unknown>): InStages<C, S> {
  return { stage: async () => undefined as S, publish: run, drop: async () => undefined };
}

/** What a repeat under the same Idempotency-Key has to ask again. */
function asked({ params, body, file }: { params: unknown; body: unknown; file?: Received }): unknown[] {
  return file ? [params, body, file.sha256] : [params, body];
}

/** The reply as declared. Under an Idempotency-Key this runs inside the unit, so a wrong reply undoes the work. */
function checkReply(op: Operation, reply: unknown): unknown {
  return reply instanceof Response || op.status === 204 || !op.reply ? reply : op.reply.parse(reply);
}

/** An ETag goes out only with the record the path names, or the one just created: its version is what If-Match wants. */
function respond(op: Operation, reply: unknown, params: unknown, headers: Headers): Response {
  if (reply instanceof Response) return reply;
  if (op.status === 204) return new Response(null, { status: 204, headers });
  headers.set('content-type', 'application/json');
  const { id, version } = (reply ?? {}) as { id?: unknown; version?: unknown };
  const named = typeof id === 'string' && (op.status === 201 || id === (params as { id?: string } | undefined)?.id);
  if (named && typeof version === 'number') headers.set('etag', `"${version}"`);
  return new Response(JSON.stringify(reply), { status: op.status, headers });
}

/** A write that a cookie authorises must come from our own pages; a bearer token needs no such proof. */
function checkOrigin(request: Request, op: Operation, actor: Actor | null): void {
  if (op.method === 'GET' || actor?.via.kind === 'token') return;
  const origin = request.headers.get('origin');
  if (origin === env().APP_ORIGIN) return;
  if (!actor && origin === null) return;
  throw new Forbidden('This request did not come from a Stillfield page.');
}

async function readInput<P extends z.ZodType, Q extends z.ZodType, B extends z.ZodType>(
  op: Operation<P, Q, B>,
  request: Request,
  extra?: Extra,
  file?: Received,
): Promise<{ params: Out<P>; query: Out<Q>; body: Out<B>; version: number }> {
  const issues: Issue[] = [];
  const check = <T extends z.ZodType>(schema: T | undefined, value: unknown, at: string): Out<T> => {
    if (!schema) return undefined as Out<T>;
    const result = schema.safeParse(value);
    if (result.success) return result.data as Out<T>;
    issues.push(...issuesOf(result.error).map((issue) => ({ ...issue, pointer: at + issue.pointer })));
    return undefined as Out<T>;
  };
  const params = check(op.params, (await extra?.params) ?? {}, '/path');
  const query = check(op.query, Object.fromEntries(new URL(request.url).searchParams), '/query');
  const body = op.body ? check(op.body, file ? file.fields : await readJson(request), '') : (undefined as Out<B>);
  if (issues.length) throw new Invalid(issues);
  return { params, query, body, version: op.ifMatch ? readVersion(request) : 0 };
}

class HttpRefusal extends DomainError {
  constructor(
    readonly kind: string,
    message: string,
  ) {
    super(message);
  }
}

async function readJson(request: Request): Promise<unknown> {
  const type = request.headers.get('content-type') ?? '';
  if (!/^application\/json\b/i.test(type)) throw new HttpRefusal('media-type', 'Send the body as application/json.');
  if (Number(request.headers.get('content-length') ?? 0) > MAX_JSON_BYTES) {
    throw new HttpRefusal('too-large', 'A JSON body takes at most 1 MB.');
  }
  const bytes = await readAtMost(request, MAX_JSON_BYTES);
  try {
    return JSON.parse(new TextDecoder().decode(bytes));
  } catch {
    throw new Invalid([{ pointer: '', message: 'is not JSON' }]);
  }
}

/** Counts while it reads, since a body sent in chunks states no length. The rest of a longer one is not read. */
async function readAtMost(request: Request, limit: number): Promise<Uint8Array> {
  const reader = request.body?.getReader();
  const chunks: Uint8Array[] = [];
  let length = 0;
  for (;;) {
    const { done, value } = (await reader?.read()) ?? { done: true, value: undefined };
    if (done) return Buffer.concat(chunks, length);
    length += value.byteLength;
    if (length > limit) {
      await reader?.cancel().catch(() => undefined);
      throw new HttpRefusal('too-large', 'A JSON body takes at most 1 MB.');
    }
    chunks.push(value);
  }
}

function readVersion(request: Request): number {
  const match = /^"?(\d{1,9})"?$/.exec(request.headers.get('if-match') ?? '');
  if (!match) {
    throw new HttpRefusal(
      'version-needed',
      'Name in If-Match the version of the record as your last read showed it, such as "3".',
    );
  }
  return Number(match[1]);
}

function readKey(request: Request): string | null {
  const key = request.headers.get('idempotency-key');
  if (key === null) return null;
  if (!/^[\x21-\x7e]{8,80}$/.test(key)) {
    throw new Invalid([{ pointer: '/header/idempotency-key', message: 'takes 8 to 80 visible ASCII characters' }]);
  }
  return key;
}

/** Of an error that stands for a database that does not answer; `uncertain` when it went during a commit. */
interface Gone {
  digest?: string;
  uncertain?: boolean;
}

const RETRY_AFTER_S = 2;

/** How far a request came: a failure after the work began may have come after its commit. */
type Reached = 'input' | 'work' | 'keyed work';

/** What became of a request that broke, as far as it is known, and whether the same may be sent again. */
function outcomeOf(op: Operation, reached: Reached, gone?: Gone): { detail: string; repeatable: boolean } {
  if (op.method === 'GET') return { detail: 'This could not be read.', repeatable: true };
  if (reached === 'input') return { detail: 'Nothing was changed.', repeatable: true };
  // Under a key the whole of the work is one unit, and it did not come to its commit.
  if (reached === 'keyed work' && gone?.uncertain === false)
    return { detail: 'Nothing was changed.', repeatable: true };
  if (op.repeatable) return { detail: 'This could not be finished.', repeatable: true };
  const look = 'It is not certain that this was done. Look before you repeat it';
  if (reached === 'work') return { detail: `${look}.`, repeatable: false };
  return { detail: `${look}; a repeat with the same Idempotency-Key is done once.`, repeatable: true };
}

interface Broken {
  reached: Reached;
  actor: Actor | null;
  address: string;
}

function refuse(error: unknown, op: Operation, { reached, actor, address }: Broken): Response {
  if (error instanceof DomainError) {
    // Why a sign-in was refused is in the security log already.
    if (error instanceof SignInRefused) return problemOf(error);
    if (error.kind === 'unauthenticated' || error.kind === 'forbidden' || error.kind === 'throttled') {
      const refused = error instanceof TokenRefused ? 'token-refused' : 'denied';
      const event = error.kind === 'throttled' ? 'throttled' : refused;
      securityLog({ event, userId: actor?.publicId ?? null, operation: op.id, address, detail: error.kind });
    }
    return problemOf(error);
  }
  const gone = (error ?? {}) as Gone;
  if (gone.digest === 'database-gone') {
    securityLog({ event: 'error', operation: op.id, address, status: 503, detail: 'DatabaseGone' });
    const { detail, repeatable } = outcomeOf(op, reached, gone);
    const again = repeatable && !detail.includes('repeat') ? ' Try again in a few seconds.' : '';
    const retry = { 'retry-after': String(RETRY_AFTER_S) };
    return problemResponse('unavailable', detail + again, { ...(repeatable && { repeatable }) }, retry);
  }
  const detail = error instanceof Error ? `${error.name}: ${error.message}`.slice(0, 400) : 'unknown';
  securityLog({ event: 'error', userId: actor?.publicId ?? null, operation: op.id, address, status: 500, detail });
  if (process.env.STILLFIELD_TRACE) console.error(error);
  return problemResponse('internal', `${outcomeOf(op, reached).detail} The lab’s log holds the cause.`);
}
