export type Role = 'manager' | 'technician' | 'designer';
export type TokenScope = 'read' | 'upload';

interface Rule {
  roles: readonly Role[];
  /** The token scope that may do this for its owner; null: only a person at a browser. */
  token: TokenScope | null;
}

const everyone = ['manager', 'technician', 'designer'] as const;
const lab = ['manager', 'technician'] as const;
const manager = ['manager'] as const;

/** The one table of who may do what. Which records they may do it to is decided by organisation in each service. */
export const PERMISSIONS = {
  'session.end': { roles: everyone, token: null },
  'session.list': { roles: everyone, token: null },
  'password.change': { roles: everyone, token: null },
  'user.list': { roles: manager, token: null },
  'user.create': { roles: manager, token: null },
  'user.change': { roles: manager, token: null },
  'organisation.enter': { roles: manager, token: null },
  'organisation.list': { roles: lab, token: 'read' },
  'product.list': { roles: everyone, token: 'read' },
  'product.read': { roles: everyone, token: 'read' },
  'product.create': { roles: lab, token: null },
  'product.change': { roles: lab, token: null },
  'clock.list': { roles: everyone, token: 'read' },
  'clock.write': { roles: everyone, token: null },
  'job.list': { roles: everyone, token: 'read' },
  'job.read': { roles: everyone, token: 'read' },
  'job.create': { roles: lab, token: null },
  'job.change': { roles: manager, token: null },
  'sample.list': { roles: everyone, token: 'read' },
  'sample.read': { roles: everyone, token: 'read' },
  'sample.create': { roles: lab, token: null },
  'sample.change': { roles: lab, token: null },
  'state.create': { roles: lab, token: null },
  'state.change': { roles: lab, token: null },
  'equipment.enter': { roles: manager, token: null },
  'path.enter': { roles: manager, token: null },
  'limit.enter': { roles: manager, token: null },
  'path.list': { roles: lab, token: 'read' },
  'limit-set.list': { roles: everyone, token: 'read' },
  'limit-line.list': { roles: lab, token: 'read' },
  'equipment.list': { roles: lab, token: 'read' },
  'sweep-file.create': { roles: lab, token: 'upload' },
  'sweep-file.read': { roles: lab, token: 'upload' },
  'sweep.keep': { roles: lab, token: 'upload' },
  'sweep.list': { roles: everyone, token: 'read' },
  'sweep.read': { roles: everyone, token: 'read' },
  'sweep.compare': { roles: everyone, token: 'read' },
  'sweep.refile': { roles: lab, token: null },
  'sweep.void': { roles: lab, token: null },
  'sweep.evaluate': { roles: lab, token: null },
  'setup.read': { roles: everyone, token: 'read' },
  'setup.write': { roles: lab, token: null },
  'retest.list': { roles: everyone, token: 'read' },
  'retest.change': { roles: lab, token: null },
  'table.preview': { roles: manager, token: null },
  'position.list': { roles: lab, token: 'read' },
  'position.enter': { roles: manager, token: null },
  'booking.list': { roles: lab, token: 'read' },
  'booking.write': { roles: manager, token: null },
  'result-mail.list': { roles: lab, token: 'read' },
  'result-mail.send': { roles: manager, token: null },
  'custody.list': { roles: everyone, token: 'read' },
  'custody.move': { roles: lab, token: null },
  'note.list': { roles: everyone, token: 'read' },
  'note.write': { roles: everyone, token: null },
  'find.everywhere': { roles: everyone, token: 'read' },
  'audit.read': { roles: lab, token: 'read' },
} as const satisfies Record<string, Rule>;

export type Permission = keyof typeof PERMISSIONS;

export function mayRole(role: Role, permission: Permission): boolean {
  return (PERMISSIONS[permission].roles as readonly Role[]).includes(role);
}
