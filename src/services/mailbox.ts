import { Op } from 'sequelize';
import { env } from '@/config/env';
import { NotFound } from '@/errors';
import { readMail } from '@/mail/readMail';
import { mailWay } from '@/mail/transport';
import { CaughtMail } from '@/models/caughtMail';
import { newPublicId } from '@/models/publicId';
import { unitOfWork } from '@/models/unitOfWork';
import { olderThan, pageFrom, type Page, type PageRequest } from './paging';

const KEPT_MS = 14 * 24 * 3600_000;
/** More than this many are never kept; the oldest go first. */
export const KEPT_AT_MOST = 500;
const CHARACTERS = 200_000;

/** Whether e-mail is caught and shown: in the demo, while no mail server is configured. */
export function lettersShown(): boolean {
  return env().STILLFIELD_DEMO && mailWay() === 'caught';
}

/** Where e-mail goes, for pages that say so. */
export function whereMailGoes(): ReturnType<typeof mailWay> {
  return mailWay();
}

export interface Letter {
  id: string;
  at: string;
  from: string;
  to: string;
  subject: string;
  text: string;
}

/** Keeps a caught e-mail for two weeks. What the envelope says counts, not the headers. */
export async function keepLetter(
  raw: Buffer,
  envelope: { from: string; to: string[] },
  at = new Date(),
): Promise<void> {
  const mail = readMail(raw);
  await unitOfWork(async () => {
    await CaughtMail.create({
      publicId: newPublicId(),
      messageId: mail.messageId.slice(0, 200),
      sender: (mail.from || envelope.from).slice(0, 400),
      recipient: envelope.to.join(', ').slice(0, 400),
      subject: mail.subject.slice(0, 500),
      text: mail.text.slice(0, CHARACTERS),
      expiresAt: new Date(at.getTime() + KEPT_MS),
      createdAt: at,
    });
    const [edge] = await CaughtMail.findAll({
      attributes: ['id'],
      order: [['id', 'DESC']],
      offset: KEPT_AT_MOST,
      limit: 1,
    });
    if (edge) await CaughtMail.destroy({ where: { id: { [Op.lte]: edge.id } } });
  });
}

/** The demo's caught e-mails, newest first; needs no sign-in. @throws {NotFound} wherever e-mail is real */
export async function listLetters(page: PageRequest): Promise<Page<Letter>> {
  if (!lettersShown()) throw new NotFound('page');
  return unitOfWork(async () => {
    const rows = await CaughtMail.findAll({
      where: olderThan(page),
      order: [['id', 'DESC']],
      limit: page.limit + 1,
    });
    return pageFrom(rows, page, ({ publicId, createdAt, sender, recipient, subject, text }) => ({
      id: publicId,
      at: createdAt.toISOString(),
      from: sender,
      to: recipient,
      subject,
      text,
    }));
  });
}
