import { z } from 'zod';
import { instant, organisationRef, pageOf, pageQuery, publicId, role } from './common';
import { operation } from './operation';

export const signInBody = z.strictObject({
  email: z.string().trim().toLowerCase().min(3, 'is needed').max(254),
  password: z.string().min(1, 'is needed').max(1000, 'takes at most 1000 characters'),
});
export const meView = z.strictObject({
  id: publicId,
  name: z.string(),
  email: z.string(),
  role,
  organisation: organisationRef,
});
export const signIn = operation({
  id: 'signIn',
  method: 'POST',
  path: '/api/session',
  summary: 'Sign in with e-mail and password; answers the session cookie',
  permission: null,
  status: 200,
  body: signInBody,
  reply: meView,
  repeatable: true,
});
export const signOut = operation({
  id: 'signOut',
  method: 'DELETE',
  path: '/api/session',
  summary: 'Sign out: end this session',
  permission: null,
  status: 204,
  repeatable: true,
});
export const readMe = operation({
  id: 'readMe',
  method: 'GET',
  path: '/api/session',
  summary: 'Who is signed in',
  permission: 'session.list',
  status: 200,
  reply: meView,
});
export const sessionView = z.strictObject({
  id: publicId,
  current: z.boolean(),
  address: z.string(),
  agent: z.string(),
  startedAt: instant,
  lastSeenAt: instant,
  expiresAt: instant,
});
export const listSessions = operation({
  id: 'listSessions',
  method: 'GET',
  path: '/api/sessions',
  summary: 'Where you are signed in',
  permission: 'session.list',
  status: 200,
  query: pageQuery,
  reply: pageOf(sessionView),
});
export const endSession = operation({
  id: 'endSession',
  method: 'DELETE',
  path: '/api/sessions/{id}',
  summary: 'End one of your sessions',
  permission: 'session.end',
  status: 204,
  params: z.strictObject({ id: publicId }),
});
