import { purgeExpired, scheduleHousekeeping } from './housekeeping';
import type { LeasedMessage } from './queue';

/** Throw this when trying again cannot help: the message is refused at once and the reason kept. */
export class FinalFailure extends Error {}

/** Throw this when something of the lab's own is missing: the message waits with its reason and no try is counted. */
export class NotYet extends Error {}

/** Does the effect of one message. Throwing means that it did not happen and is to be tried again. */
export type Handler = (message: LeasedMessage) => Promise<void>;

/** What the second process can do, by the `kind` of the message. Kinds of mail are added by `compose -> Mail`. */
export const HANDLERS: Readonly<Record<string, Handler>> = {
  housekeeping: async () => {
    await purgeExpired();
  },
};

/** What has to be in the queue without anybody asking. Called now and then; repeating it is harmless. */
export async function scheduleRecurring(): Promise<void> {
  await scheduleHousekeeping();
}
