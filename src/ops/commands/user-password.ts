/* npm run stillfield -- user-password E-MAIL [--generate]: a new password for a person; their sessions end. */

import { SERVER } from '@/auth/actor';
import { setPassword } from '@/services/users';
import { askPassword, generatedPassword, runCommand, Usage } from '../commandLine';

export async function main(args: string[]): Promise<void> {
  const generate = args.includes('--generate');
  const [email, ...rest] = args.filter((arg) => arg !== '--generate');
  if (!email || rest.length > 0) throw new Usage('user-password E-MAIL [--generate]');
  const password = generate ? generatedPassword() : await askPassword();
  await setPassword(SERVER, email, password);
  if (generate) process.stdout.write(`${password}\n`);
  process.stderr.write(`The password of ${email} is set, and every session of theirs has ended.\n`);
}

if (require.main === module) void runCommand(main);
