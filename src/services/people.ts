import { col, fn, where } from 'sequelize';
import type { z } from 'zod';
import { authorise, type Actor } from '@/auth/actor';
import { Conflict, Invalid, NotFound } from '@/errors';
import { OneTimeLink } from '@/models/oneTimeLink';
import { Organisation } from '@/models/organisation';
import { unitOfWork } from '@/models/unitOfWork';
import { User } from '@/models/user';
import type { MailState } from '@/schemas/mailState';
import type { changePersonBody, invitePersonBody, PersonView } from '@/schemas/people';
import { recordChange } from './audit';
import { mailStateOf } from './mailState';
import { type LinkOwner, sendLink } from './oneTimeLinks';
import { enterClient } from './organisations';
import { olderThan, pageFrom, type Page, type PageRequest } from './paging';
import { keepAManager, roleIssues, shutOut, writeUser } from './users';
import { changeVersioned } from './versions';

async function viewsOf(rows: User[]): Promise<Map<number, PersonView>> {
  const invited = rows.filter(({ passwordHash }) => passwordHash === null).map(({ id }) => id);
  const latest = (await OneTimeLink.findAll({
    attributes: [[fn('MAX', col('id')), 'id']],
    where: { userId: invited, kind: 'invitation' },
    group: ['user_id'],
    raw: true,
  })) as unknown as { id: number }[];
  const links = await OneTimeLink.findAll({ where: { id: latest.map(({ id }) => id) } });
  const mails = await mailStateOf(links.flatMap(({ outboxId }) => (outboxId === null ? [] : [Number(outboxId)])));
  const linkOf = new Map(links.map((link) => [Number(link.userId), link]));
  return new Map(rows.map((row) => [row.id, view(row as LinkOwner, linkOf.get(Number(row.id)), mails)]));
}

function view(row: LinkOwner, link: OneTimeLink | undefined, mails: Map<number, MailState>): PersonView {
  const works = link && !link.usedAt && !link.endedAt && link.expiresAt > new Date();
  return {
    id: row.publicId,
    version: row.version,
    name: row.name,
    email: row.email,
    role: row.role,
    organisation: { id: row.organisation.publicId, name: row.organisation.name },
    state: row.disabledAt ? 'disabled' : row.passwordHash === null ? 'invited' : 'active',
    disabledAt: row.disabledAt?.toISOString() ?? null,
    disabledReason: row.disabledReason,
    lastSignInAt: row.lastSignInAt?.toISOString() ?? null,
    invitation: link
      ? {
          expiresAt: link.expiresAt.toISOString(),
          open: works === true,
          mail: link.outboxId === null ? null : (mails.get(Number(link.outboxId)) ?? null),
        }
      : null,
  };
}

async function find(publicId: string): Promise<LinkOwner> {
  const row = await User.findOne({ where: { publicId }, include: ['organisation'] });
  if (!row) throw new NotFound('person');
  return row as LinkOwner;
}

async function whole(publicId: string): Promise<PersonView> {
  const row = await find(publicId);
  return (await viewsOf([row])).get(row.id)!;
}

/** People newest first, of one organisation or all. @throws {NotFound} for an organisation that is not there */
export async function listPeople(
  actor: Actor | null,
  { organisationId, ...page }: PageRequest & { organisationId?: string },
): Promise<Page<PersonView>> {
  authorise(actor, 'user.list');
  return unitOfWork(async () => {
    const of = organisationId ? await Organisation.findOne({ where: { publicId: organisationId } }) : null;
    if (organisationId && !of) throw new NotFound('organisation');
    const rows = await User.findAll({
      where: { ...olderThan(page), ...(of && { organisationId: of.id }) },
      include: ['organisation'],
      order: [['id', 'DESC']],
      limit: page.limit + 1,
    });
    const views = await viewsOf(rows.slice(0, page.limit));
    return pageFrom(rows, page, (row) => views.get(row.id)!);
  });
}

export async function readPerson(actor: Actor | null, publicId: string): Promise<PersonView> {
  authorise(actor, 'user.list');
  return unitOfWork(() => whole(publicId));
}

/** The organisation a new person belongs to; a client that is new is entered with them. */
async function organisationFor(actor: Actor, body: z.infer<typeof invitePersonBody>, at: Date): Promise<Organisation> {
  if (body.newClient === undefined) {
    const row = await Organisation.findOne({ where: { publicId: body.organisationId } });
    if (!row) throw new Invalid([{ pointer: '/organisationId', message: 'is not an organisation of this lab' }]);
    return row;
  }
  const same = await Organisation.findOne({ where: where(fn('LOWER', col('name')), body.newClient.toLowerCase()) });
  if (same) throw new Invalid([{ pointer: '/newClient', message: 'is entered already; choose it from the list' }]);
  return enterClient(actor, body.newClient, at);
}

/** Enters a person without a password and asks for the invitation that lets them choose one, in one transaction. */
export async function invitePerson(
  actor: Actor | null,
  body: z.infer<typeof invitePersonBody>,
  at = new Date(),
): Promise<PersonView> {
  authorise(actor, 'user.create');
  return unitOfWork(async () => {
    const organisation = await organisationFor(actor, body, at);
    const { name, email, role } = body;
    const entry = { organisationId: organisation.publicId, name, email, role, password: null };
    const row = await writeUser(actor, entry, organisation, null, at);
    await invite(actor, row, at);
    return whole(row.publicId);
  });
}

async function invite(actor: Actor, user: User, at: Date): Promise<void> {
  const { expiresAt } = await sendLink('invitation', user.id, at);
  recordChange(actor, {
    scope: 'lab',
    action: 'invitation asked for',
    subjectType: 'user',
    subjectId: user.publicId,
    before: null,
    after: { until: expiresAt.toISOString() },
    at,
  });
}

/** Sends somebody without a password a new invitation; the earlier one ends. */
export async function inviteAgain(actor: Actor | null, publicId: string, at = new Date()): Promise<PersonView> {
  authorise(actor, 'user.create');
  return unitOfWork(async () => {
    const user = await find(publicId);
    if (user.disabledAt) throw new Conflict(`${user.name} is disabled. Enable them first.`);
    if (user.passwordHash !== null) {
      throw new Conflict(`${user.name} has a password. Forgotten password on the sign-in page sends them a new link.`);
    }
    await invite(actor, user, at);
    return whole(publicId);
  });
}

/** Corrects a name or changes a role; a role counts from the person's next request on. The lab keeps a manager. */
export async function changePerson(
  actor: Actor | null,
  publicId: string,
  version: number,
  body: z.infer<typeof changePersonBody>,
): Promise<PersonView> {
  authorise(actor, 'user.change');
  return unitOfWork(async () => {
    const user = await find(publicId);
    const role = body.role ?? user.role;
    const issues = roleIssues(role, user.organisation);
    if (issues.length) throw new Invalid(issues);
    if (user.role === 'manager' && role !== 'manager') await keepAManager(user);
    await changeVersioned(User, user, version, body, 'person');
    recordChange(actor, {
      scope: 'lab',
      action: role === user.role ? 'name of a person corrected' : `role changed to ${role}`,
      subjectType: 'user',
      subjectId: publicId,
      before: { role: user.role },
      // People appear in the trail by id: a name is not repeated there.
      after: { role, nameChanged: body.name !== undefined && body.name !== user.name },
    });
    return whole(publicId);
  });
}

/** Shuts a person out at once; what they recorded stays. @throws {Conflict} for oneself and for the last manager */
export async function disablePerson(
  actor: Actor | null,
  publicId: string,
  version: number,
  reason: string,
): Promise<PersonView> {
  authorise(actor, 'user.change');
  return unitOfWork(async () => {
    const user = await find(publicId);
    if (user.id === actor.userId) throw new Conflict('This is you. Another manager can disable you.');
    if (user.disabledAt) throw new Conflict(`${user.name} is disabled already.`);
    await changeVersioned(User, user, version, {}, 'person');
    await shutOut(actor, user, reason);
    return whole(publicId);
  });
}

/** Lets a disabled person in again, with the password they had. */
export async function enablePerson(
  actor: Actor | null,
  publicId: string,
  version: number,
  reason: string,
): Promise<PersonView> {
  authorise(actor, 'user.change');
  return unitOfWork(async () => {
    const user = await find(publicId);
    if (!user.disabledAt) throw new Conflict(`${user.name} is not disabled.`);
    await changeVersioned(User, user, version, { disabledAt: null, disabledReason: null }, 'person');
    recordChange(actor, {
      scope: 'lab',
      action: 'person enabled',
      subjectType: 'user',
      subjectId: publicId,
      before: { disabled: true },
      after: { disabled: false, reason },
    });
    return whole(publicId);
  });
}
