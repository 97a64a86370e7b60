import { handle } from '@/http/handle';
import { securityLog } from '@/http/securityLog';
import * as operations from '@/schemas/people';
import { changeOwnPassword } from '@/services/ownPassword';

export const POST = handle(operations.changeOwnPassword, async ({ actor, body, address }) => {
  await changeOwnPassword(actor, body, address);
  const userId = actor?.publicId ?? null;
  securityLog({ event: 'password-set', userId, operation: operations.changeOwnPassword.id, address });
});
