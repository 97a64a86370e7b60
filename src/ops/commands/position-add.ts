/* npm run stillfield -- position-add CODE NAME [--can=word,word] [--description=TEXT]: enters a test position. */

import { SERVER } from '@/auth/actor';
import { Invalid } from '@/errors';
import { CAPABILITIES, enterPositionBody } from '@/schemas/booking';
import { enterPosition } from '@/services/positions';
import { runCommand, Usage } from '../commandLine';

const USAGE = `position-add CODE NAME [--can=${CAPABILITIES.join(',')}] [--description=TEXT]`;

export async function main(args: string[]): Promise<void> {
  const option = (name: string) => args.find((arg) => arg.startsWith(`--${name}=`))?.slice(name.length + 3);
  const [code, name, ...rest] = args.filter((arg) => !/^--(can|description)=/.test(arg));
  if (!code || !name || rest.length > 0) throw new Usage(USAGE);
  const capabilities = option('can')?.split(',').filter(Boolean) ?? [];
  const read = enterPositionBody.safeParse({ code, name, description: option('description') ?? '', capabilities });
  if (!read.success) {
    throw new Invalid(read.error.issues.map(({ path, message }) => ({ pointer: `/${path.join('/')}`, message })));
  }
  const { id } = await enterPosition(SERVER, read.data);
  process.stderr.write(`Test position ${read.data.code}, ${read.data.name}, is entered (${id}).\n`);
}

if (require.main === module) void runCommand(main);
