import { createHash } from 'node:crypto';
import { Op } from 'sequelize';
import type { z } from 'zod';
import { authorise, type Actor } from '@/auth/actor';
import { Conflict, Invalid, type Issue } from '@/errors';
import { resultMail } from '@/mail/resultMail';
import { ModificationState } from '@/models/modificationState';
import { newPublicId } from '@/models/publicId';
import { ResultMail } from '@/models/resultMail';
import { Sample } from '@/models/sample';
import { currentTransaction, unitOfWork } from '@/models/unitOfWork';
import { User } from '@/models/user';
import type { MailState } from '@/schemas/mailState';
import type {
  previewResultMailBody,
  ResultMailPreview,
  ResultMailView,
  sendResultMailBody,
} from '@/schemas/resultMail';
import { recordChange } from './audit';
import { queueMail } from './mailQueue';
import { mailStateOf } from './mailState';
import { olderThan, pageFrom, type PageRequest } from './paging';
import { mayReceive } from './resultMail';
import type { WholeState } from './runs';
import { stateLabel } from './samples';
import { findState, stateResult } from './stateResult';

type Whole = ResultMail & { sample: Sample; state: ModificationState; recipient: User; sender: User };
const INCLUDE = ['sample', 'state', 'recipient', 'sender'];

function view(row: ResultMail, states: Map<number, MailState>): ResultMailView {
  const { sample, state, recipient, sender } = row as Whole;
  return {
    id: row.publicId,
    sendingId: row.sendingId,
    sample: { id: sample.publicId, code: sample.code },
    state: { id: state.publicId, label: stateLabel(state.position) },
    to: { id: recipient.publicId, name: recipient.name },
    by: { id: sender.publicId, name: sender.name },
    subject: row.subject,
    text: row.text,
    evaluationIds: row.evaluationIds,
    at: row.createdAt.toISOString(),
    mail: states.get(Number(row.outboxId)) ?? null,
  };
}

export async function listResultMails(
  actor: Actor | null,
  page: PageRequest & { sampleId?: string; stateId?: string },
) {
  authorise(actor, 'result-mail.list');
  return unitOfWork(async () => {
    const sample = page.sampleId ? await Sample.findOne({ where: { publicId: page.sampleId } }) : null;
    const state = page.stateId ? await ModificationState.findOne({ where: { publicId: page.stateId } }) : null;
    const rows = await ResultMail.findAll({
      where: {
        ...olderThan(page),
        ...(page.sampleId && { sampleId: sample?.id ?? 0 }),
        ...(page.stateId && { stateId: state?.id ?? 0 }),
      },
      include: INCLUDE,
      order: [['id', 'DESC']],
      limit: page.limit + 1,
    });
    const states = await mailStateOf(rows.map((row) => Number(row.outboxId)));
    return pageFrom(rows, page, (row) => view(row, states));
  });
}

/** Enabled designers of the client whose sample it is, newest first: nobody else can be chosen. */
export async function listResultMailRecipients(actor: Actor | null, page: PageRequest & { stateId: string }) {
  authorise(actor, 'result-mail.send');
  return unitOfWork(async () => {
    const { sample } = await findState(page.stateId);
    const { organisationId } = sample.job;
    const rows = await User.findAll({
      where: { ...olderThan(page), organisationId, role: 'designer', disabledAt: null },
      order: [['id', 'DESC']],
      limit: page.limit + 1,
    });
    return pageFrom(rows, page, ({ publicId: id, name }) => ({ id, name }));
  });
}

type Asked = z.infer<typeof previewResultMailBody>;

/** The recipients in the order they were named, held against change. @throws {Invalid} with a pointer to each who may not */
async function recipientsOf(state: WholeState, { recipientIds }: Asked): Promise<User[]> {
  const { job } = state.sample;
  const lock = currentTransaction().LOCK.SHARE;
  const found = await User.findAll({ where: { publicId: { [Op.in]: recipientIds } }, lock });
  const issues: Issue[] = [];
  const people = recipientIds.flatMap((publicId, i) => {
    const person = found.find((one) => one.publicId === publicId);
    if (person && mayReceive(person, job)) return [person];
    // Nothing is said of who it is instead: a stranger's id tells nothing.
    issues.push({
      pointer: `/recipientIds/${i}`,
      message: `is no designer of ${job.organisation.name} who can sign in`,
    });
    return [];
  });
  if (issues.length) throw new Invalid(issues);
  return [...new Set(people)];
}

async function compose(actor: Actor, asked: Asked) {
  const state = await findState(asked.stateId);
  const people = await recipientsOf(state, asked);
  const { result, evaluationIds } = await stateResult(actor, state, asked.note);
  const { subject, text, html } = resultMail(result);
  const digest = createHash('sha256')
    .update(JSON.stringify([subject, text, html]))
    .digest('hex');
  return { state, people, evaluationIds, subject, text, html, digest };
}

export async function previewResultMail(actor: Actor | null, asked: Asked): Promise<ResultMailPreview> {
  authorise(actor, 'result-mail.send');
  return unitOfWork(async () => {
    const { people, subject, text, html, digest } = await compose(actor, asked);
    const to = people.map(({ publicId: id, name, email: address }) => ({ id, name, address }));
    return { to, subject, text, html, digest };
  });
}

/**
 * Sends what was previewed, one message to each recipient through the outbox. The words are stored as they are sent,
 * with the evaluations they rest on.
 * @throws {Conflict} when the result is no longer what the preview showed
 */
export async function sendResultMail(
  actor: Actor | null,
  asked: z.infer<typeof sendResultMailBody>,
  at = new Date(),
): Promise<{ sendingId: string; items: ResultMailView[] }> {
  authorise(actor, 'result-mail.send');
  return unitOfWork(async () => {
    const { state, people, evaluationIds, subject, text, html, digest } = await compose(actor, asked);
    if (digest !== asked.digest) {
      throw new Conflict('The result has changed since you looked at it. Look at the e-mail again, then send it.');
    }
    const sendingId = newPublicId();
    const stored = { sendingId, sampleId: state.sample.id, stateId: state.id, subject, text, html, evaluationIds };
    for (const person of people) {
      const publicId = newPublicId();
      const outboxId = await queueMail('mail-result', { mail: publicId }, at);
      const own = { publicId, recipientId: person.id, outboxId, senderId: actor.userId, createdAt: at };
      await ResultMail.create({ ...stored, ...own });
    }
    recordChange(actor, {
      scope: `job-${state.sample.job.publicId}`,
      action: `result e-mail of ${stateLabel(state.position)} queued`,
      subjectType: 'state',
      subjectId: state.publicId,
      before: null,
      after: { sending: sendingId, recipients: people.map((person) => person.publicId), evaluations: evaluationIds },
      at,
    });
    const rows = await ResultMail.findAll({ where: { sendingId }, include: INCLUDE, order: [['id', 'ASC']] });
    const states = await mailStateOf(rows.map((row) => Number(row.outboxId)));
    return { sendingId, items: rows.map((row) => view(row, states)) };
  });
}
