import { clearedCookie } from '@/auth/session';
import { handle } from '@/http/handle';
import { CLEAR_SITE_DATA } from '@/http/securityHeaders';
import { securityLog } from '@/http/securityLog';
import * as operations from '@/schemas/session';
import { readMe, signIn, SignInRefused, signOut } from '@/services/sessions';

export const GET = handle(operations.readMe, ({ actor }) => readMe(actor));

export const POST = handle(operations.signIn, async ({ actor, body, address, agent, headers }) => {
  try {
    const opened = await signIn(body, { address, agent });
    // Whoever signs in again leaves no session behind that no cookie leads to.
    if (actor?.via.kind === 'session') await signOut(actor);
    headers.append('set-cookie', opened.cookie);
    securityLog({ event: 'sign-in', userId: opened.actor.publicId, operation: operations.signIn.id, address });
    return await readMe(opened.actor);
  } catch (error) {
    if (error instanceof SignInRefused) {
      const { userId, reason: detail } = error;
      securityLog({ event: 'sign-in-refused', userId, operation: operations.signIn.id, address, detail });
    }
    throw error;
  }
});

export const DELETE = handle(operations.signOut, async ({ actor, address, headers }) => {
  await signOut(actor);
  headers.append('set-cookie', clearedCookie());
  headers.set('clear-site-data', CLEAR_SITE_DATA);
  if (actor) securityLog({ event: 'sign-out', userId: actor.publicId, operation: operations.signOut.id, address });
});
