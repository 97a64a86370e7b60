/* npm run stillfield -- user-disable E-MAIL: shuts a person out at once; what they recorded stays. */

import { SERVER } from '@/auth/actor';
import { disableUser } from '@/services/users';
import { runCommand, Usage } from '../commandLine';

export async function main(args: string[]): Promise<void> {
  const [email, ...rest] = args;
  if (!email || rest.length > 0) throw new Usage('user-disable E-MAIL');
  await disableUser(SERVER, email);
  process.stderr.write(`${email} is signed out everywhere and cannot sign in; tokens of theirs open nothing.\n`);
}

if (require.main === module) void runCommand(main);
