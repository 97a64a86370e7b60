import { dropOrphans } from '@/services/stageSweep';
import { purgeExpired, scheduleHousekeeping } from './housekeeping';
import { MAILS, sendMail } from './mails';
import type { LeasedMessage } from './queue';

/** Does the effect of one message. Throwing means that it did not happen and is to be tried again. */
export type Handler = (message: LeasedMessage) => Promise<void>;

const mailHandlers = Object.entries(MAILS).map(([kind, compose]): [string, Handler] => [
  kind,
  (message) => sendMail(compose, message),
]);

/** What the second process can do, by the `kind` of the message. A kind of e-mail is a row of MAILS. */
export const HANDLERS: Readonly<Record<string, Handler>> = {
  housekeeping: async () => {
    await purgeExpired();
    await dropOrphans();
  },
  ...Object.fromEntries(mailHandlers),
};

/** What has to be in the queue without anybody asking. Called now and then; repeating it is harmless. */
export async function scheduleRecurring(): Promise<void> {
  await scheduleHousekeeping();
}
