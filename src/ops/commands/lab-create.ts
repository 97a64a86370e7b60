/* npm run stillfield -- lab-create NAME ZONE PREFIX: sets up the lab of an empty database. */

import { Invalid } from '@/errors';
import { enterLab } from '@/services/organisations';
import { runCommand, Usage } from '../commandLine';

const USAGE = 'lab-create NAME ZONE PREFIX, such as lab-create "Harrow Lane EMC Bench" Europe/London HL';

export async function main(args: string[]): Promise<void> {
  const [name, zone, jobPrefix, ...rest] = args;
  if (!name || !zone || !jobPrefix || rest.length > 0) throw new Usage(USAGE);
  try {
    new Intl.DateTimeFormat('en', { timeZone: zone });
  } catch {
    throw new Invalid([{ pointer: '/zone', message: `${zone} is no time zone; write it as Europe/London` }]);
  }
  if (!/^[A-Z]{1,6}$/.test(jobPrefix)) {
    throw new Invalid([{ pointer: '/prefix', message: 'is one to six capital letters; jobs are numbered with it' }]);
  }
  await enterLab({ name, zone, jobPrefix });
  process.stderr.write(`${name} is set up. Next: user-add for its manager, then limits-load.\n`);
}

if (require.main === module) void runCommand(main);
