import { Op } from 'sequelize';
import type { z } from 'zod';
import { authorise, type Actor } from '@/auth/actor';
import { hashPassword, verifyPassword } from '@/auth/password';
import {
  ABSOLUTE_MS,
  IDLE_MS,
  newSessionToken,
  readSessionCookie,
  sessionCookie,
  sessionTokenHash,
} from '@/auth/session';
import { NotFound, Unauthenticated } from '@/errors';
import { Organisation } from '@/models/organisation';
import { newPublicId } from '@/models/publicId';
import { Session } from '@/models/session';
import { currentTransaction, unitOfWork } from '@/models/unitOfWork';
import { User } from '@/models/user';
import type { meView, sessionView } from '@/schemas/session';
import { bearerToken, ownerOfToken } from './apiTokens';
import { olderThan, pageFrom, type Page, type PageRequest } from './paging';
import { admitAttempt, forgiveAttempt, purgeThrottles, settleAttempt } from './signInAttempts';

/** When and from where a session was last used is written at most this often. */
const TOUCH_MS = 60_000;
const PURGE_MS = 3600_000;
let purgeDueAt = 0;

/** The one answer to a wrong password, an unknown e-mail and a disabled person; what it was is for the security log. */
export class SignInRefused extends Unauthenticated {
  constructor(
    readonly userId: string | null,
    readonly reason: 'unknown' | 'disabled' | 'password',
  ) {
    super('This e-mail and password do not go together.');
  }
}

type WithOrganisation = User & { organisation: Organisation };

/** Who a person is to the services. */
export function actorFrom(user: WithOrganisation, via: Actor['via']): Actor {
  return {
    userId: user.id,
    publicId: user.publicId,
    name: user.name,
    email: user.email,
    role: user.role,
    organisationId: user.organisationId,
    organisationName: user.organisation.name,
    via,
  };
}

/** What a session has to be to stand at `now`: not ended, not past its last day, not idle too long. */
function standing(now: Date) {
  return {
    endedAt: null,
    expiresAt: { [Op.gt]: now },
    lastSeenAt: { [Op.gt]: new Date(now.getTime() - IDLE_MS) },
  };
}

/**
 * Who sends a request; null for nobody. With a bearer token only the token counts, whatever cookies come along.
 * Role, organisation and the disabled flag are read anew each time. The session notes when and from which address it
 * was last used, at most once a minute.
 * @throws {Unauthenticated} for a bearer token that does not hold
 */
export async function actorOf(headers: Headers, address: string): Promise<Actor | null> {
  const bearer = bearerToken(headers.get('authorization'));
  if (bearer !== null) {
    const { user, scopes } = await ownerOfToken(bearer);
    return actorFrom(user as WithOrganisation, { kind: 'token', scopes });
  }
  const token = await readSessionCookie(headers.get('cookie'));
  return token === null ? null : actorOfSession(token, address);
}

async function actorOfSession(token: string, address: string): Promise<Actor | null> {
  const now = new Date();
  return unitOfWork(async () => {
    const session = await Session.findOne({
      where: { tokenHash: sessionTokenHash(token), ...standing(now) },
      include: [{ association: 'user', include: ['organisation'] }],
    });
    const user = (session as (Session & { user: WithOrganisation }) | null)?.user;
    if (!session || !user || user.disabledAt) return null;
    const touchBefore = new Date(now.getTime() - TOUCH_MS);
    if (session.lastSeenAt <= touchBefore) {
      const seen = { lastSeenAt: now, address: address.slice(0, 45) };
      await Session.update(seen, { where: { id: session.id, lastSeenAt: { [Op.lte]: touchBefore } } });
    }
    return actorFrom(user, { kind: 'session', sessionId: session.id, assuranceLevel: session.assuranceLevel });
  });
}

/**
 * Opens a session for an e-mail and its password. Unknown e-mail, wrong password and disabled person give the same
 * answer after the same work. `cookie` is a Set-Cookie value.
 * @throws {SignInRefused} @throws {Throttled} after too many failures, or when too many are signing in
 */
export async function signIn(
  { email, password }: { email: string; password: string },
  { address, agent }: { address: string; agent: string },
): Promise<{ actor: Actor; cookie: string }> {
  const typed = email.trim().toLowerCase();
  const attempt = await admitAttempt(typed, address, new Date());
  const found = await unitOfWork(() => User.findOne({ where: { email: typed } }));
  // The column's collation takes é for e; whoever types another address is not this person.
  const user = found?.email === typed ? found : null;
  const stored = user && !user.disabledAt ? user.passwordHash : null;
  const { ok, needsRehash } = await verifyPassword(password, stored).catch(async (error: unknown) => {
    await forgiveAttempt(attempt);
    throw error;
  });
  if (!user || !ok) {
    throw new SignInRefused(user?.publicId ?? null, !user ? 'unknown' : user.disabledAt ? 'disabled' : 'password');
  }
  const rehashed = needsRehash ? await hashPassword(password).catch(() => null) : null;
  const { actor, token } = await unitOfWork(async () => {
    const now = new Date();
    // Locked, so that a new password or a disabling that commits meanwhile is not signed in past.
    const current = (await User.findByPk(user.id, {
      include: ['organisation'],
      lock: { level: currentTransaction().LOCK.UPDATE, of: User },
      rejectOnEmpty: true,
    })) as WithOrganisation;
    if (current.disabledAt || current.passwordHash !== stored) throw new SignInRefused(user.publicId, 'password');
    if (rehashed) await User.update({ passwordHash: rehashed }, { where: { id: user.id } });
    await settleAttempt(attempt, now);
    return openSession(current, { address, agent }, now);
  });
  if (Date.now() >= purgeDueAt) {
    purgeDueAt = Date.now() + PURGE_MS;
    await purgeThrottles(new Date());
  }
  return { actor, cookie: await sessionCookie(token) };
}

/** Opens a session for a person whom the caller has identified and locked; call inside a unit of work. */
export async function openSession(
  user: WithOrganisation,
  { address, agent }: { address: string; agent: string },
  now: Date,
): Promise<{ actor: Actor; token: string }> {
  const token = newSessionToken();
  const session = await Session.create({
    publicId: newPublicId(),
    tokenHash: sessionTokenHash(token),
    userId: user.id,
    authenticatedAt: now,
    lastSeenAt: now,
    expiresAt: new Date(now.getTime() + ABSOLUTE_MS),
    address: address.slice(0, 45),
    agent: agent.slice(0, 200),
  });
  await User.update({ lastSignInAt: now }, { where: { id: user.id }, silent: true });
  const { id: sessionId, assuranceLevel } = session;
  return { actor: actorFrom(user, { kind: 'session', sessionId, assuranceLevel }), token };
}

/** The signed-in person as the API tells it. */
export async function readMe(actor: Actor | null): Promise<z.infer<typeof meView>> {
  authorise(actor, 'session.list');
  const organisation = await unitOfWork(() => Organisation.findByPk(actor.organisationId, { rejectOnEmpty: true }));
  return {
    id: actor.publicId,
    name: actor.name,
    email: actor.email,
    role: actor.role,
    organisation: { id: organisation.publicId, name: organisation.name },
  };
}

/** Ends the session a request came with; without one there is nothing to do. */
export async function signOut(actor: Actor | null): Promise<void> {
  if (!actor) return;
  authorise(actor, 'session.end');
  const { via } = actor;
  if (via.kind !== 'session') return;
  await unitOfWork(() => Session.update({ endedAt: new Date() }, { where: { id: via.sessionId, endedAt: null } }));
}

/** Where this person is signed in, newest first. */
export async function listSessions(actor: Actor | null, page: PageRequest): Promise<Page<z.infer<typeof sessionView>>> {
  authorise(actor, 'session.list');
  const currentId = actor.via.kind === 'session' ? actor.via.sessionId : null;
  return unitOfWork(async () => {
    const rows = await Session.findAll({
      where: { userId: actor.userId, ...standing(new Date()), ...olderThan(page) },
      order: [['id', 'DESC']],
      limit: page.limit + 1,
    });
    return pageFrom(rows, page, (row) => ({
      id: row.publicId,
      current: row.id === currentId,
      address: row.address,
      agent: row.agent,
      startedAt: row.authenticatedAt.toISOString(),
      lastSeenAt: row.lastSeenAt.toISOString(),
      expiresAt: row.expiresAt.toISOString(),
    }));
  });
}

/** Ends one of this person's sessions at once. @throws {NotFound} also for somebody else's, and for one that is over */
export async function endSession(actor: Actor | null, publicId: string): Promise<void> {
  authorise(actor, 'session.end');
  await unitOfWork(async () => {
    const now = new Date();
    const where = { publicId, userId: actor.userId, ...standing(now) };
    const [ended] = await Session.update({ endedAt: now }, { where });
    if (ended === 0) throw new NotFound('session');
  });
}
