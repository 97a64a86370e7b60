/*
 * npm run stillfield -- token-issue E-MAIL NAME --scopes read,upload [--days N]: a bearer token for a person's scripts.
 * The token alone goes to standard output, once; the database has only its hash.
 */

import { issueToken } from '@/services/apiTokens';
import { runCommand, Usage } from '../commandLine';

const USAGE = 'token-issue E-MAIL NAME --scopes read,upload [--days N]';

/** The value after `--name` or in `--name=value`, taken out of the arguments; null when it is not there. */
function takeOption(args: string[], name: string): string | null {
  const at = args.findIndex((arg) => arg === `--${name}` || arg.startsWith(`--${name}=`));
  if (at < 0) return null;
  if (args[at] !== `--${name}`) return args.splice(at, 1)[0]!.slice(name.length + 3);
  const [, value] = args.splice(at, 2);
  if (value === undefined) throw new Usage(USAGE);
  return value;
}

export async function main(given: string[]): Promise<void> {
  const args = [...given];
  const scopes = takeOption(args, 'scopes');
  const days = takeOption(args, 'days');
  const [email, name, ...rest] = args;
  if (!email || !name || !scopes || rest.length > 0) throw new Usage(USAGE);
  const wanted = scopes.split(',').filter(Boolean);
  const { id, token, expiresAt } = await issueToken(email, name, wanted, days === null ? null : Number(days));
  process.stdout.write(`${token}\n`);
  const until = expiresAt ? `until ${expiresAt.toISOString().slice(0, 10)}` : 'until it is revoked';
  process.stderr.write(`Token ${id} of ${email} holds ${until}. It is shown this once.\n`);
}

if (require.main === module) void runCommand(main);
