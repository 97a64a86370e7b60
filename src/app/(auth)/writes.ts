import type { Submittable } from '@/components/forms/send';

/** What the forms around passwords send; the schemas stay on the server, a test holds the two together. */
export const PASSWORD_WRITES = {
  requestPasswordReset: { method: 'POST', path: '/api/password-reset' },
  resetPassword: { method: 'POST', path: '/api/password-reset/use' },
  readLink: { method: 'POST', path: '/api/one-time-links/read' },
  acceptInvitation: { method: 'POST', path: '/api/invitations/accept' },
  changeOwnPassword: { method: 'POST', path: '/api/account/password' },
} as const satisfies Record<string, Submittable>;
