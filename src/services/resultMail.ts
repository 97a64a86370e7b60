import { Conflict, NotFound } from '@/errors';
import type { Mail } from '@/mail/message';
import type { Job } from '@/models/job';
import { ResultMail } from '@/models/resultMail';
import type { Sample } from '@/models/sample';
import { unitOfWork } from '@/models/unitOfWork';
import type { User } from '@/models/user';

type Whole = ResultMail & { recipient: User; sample: Sample & { job: Job } };

/**
 * The stored e-mail, word for word as it was previewed. Who it goes to is looked at again: between the press of the
 * button and the sending a person may have been disabled.
 * @throws {Conflict} when the recipient may no longer receive it, {NotFound}
 */
export async function composeResultMail(payload: Record<string, unknown>): Promise<Mail> {
  return unitOfWork(async () => {
    const row = (await ResultMail.findOne({
      where: { publicId: String(payload.mail) },
      include: [{ association: 'recipient' }, { association: 'sample', include: ['job'] }],
    })) as Whole | null;
    if (!row) throw new NotFound('result e-mail');
    const { recipient, sample, subject, text, html } = row;
    if (!mayReceive(recipient, sample.job)) {
      throw new Conflict(`${recipient.name} may no longer receive results of this sample; nothing was sent.`);
    }
    return { to: { name: recipient.name, address: recipient.email }, subject, text, html };
  });
}

/** Only an enabled designer of the client whose sample it is. */
export function mayReceive(person: User, job: Pick<Job, 'organisationId'>): boolean {
  return person.role === 'designer' && person.disabledAt === null && person.organisationId === job.organisationId;
}
