/* npm run stillfield -- client-add NAME: enters a client organisation. */

import { SERVER } from '@/auth/actor';
import { enterClient } from '@/services/organisations';
import { runCommand, Usage } from '../commandLine';

export async function main(args: string[]): Promise<void> {
  const [name, ...rest] = args;
  if (!name || name.length > 120 || rest.length > 0) throw new Usage('client-add NAME');
  const { publicId } = await enterClient(SERVER, name);
  process.stderr.write(`${name} is entered (${publicId}).\n`);
}

if (require.main === module) void runCommand(main);
