import { literal } from 'sequelize';
import { authorise, type Actor } from '@/auth/actor';
import { hashPassword, passwordIssues, verifyPassword } from '@/auth/password';
import { Conflict, Invalid } from '@/errors';
import { currentTransaction, unitOfWork } from '@/models/unitOfWork';
import { User } from '@/models/user';
import { recordChange } from './audit';
import { endLinks } from './oneTimeLinks';
import { admitAttempt, forgetFailures, forgiveAttempt, settleAttempt } from './signInAttempts';
import { endSessionsOf } from './users';

/**
 * Changes one's own password. The old one is asked for, and a wrong one counts like a failed sign-in; the other sessions
 * end, and links that would set another password with them.
 * @throws {Invalid} at `/current` or `/password` @throws {Throttled}
 */
export async function changeOwnPassword(
  actor: Actor | null,
  { current, password }: { current: string; password: string },
  address: string,
): Promise<void> {
  authorise(actor, 'password.change');
  const attempt = await admitAttempt(actor.email, address, new Date());
  const { passwordHash: stored } = await unitOfWork(() => User.findByPk(actor.userId, { rejectOnEmpty: true }));
  const { ok } = await verifyPassword(current, stored).catch(async (error: unknown) => {
    await forgiveAttempt(attempt);
    throw error;
  });
  if (!ok) throw new Invalid([{ pointer: '/current', message: 'is not the one you have now' }]);
  await unitOfWork(() => settleAttempt(attempt, new Date()));
  const issues = passwordIssues(password, actor.email);
  if (current.normalize('NFKC') === password.normalize('NFKC')) {
    issues.push({ pointer: '/password', message: 'is the one you have now' });
  }
  if (issues.length) throw new Invalid(issues);
  const passwordHash = await hashPassword(password);
  await unitOfWork(async () => {
    const now = new Date();
    const user = await User.findByPk(actor.userId, { lock: currentTransaction().LOCK.UPDATE, rejectOnEmpty: true });
    if (user.passwordHash !== stored) throw new Conflict('Your password was changed meanwhile. Sign in again first.');
    await User.update({ passwordHash, version: literal('version + 1') }, { where: { id: user.id } });
    const kept = actor.via.kind === 'session' ? actor.via.sessionId : undefined;
    const sessionsEnded = await endSessionsOf(user.id, now, kept);
    await endLinks(user.id, now);
    await forgetFailures(user.email);
    recordChange(actor, {
      scope: 'lab',
      action: 'own password changed',
      subjectType: 'user',
      subjectId: user.publicId,
      before: null,
      after: { sessionsEnded },
    });
  });
}
