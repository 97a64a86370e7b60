import { literal, Op, UniqueConstraintError, type WhereOptions } from 'sequelize';
import { type Actor, authoriseCommander, type Commander, personOf } from '@/auth/actor';
import { hashPassword, passwordIssues } from '@/auth/password';
import type { Role } from '@/auth/permissions';
import { Conflict, Invalid, type Issue, NotFound } from '@/errors';
import { Organisation } from '@/models/organisation';
import { newPublicId } from '@/models/publicId';
import { Session } from '@/models/session';
import { currentTransaction, unitOfWork } from '@/models/unitOfWork';
import { User } from '@/models/user';
import { recordChange } from './audit';
import { endLinks } from './oneTimeLinks';
import { forgetFailures } from './signInAttempts';

export interface NewUser {
  /** Public id. */
  organisationId: string;
  role: Role;
  name: string;
  email: string;
  /** Null: the person cannot sign in before a password is set. */
  password: string | null;
}

/** A person by public id or e-mail; call inside a unit of work. @throws {NotFound} */
export async function findUser(publicIdOrEmail: string): Promise<User> {
  const ref = publicIdOrEmail.trim().toLowerCase();
  const where: WhereOptions = ref.includes('@') ? { email: ref } : { publicId: ref };
  const user = await User.findOne({ where });
  if (!user || (ref.includes('@') && user.email !== ref)) throw new NotFound('person');
  return user;
}

/** The lab's roles see every organisation's records, so they are for the lab's own people only. */
export function roleIssues(role: Role, organisation: Organisation): Issue[] {
  if ((role === 'designer') === (organisation.kind === 'client')) return [];
  const message = organisation.kind === 'client' ? 'of a client is designer' : 'of the lab is manager or technician';
  return [{ pointer: '/role', message }];
}

function entryIssues(entry: NewUser, organisation: Organisation | null): Issue[] {
  const issues: Issue[] = [];
  const add = (pointer: string, message: string) => issues.push({ pointer, message });
  if (entry.name.length < 1 || entry.name.length > 120) add('/name', 'takes 1 to 120 characters');
  if (!/^[^\s@]+@[^\s@]+\.[^\s@]+$/.test(entry.email) || entry.email.length > 254) {
    add('/email', 'is not an e-mail address');
  }
  if (!organisation) add('/organisationId', 'is not an organisation of this lab');
  else issues.push(...roleIssues(entry.role, organisation));
  if (entry.password !== null) issues.push(...passwordIssues(entry.password, entry.email));
  return issues;
}

/**
 * Enters a person; managers only, at a browser or on the server. E-mail addresses are kept in lower case and belong to
 * one person only.
 * @param at when it happened, for records that are entered later
 */
export async function createUser(by: Commander | null, entry: NewUser, at = new Date()): Promise<{ publicId: string }> {
  authoriseCommander(by, 'user.create');
  const user = { ...entry, name: entry.name.trim(), email: entry.email.trim().toLowerCase() };
  const find = () => Organisation.findOne({ where: { publicId: user.organisationId } });
  const issues = entryIssues(user, await unitOfWork(find));
  if (issues.length) throw new Invalid(issues);
  // Hashing takes a third of a second: never inside a transaction.
  const passwordHash = user.password === null ? null : await hashPassword(user.password);
  return unitOfWork(async () => {
    const { publicId } = await writeUser(personOf(by), user, (await find())!, passwordHash, at);
    return { publicId };
  });
}

/**
 * Writes a person whom the caller may enter, in its unit of work; with a password it is the caller who hashed it.
 * @throws {Invalid} with every wrong entry
 */
export async function writeUser(
  by: Actor | null,
  entry: NewUser,
  organisation: Organisation,
  passwordHash: string | null,
  at: Date,
): Promise<User> {
  const user = { ...entry, name: entry.name.trim(), email: entry.email.trim().toLowerCase() };
  const issues = entryIssues(user, organisation);
  if (issues.length) throw new Invalid(issues);
  const row = await User.create({
    publicId: newPublicId(),
    organisationId: organisation.id,
    role: user.role,
    name: user.name,
    email: user.email,
    passwordHash,
    createdAt: at,
  }).catch((error: unknown) => {
    if (!(error instanceof UniqueConstraintError)) throw error;
    throw new Invalid([{ pointer: '/email', message: 'belongs to somebody already' }]);
  });
  recordChange(by, {
    scope: 'lab',
    action: 'person entered',
    subjectType: 'user',
    subjectId: row.publicId,
    before: null,
    after: { role: row.role, organisation: organisation.publicId },
    at,
  });
  return row;
}

/** Gives a person a new password and ends all their sessions; what strangers failed at their account is forgotten. */
export async function setPassword(by: Commander | null, publicIdOrEmail: string, password: string): Promise<void> {
  authoriseCommander(by, 'user.change');
  const { id, email, publicId } = await unitOfWork(() => findUser(publicIdOrEmail));
  const issues = passwordIssues(password, email);
  if (issues.length) throw new Invalid(issues);
  const passwordHash = await hashPassword(password);
  await unitOfWork(async () => {
    await User.update({ passwordHash, version: literal('version + 1') }, { where: { id } });
    const ended = await endSessionsOf(id, new Date());
    await endLinks(id, new Date());
    await forgetFailures(email);
    recordChange(personOf(by), {
      scope: 'lab',
      action: 'password set',
      subjectType: 'user',
      subjectId: publicId,
      before: null,
      after: { sessionsEnded: ended },
    });
  });
}

/** Shuts a person out at once: their sessions and links end and their tokens open nothing. The last manager cannot be. */
export async function disableUser(by: Commander | null, publicIdOrEmail: string): Promise<void> {
  authoriseCommander(by, 'user.change');
  await unitOfWork(async () => {
    const user = await findUser(publicIdOrEmail);
    if (user.disabledAt === null) await shutOut(personOf(by), user, null);
  });
}

/** Disables a person whom the caller may change, in its unit of work. @throws {Conflict} for the last manager */
export async function shutOut(by: Actor | null, user: User, reason: string | null): Promise<void> {
  await keepAManager(user);
  const disabledAt = new Date();
  const change = { disabledAt, disabledReason: reason, version: literal('version + 1') };
  const [disabled] = await User.update(change, { where: { id: user.id, disabledAt: null } });
  if (disabled === 0) return;
  const ended = await endSessionsOf(user.id, disabledAt);
  await endLinks(user.id, disabledAt);
  recordChange(by, {
    scope: 'lab',
    action: 'person disabled',
    subjectType: 'user',
    subjectId: user.publicId,
    before: { disabled: false },
    after: { disabled: true, sessionsEnded: ended, ...(reason !== null && { reason }) },
  });
}

/**
 * That the lab keeps a manager who can sign in when this one goes. Managers are locked in one order, so that two cannot
 * remove each other at the same moment.
 * @throws {Conflict}
 */
export async function keepAManager(user: User): Promise<void> {
  const managers = await User.findAll({
    where: { role: 'manager', disabledAt: null },
    order: [['id', 'ASC']],
    lock: currentTransaction().LOCK.UPDATE,
  });
  const leaving = managers.find(({ id }) => id === user.id);
  const left = managers.filter(({ id }) => id !== user.id);
  if (leaving && !left.some(({ passwordHash }) => passwordHash !== null || leaving.passwordHash === null)) {
    throw new Conflict('This is the lab’s only manager. Enter another one first.');
  }
}

/** Ends a person's sessions at once, except one they keep; call inside a unit of work. @returns how many */
export async function endSessionsOf(userId: number, now: Date, exceptId?: number): Promise<number> {
  const where = { userId, endedAt: null, ...(exceptId !== undefined && { id: { [Op.ne]: exceptId } }) };
  const [ended] = await Session.update({ endedAt: now }, { where });
  return ended;
}
