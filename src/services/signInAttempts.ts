import { literal, Op } from 'sequelize';
import {
  FAMILIAR_MS,
  secondsBlocked,
  throttleKey,
  throttleKeys,
  type ThrottleKind,
  withFailure,
} from '@/auth/throttle';
import { Throttled } from '@/errors';
import { Throttle } from '@/models/throttle';
import { currentTransaction, unitOfWork } from '@/models/unitOfWork';

/** A try that was let in and is counted as a failure until `forgiveAttempt` takes that back. */
export interface Attempt {
  email: string;
  address: string;
  counted: { kind: ThrottleKind; key: string; blockedUntil: Date | null }[];
}

/**
 * Lets one try in and counts it as failed before the password is looked at: tries that arrive together cannot all slip
 * through the gap between looking and counting. A try that is turned away is not counted.
 * @throws {Throttled} with the seconds to wait
 */
export async function admitAttempt(email: string, address: string, now: Date): Promise<Attempt> {
  return unitOfWork(async () => {
    const seen = await Throttle.findByPk(throttleKey('familiar', email, address));
    const familiar = seen !== null && now.getTime() - seen.lastFailureAt.getTime() < FAMILIAR_MS;
    const counted = await countAttempt(throttleKeys(email, address, familiar), now, 'try');
    return { email, address, counted };
  });
}

/**
 * Counts one thing that is limited against each of its keys, unless one of them makes it wait; that is not counted.
 * @param noun what is told to wait
 * @throws {Throttled} with the seconds to wait
 */
export async function countAttempt(
  limits: ReturnType<typeof throttleKeys>,
  now: Date,
  noun: 'try' | 'request',
): Promise<Attempt['counted']> {
  return unitOfWork(async () => {
    const keys = [...limits].sort((a, b) => (a.key < b.key ? -1 : 1));
    // Locks each row, there or not, in the same order as everybody else does.
    await Throttle.bulkCreate(
      keys.map(({ key }) => ({ keyHash: key, failures: 0, lastFailureAt: now })),
      { updateOnDuplicate: ['keyHash'] },
    );
    const rows = await Throttle.findAll({
      where: { keyHash: keys.map(({ key }) => key) },
      lock: currentTransaction().LOCK.UPDATE,
    });
    const waitS = Math.max(...rows.map((row) => secondsBlocked(row, now)));
    if (waitS > 0) throw new Throttled(waitS, `The next ${noun} is let in after ${inWords(waitS)}.`);
    const counted: Attempt['counted'] = [];
    for (const { kind, key, rule } of keys) {
      const state = withFailure(
        rows.find(({ keyHash }) => keyHash === key)!,
        rule,
        now,
      );
      await Throttle.update(state, { where: { keyHash: key } });
      counted.push({ kind, key, blockedUntil: state.blockedUntil });
    }
    return counted;
  });
}

/** Takes the count of a try back, with the wait it caused; for one that ended in no answer at all. */
export async function forgiveAttempt(attempt: Attempt): Promise<void> {
  await unitOfWork(async () => {
    for (const { key, blockedUntil } of attempt.counted) {
      await Throttle.update({ failures: literal('GREATEST(failures, 1) - 1') }, { where: { keyHash: key } });
      if (blockedUntil) await Throttle.update({ blockedUntil: null }, { where: { keyHash: key, blockedUntil } });
    }
  });
}

/** After a right password: nothing is held against this account at this address, and the address is familiar now. */
export async function settleAttempt(attempt: Attempt, now: Date): Promise<void> {
  await unitOfWork(async () => {
    await forgiveAttempt(attempt);
    await Throttle.destroy({ where: { keyHash: throttleKey('pair', attempt.email, attempt.address) } });
    const familiar = throttleKey('familiar', attempt.email, attempt.address);
    await Throttle.upsert({ keyHash: familiar, failures: 0, lastFailureAt: now, blockedUntil: null });
  });
}

/** Forgets what strangers did to an account, when it has been given a new password. */
export async function forgetFailures(email: string): Promise<void> {
  await unitOfWork(() => Throttle.destroy({ where: { keyHash: throttleKey('account', email) } }));
}

/** Removes rows that say nothing any more, a few at a time; found first, so that no lock is held while looking. */
export async function purgeThrottles(now: Date): Promise<number> {
  return unitOfWork(async () => {
    const old = await Throttle.findAll({
      attributes: ['keyHash'],
      where: { lastFailureAt: { [Op.lt]: new Date(now.getTime() - FAMILIAR_MS) } },
      limit: 500,
    });
    return Throttle.destroy({ where: { keyHash: old.map(({ keyHash }) => keyHash) } });
  });
}

function inWords(seconds: number): string {
  const whole = Math.ceil(seconds);
  if (whole < 90) return whole === 1 ? '1 second' : `${whole} seconds`;
  return `${Math.ceil(whole / 60)} minutes`;
}
