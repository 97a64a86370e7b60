import { Forbidden, Unauthenticated } from '@/errors';
import { PERMISSIONS, mayRole, type Permission, type Role, type TokenScope } from './permissions';

/** Who asks. Role, organisation and disabled flag are read from the database for each request. */
export interface Actor {
  userId: number;
  publicId: string;
  name: string;
  email: string;
  role: Role;
  organisationId: number;
  organisationName: string;
  /** A browser session or a personal token. */
  via:
    { kind: 'session'; sessionId: number; assuranceLevel: number } | { kind: 'token'; scopes: readonly TokenScope[] };
}

/** First statement of every use-case. Throws Unauthenticated without an actor, Forbidden without the right. */
export function authorise(actor: Actor | null, permission: Permission): asserts actor is Actor {
  if (!actor) throw new Unauthenticated();
  if (!mayRole(actor.role, permission)) throw new Forbidden();
  if (actor.via.kind === 'token') {
    const needed: TokenScope | null = PERMISSIONS[permission].token;
    if (needed === null) throw new Forbidden('A token cannot do this; sign in with a browser.');
    const holds = actor.via.scopes.includes(needed) || (needed === 'read' && actor.via.scopes.includes('upload'));
    if (!holds) throw new Forbidden(`This token lacks the scope ${needed}.`);
  }
}

/** Whoever runs commands on the lab's own server, or fills the demo lab there. No request is ever this. */
export const SERVER = Symbol('server');
export type Commander = Actor | typeof SERVER;

/** `authorise` for what a command may do too. Nobody (null) is Unauthenticated here as everywhere. */
export function authoriseCommander(
  commander: Commander | null,
  permission: Permission,
): asserts commander is Commander {
  if (commander !== SERVER) authorise(commander, permission);
}

/** The person behind a change, for its audit entry; null for the server itself. */
export function personOf(commander: Commander): Actor | null {
  return commander === SERVER ? null : commander;
}

/** Which organisations' records an actor sees: null means all (the lab's own people). */
export function visibleOrganisation(actor: Actor): number | null {
  return actor.role === 'designer' ? actor.organisationId : null;
}
