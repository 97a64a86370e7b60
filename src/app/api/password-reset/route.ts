import { handle } from '@/http/handle';
import { securityLog } from '@/http/securityLog';
import * as operations from '@/schemas/people';
import { requestPasswordReset } from '@/services/passwordReset';

export const POST = handle(operations.requestPasswordReset, async ({ body, address }) => {
  const userId = await requestPasswordReset(body.email, address);
  securityLog({ event: 'reset-asked', userId, operation: operations.requestPasswordReset.id, address });
});
