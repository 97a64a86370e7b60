import type { Submittable } from '@/components/forms/send';

/** What the forms of these sheets send; the schemas stay on the server, a test holds the two together. */
export const WRITES = {
  invitePerson: { method: 'POST', path: '/api/people' },
  inviteAgain: { method: 'POST', path: '/api/people/{id}/invitation' },
  changePerson: { method: 'PATCH', path: '/api/people/{id}' },
  disablePerson: { method: 'POST', path: '/api/people/{id}/disable' },
  enablePerson: { method: 'POST', path: '/api/people/{id}/enable' },
} as const satisfies Record<string, Submittable>;
