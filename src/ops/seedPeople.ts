import type { DemoOrganisation, DemoUser } from '@fixtures/demo/types';
import { type Actor, SERVER } from '@/auth/actor';
import type { Organisation } from '@/models/organisation';
import { User } from '@/models/user';
import { enterClient, enterLab } from '@/services/organisations';
import { createUser } from '@/services/users';

export interface SeededPeople {
  organisation(key: string): Organisation;
  actor(key: string): Actor;
}

/** Organisations, the lab's settings and everybody with a demo passphrase. */
export async function seedPeople(
  demoOrganisations: DemoOrganisation[],
  demoUsers: DemoUser[],
  at: Date,
): Promise<SeededPeople> {
  const organisations = new Map<string, Organisation>();
  for (const { key, kind, name, timeZone: zone } of demoOrganisations) {
    const entered = kind === 'lab' ? enterLab({ name, zone, jobPrefix: 'HL' }, at) : enterClient(SERVER, name, at);
    organisations.set(key, await entered);
  }
  const actors = new Map<string, Actor>();
  for (const user of demoUsers) {
    const organisation = organisations.get(user.organisation)!;
    const { role, name, email, passphrase: password } = user;
    const { publicId } = await createUser(
      SERVER,
      { organisationId: organisation.publicId, role, name, email, password },
      at,
    );
    const row = await User.findOne({ where: { publicId }, rejectOnEmpty: true });
    actors.set(user.key, {
      userId: row.id,
      publicId,
      name,
      email,
      role,
      organisationId: organisation.id,
      organisationName: organisation.name,
      via: { kind: 'session', sessionId: 0, assuranceLevel: 1 },
    });
  }
  const found = <T>(map: Map<string, T>, key: string): T => {
    const value = map.get(key);
    if (!value) throw new RangeError(`${key} is not in the demo lab`);
    return value;
  };
  return { organisation: (key) => found(organisations, key), actor: (key) => found(actors, key) };
}
