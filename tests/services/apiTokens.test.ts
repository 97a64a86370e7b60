import { createHash } from 'node:crypto';
import { authorise } from '@/auth/actor';
import { SERVER } from '@/auth/actor';
import { closePasswordWorkers } from '@/auth/passwordWorker';
import { Conflict, Forbidden, Invalid, NotFound } from '@/errors';
import { ApiToken } from '@/models/apiToken';
import { unitOfWork } from '@/models/unitOfWork';
import { verifyChain } from '@/services/audit';
import { bearerToken, issueToken, revokeToken, TokenRefused } from '@/services/apiTokens';
import { actorOf } from '@/services/sessions';
import { disableUser } from '@/services/users';
import { enterLab, type TestPerson } from '../auth/people';
import { freshDatabase, type TestDatabase } from '../support/database';

let schema: TestDatabase;
let person: Awaited<ReturnType<typeof enterLab>>['person'];
let technician: TestPerson;

beforeAll(async () => {
  schema = await freshDatabase();
  ({ person } = await enterLab());
  technician = await person('technician', { signsIn: false });
  await person('manager', { signsIn: false });
});
afterAll(async () => {
  await closePasswordWorkers();
  await schema.close();
});

const as = (token: string, more: Record<string, string> = {}) =>
  actorOf(new Headers({ authorization: `Bearer ${token}`, ...more }), '192.0.2.1');
const rowOf = (id: string) => unitOfWork(() => ApiToken.findOne({ where: { publicId: id }, rejectOnEmpty: true }));

test('a token is told once and kept as its SHA-256', async () => {
  const { id, token } = await issueToken(technician.email, 'bench script', ['upload']);
  expect(token).toMatch(/^sfd_[0-9A-Za-z]{40}$/);
  const row = await rowOf(id);
  expect(row.tokenHash).toBe(createHash('sha256').update(token).digest('hex'));
  expect(JSON.stringify(row)).not.toContain(token);
  expect(await verifyChain('lab')).toBeNull();
});

test('it speaks for its owner, with its scopes', async () => {
  const { token } = await issueToken(technician.publicId, 'reader', ['read']);
  const actor = await as(token);
  expect(actor).toEqual({ ...technician.actor, via: { kind: 'token', scopes: ['read'] } });
});

test.each([
  [['read'], 'sweep.list', true],
  [['read'], 'sweep-file.create', false],
  [['upload'], 'sweep-file.create', true],
  [['upload'], 'sweep.list', true],
  [['read', 'upload'], 'sweep.keep', true],
  [['read', 'upload'], 'job.create', false],
  [['read', 'upload'], 'session.list', false],
] as const)('scopes %j and %s: %s', async (scopes, permission, allowed) => {
  const { token } = await issueToken(technician.email, 'scoped', scopes);
  const actor = await as(token);
  const attempt = () => authorise(actor, permission);
  if (allowed) expect(attempt).not.toThrow();
  else expect(attempt).toThrow(Forbidden);
});

test('a token that does not hold is refused, and no cookie helps', async () => {
  const { token } = await issueToken(technician.email, 'changed', ['read']);
  for (const wrong of ['', 'x', `${token}x`, `sfd_${'0'.repeat(40)}`, token.toLowerCase().replace('sfd_', 'SFD_')]) {
    await expect(as(wrong, { cookie: 'stillfield=anything' })).rejects.toThrow(TokenRefused);
  }
});

test('a token ends when it is revoked, runs out, or its owner is disabled', async () => {
  const owner = await person('technician', { signsIn: false });
  const issue = (days: number | null = null) => issueToken(owner.email, 'short', ['read'], days);
  const [revoked, overdue, orphan] = [await issue(), await issue(30), await issue()];
  expect(overdue.expiresAt!.getTime() - Date.now()).toBeGreaterThan(29.9 * 24 * 3600_000);
  for (const { token } of [revoked, overdue, orphan]) expect((await as(token))?.publicId).toBe(owner.publicId);
  await revokeToken(revoked.id);
  await revokeToken(revoked.id);
  await expect(as(revoked.token)).rejects.toThrow(TokenRefused);
  const past = new Date(Date.now() - 1);
  await unitOfWork(() => ApiToken.update({ expiresAt: past }, { where: { publicId: overdue.id } }));
  await expect(as(overdue.token)).rejects.toThrow(TokenRefused);
  await disableUser(SERVER, owner.email);
  await expect(as(orphan.token)).rejects.toThrow(TokenRefused);
  await expect(issue()).rejects.toThrow(Conflict);
  expect(await verifyChain('lab')).toBeNull();
});

test('its last use is written at most once a minute', async () => {
  const { id, token } = await issueToken(technician.email, 'busy', ['read']);
  await as(token);
  const first = (await rowOf(id)).lastUsedAt;
  expect(first).not.toBeNull();
  await as(token);
  expect((await rowOf(id)).lastUsedAt).toEqual(first);
  const earlier = new Date(Date.now() - 61_000);
  await unitOfWork(() => ApiToken.update({ lastUsedAt: earlier }, { where: { publicId: id } }));
  await as(token);
  expect((await rowOf(id)).lastUsedAt!.getTime()).toBeGreaterThan(earlier.getTime());
});

test.each([
  ['nobody@harrowlane.example', 'x', ['read'], null, NotFound],
  ['who1@harrowlane.example', '', ['read'], null, Invalid],
  ['who1@harrowlane.example', 'x'.repeat(81), ['read'], null, Invalid],
  ['who1@harrowlane.example', 'x', [], null, Invalid],
  ['who1@harrowlane.example', 'x', ['read', 'write'], null, Invalid],
  ['who1@harrowlane.example', 'x', ['read'], 0, Invalid],
  ['who1@harrowlane.example', 'x', ['read'], 1.5, Invalid],
])('no token for %s, %j, %j, %s days', async (who, name, scopes, days, refusal) => {
  await expect(issueToken(who, name, scopes, days)).rejects.toThrow(refusal);
});

test.each([
  [null, null],
  ['', null],
  ['Basic dXNlcjpwYXNz', null],
  ['Bearerx abc', null],
  ['Bearer', ''],
  ['bearer  abc ', 'abc'],
  ['Bearer abc', 'abc'],
])('Authorization %j carries %j', (header, token) => expect(bearerToken(header)).toBe(token));
