/* npm run stillfield -- token-revoke ID: takes a token back at once. The id was told when it was issued. */

import { revokeToken } from '@/services/apiTokens';
import { runCommand, Usage } from '../commandLine';

export async function main(args: string[]): Promise<void> {
  const [id, ...rest] = args;
  if (!id || rest.length > 0) throw new Usage('token-revoke ID');
  await revokeToken(id);
  process.stderr.write(`Token ${id} opens nothing any more.\n`);
}

if (require.main === module) void runCommand(main);
