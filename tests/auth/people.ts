import { type Actor, SERVER } from '@/auth/actor';
import { hashPassword } from '@/auth/password';
import type { Role } from '@/auth/permissions';
import { Organisation } from '@/models/organisation';
import { newPublicId } from '@/models/publicId';
import { unitOfWork } from '@/models/unitOfWork';
import { User } from '@/models/user';
import { createUser } from '@/services/users';

export const PASSWORD = 'tidal copper mast 41';

export interface TestPerson {
  publicId: string;
  email: string;
  actor: Actor;
}

/** A lab and a client; `person` enters somebody of either with PASSWORD. */
export async function enterLab() {
  const enter = (kind: 'lab' | 'client', name: string) =>
    unitOfWork(() => Organisation.create({ publicId: newPublicId(), kind, name, shortName: name }));
  const lab = await enter('lab', 'Harrow Lane EMC Bench');
  const client = await enter('client', 'Lumenwright');
  // One hash for everybody: it takes as long as all the rest of entering a person.
  const passwordHash = await hashPassword(PASSWORD);
  let count = 0;
  const person = async (role: Role, { signsIn = true } = {}): Promise<TestPerson> => {
    count += 1;
    const organisation = role === 'designer' ? client : lab;
    const [name, email] = [`Person ${count}`, `who${count}@harrowlane.example`];
    const { publicId } = await createUser(SERVER, {
      organisationId: organisation.publicId,
      role,
      name,
      email,
      password: null,
    });
    if (signsIn) await unitOfWork(() => User.update({ passwordHash }, { where: { publicId } }));
    const { id } = await unitOfWork(() => User.findOne({ where: { publicId }, rejectOnEmpty: true }));
    const { id: organisationId, name: organisationName } = organisation;
    const via = { kind: 'session', sessionId: 0, assuranceLevel: 1 } as const;
    return {
      publicId,
      email,
      actor: { userId: id, publicId, name, email, role, organisationId, organisationName, via },
    };
  };
  return { lab, client, person };
}

/** The Cookie header that answers a Set-Cookie value. */
export const cookieOf = (setCookie: string): string => setCookie.split(';')[0]!;
