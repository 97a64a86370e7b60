import { errorDetails, logLine } from '@/ops/log';
import { FinalFailure, NotYet } from './failures';
import { HANDLERS, type Handler } from './handlers';
import { leaseNext, markFailed, markSent, markWaiting } from './queue';

/**
 * Takes one due message, commits the lease, and only then does its effect: an effect inside the transaction could
 * happen without its commit.
 * @returns false when there was nothing to do
 */
export async function workOnce(
  owner: string,
  handlers: Readonly<Record<string, Handler>> = HANDLERS,
): Promise<boolean> {
  const message = await leaseNext(owner);
  if (!message) return false;
  const { id, kind, attempts } = message;
  try {
    const handler = handlers[kind];
    if (!handler) throw new FinalFailure(`no handler for messages of kind ${kind}`);
    await handler(message);
  } catch (error) {
    if (error instanceof NotYet) {
      logLine('warn', 'message waits', { id, kind, reason: error.message });
      await markWaiting(message, owner, error.message);
      return true;
    }
    const final = error instanceof FinalFailure;
    logLine('warn', 'message failed', { id, kind, attempts, final, ...errorDetails(error) });
    await markFailed(message, owner, error instanceof Error ? error.message : String(error), final);
    return true;
  }
  const held = await markSent(message, owner);
  logLine(held ? 'info' : 'warn', 'message done', { id, kind, attempts, ...(held ? {} : { leaseLost: true }) });
  return true;
}
