import type { Actor } from '@/auth/actor';
import { Forbidden } from '@/errors';
import type { Organisation } from '@/models/organisation';
import { User } from '@/models/user';
import { findUser } from '@/services/users';

/** The manager on whose behalf a command enters records; call inside a unit of work. @throws {Forbidden} */
export async function managerActor(email: string): Promise<Actor> {
  const { id } = await findUser(email);
  const user = (await User.findByPk(id, { include: ['organisation'], rejectOnEmpty: true })) as User & {
    organisation: Organisation;
  };
  if (user.role !== 'manager' || user.disabledAt !== null) throw new Forbidden(`${email} is not a manager.`);
  return {
    userId: id,
    publicId: user.publicId,
    name: user.name,
    email: user.email,
    role: user.role,
    organisationId: user.organisation.id,
    organisationName: user.organisation.name,
    via: { kind: 'session', sessionId: 0, assuranceLevel: 1 },
  };
}
