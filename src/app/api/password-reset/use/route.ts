import { handle } from '@/http/handle';
import { securityLog } from '@/http/securityLog';
import * as operations from '@/schemas/people';
import { resetPassword } from '@/services/passwordReset';

export const POST = handle(operations.resetPassword, async ({ body, address }) => {
  const userId = await resetPassword(body.token, body.password);
  securityLog({ event: 'password-set', userId, operation: operations.resetPassword.id, address });
});
