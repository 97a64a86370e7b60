import { z } from 'zod';
import { instant, organisationRef, pageOf, pageQuery, publicId, role, version } from './common';
import { mailStateView } from './mailState';
import { operation } from './operation';
import { meView } from './session';

const idParams = z.strictObject({ id: publicId });
const email = z
  .string()
  .trim()
  .toLowerCase()
  .min(3, 'is needed')
  .max(254, 'takes at most 254 characters')
  .regex(
    /^[^\s\p{Cc}<>()[\]\\,;:"@]+@[^\s\p{Cc}<>()[\]\\,;:"@]+\.[^\s\p{Cc}<>()[\]\\,;:"@]+$/u,
    'is not an e-mail address',
  );
const line = (max: number) =>
  z
    .string()
    .trim()
    .min(1, 'is needed')
    .max(max, `takes at most ${max} characters`)
    .regex(/^[^\p{Cc}\u2028\u2029]*$/u, 'is one line');
const password = z.string().min(1, 'is needed').max(1000, 'takes at most 1000 characters');
const token = z.string().regex(/^[A-Za-z0-9_-]{43}$/, 'is not the whole link; copy it from the e-mail again');

/* A new password by e-mail, and one's own. */

export const requestPasswordReset = operation({
  id: 'requestPasswordReset',
  method: 'POST',
  path: '/api/password-reset',
  summary:
    'Ask for an e-mail with a link to a new password; the answer is the same whether or not there is such a person',
  permission: null,
  status: 204,
  body: z.strictObject({ email }),
});
export const resetPassword = operation({
  id: 'resetPassword',
  method: 'POST',
  path: '/api/password-reset/use',
  summary: 'Set a new password with the token of an e-mailed link; ends all sessions',
  permission: null,
  status: 204,
  body: z.strictObject({ token, password }),
});
export const linkView = z.strictObject({
  name: z.string(),
  email: z.string(),
  role,
  organisation: z.string(),
  expiresAt: instant,
});
export type LinkView = z.infer<typeof linkView>;
export const readLink = operation({
  id: 'readLink',
  method: 'POST',
  path: '/api/one-time-links/read',
  summary: 'Whose an e-mailed link is, while it works; its token travels in the body so that no log holds it',
  permission: null,
  status: 200,
  body: z.strictObject({ kind: z.enum(['reset', 'invitation']), token }),
  reply: linkView,
});
export const acceptInvitation = operation({
  id: 'acceptInvitation',
  method: 'POST',
  path: '/api/invitations/accept',
  summary: 'Set the first password with the token of an invitation; answers the session cookie',
  permission: null,
  status: 200,
  body: z.strictObject({ token, password }),
  reply: meView,
});
export const changeOwnPassword = operation({
  id: 'changeOwnPassword',
  method: 'POST',
  path: '/api/account/password',
  summary: 'Change your own password; ends your other sessions',
  permission: 'password.change',
  status: 204,
  body: z.strictObject({ current: password, password }),
});

/* The people of the lab and of its clients. */

export const personView = z.strictObject({
  id: publicId,
  version,
  name: z.string(),
  email: z.string(),
  role,
  organisation: organisationRef,
  /** `invited`: entered, and no password yet. */
  state: z.enum(['invited', 'active', 'disabled']),
  disabledAt: instant.nullable(),
  disabledReason: z.string().nullable(),
  lastSignInAt: instant.nullable(),
  /** the latest invitation, while there is no password */
  invitation: z.strictObject({ expiresAt: instant, open: z.boolean(), mail: mailStateView.nullable() }).nullable(),
});
export type PersonView = z.infer<typeof personView>;
export const invitePersonBody = z
  .strictObject({
    name: line(120),
    email,
    role,
    organisationId: publicId.optional(),
    /** name of a client that is entered with this person */
    newClient: line(120).optional(),
  })
  .refine((body) => (body.organisationId === undefined) !== (body.newClient === undefined), {
    path: ['organisationId'],
    message: 'or the name of a new client is needed, one of them',
  });
export const changePersonBody = z.strictObject({ name: line(120).optional(), role: role.optional() });
export const reasonBody = z.strictObject({ reason: line(300) });

export const listPeople = operation({
  id: 'listPeople',
  method: 'GET',
  path: '/api/people',
  summary: 'People of the lab and its clients, newest first',
  permission: 'user.list',
  status: 200,
  query: z.strictObject({ ...pageQuery.shape, organisationId: publicId.optional() }),
  reply: pageOf(personView),
});
export const readPerson = operation({
  id: 'readPerson',
  method: 'GET',
  path: '/api/people/{id}',
  summary: 'One person',
  permission: 'user.list',
  status: 200,
  params: idParams,
  reply: personView,
});
export const invitePerson = operation({
  id: 'invitePerson',
  method: 'POST',
  path: '/api/people',
  summary: 'Enter a person and e-mail an invitation, valid 7 days',
  permission: 'user.create',
  status: 201,
  body: invitePersonBody,
  reply: personView,
  idempotent: true,
});
export const inviteAgain = operation({
  id: 'inviteAgain',
  method: 'POST',
  path: '/api/people/{id}/invitation',
  summary: 'E-mail a new invitation to somebody without a password; the earlier link ends',
  permission: 'user.create',
  status: 200,
  params: idParams,
  reply: personView,
  idempotent: true,
});
export const changePerson = operation({
  id: 'changePerson',
  method: 'PATCH',
  path: '/api/people/{id}',
  summary: 'Correct a name or change a role',
  permission: 'user.change',
  status: 200,
  params: idParams,
  body: changePersonBody,
  reply: personView,
  ifMatch: true,
});
export const disablePerson = operation({
  id: 'disablePerson',
  method: 'POST',
  path: '/api/people/{id}/disable',
  summary: 'Shut a person out at once, with the reason; their sessions and links end',
  permission: 'user.change',
  status: 200,
  params: idParams,
  body: reasonBody,
  reply: personView,
  ifMatch: true,
});
export const enablePerson = operation({
  id: 'enablePerson',
  method: 'POST',
  path: '/api/people/{id}/enable',
  summary: 'Let a disabled person in again, with the reason',
  permission: 'user.change',
  status: 200,
  params: idParams,
  body: reasonBody,
  reply: personView,
  ifMatch: true,
});
