/*
 * npm run stillfield -- limits-load MANAGER-E-MAIL: enters the published limit lines and sets, each with its source and
 * how sure that is. A line that is there already gets a next revision only by a person, so a second run is refused.
 */

import { limitSets } from '@fixtures/demo/limitSets';
import { Conflict, Forbidden } from '@/errors';
import { LimitSet } from '@/models/limitSet';
import { unitOfWork } from '@/models/unitOfWork';
import { User } from '@/models/user';
import { findUser } from '@/services/users';
import { runCommand, Usage } from '../commandLine';
import { enterPublishedLimits } from '../publishedLimits';

export async function main(args: string[]): Promise<void> {
  const [email, ...rest] = args;
  if (!email || rest.length > 0) throw new Usage('limits-load MANAGER-E-MAIL');
  const sets = await unitOfWork(async () => {
    const { id } = await findUser(email);
    const user = await User.findByPk(id, { include: ['organisation'], rejectOnEmpty: true });
    if (user.role !== 'manager') throw new Forbidden(`${email} is not a manager.`);
    if ((await LimitSet.count()) > 0) throw new Conflict('This lab has limit sets already; nothing was changed.');
    const { organisation } = user as User & { organisation: { id: number; name: string } };
    const { publicId, name, role } = user;
    const of = { organisationId: organisation.id, organisationName: organisation.name };
    const via = { kind: 'session', sessionId: 0, assuranceLevel: 1 } as const;
    const actor = { userId: id, publicId, name, email: user.email, role, ...of, via };
    return enterPublishedLimits(actor, limitSets, new Date());
  });
  process.stderr.write(
    `${sets.size} limit sets entered. Lines said to be from memory: check them against the standard.\n`,
  );
}

if (require.main === module) void runCommand(main);
