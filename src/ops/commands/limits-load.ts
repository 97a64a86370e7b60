/*
 * npm run stillfield -- limits-load MANAGER-E-MAIL: enters the published limit lines and sets, each with its source and
 * how sure that is. A line that is there already gets a next revision only by a person, so a second run is refused.
 */

import { limitSets } from '@fixtures/demo/limitSets';
import { Conflict } from '@/errors';
import { LimitSet } from '@/models/limitSet';
import { unitOfWork } from '@/models/unitOfWork';
import { runCommand, Usage } from '../commandLine';
import { managerActor } from '../managerActor';
import { enterPublishedLimits } from '../publishedLimits';

export async function main(args: string[]): Promise<void> {
  const [email, ...rest] = args;
  if (!email || rest.length > 0) throw new Usage('limits-load MANAGER-E-MAIL');
  const sets = await unitOfWork(async () => {
    const manager = await managerActor(email);
    if ((await LimitSet.count()) > 0) throw new Conflict('This lab has limit sets already; nothing was changed.');
    return enterPublishedLimits(manager, limitSets, new Date());
  });
  process.stderr.write(
    `${sets.size} limit sets entered. Lines said to be from memory: check them against the standard.\n`,
  );
}

if (require.main === module) void runCommand(main);
