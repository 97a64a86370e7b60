import { handle } from '@/http/handle';
import { securityLog } from '@/http/securityLog';
import * as operations from '@/schemas/people';
import { acceptInvitation } from '@/services/invitations';
import { readMe, signOut } from '@/services/sessions';

export const POST = handle(operations.acceptInvitation, async ({ actor, body, address, agent, headers }) => {
  const opened = await acceptInvitation(body, { address, agent });
  // Whoever was signed in at this browser before leaves no session behind that no cookie leads to.
  if (actor?.via.kind === 'session') await signOut(actor);
  headers.append('set-cookie', opened.cookie);
  const { publicId: userId } = opened.actor;
  securityLog({ event: 'password-set', userId, operation: operations.acceptInvitation.id, address });
  return readMe(opened.actor);
});
