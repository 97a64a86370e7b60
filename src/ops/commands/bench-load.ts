/* npm run stillfield -- bench-load MANAGER-E-MAIL FILE.json: enters equipment, calibrations, tables and signal paths. */

import { readFileSync } from 'node:fs';
import { Invalid } from '@/errors';
import { unitOfWork } from '@/models/unitOfWork';
import { benchFile, enterBench } from '../benchFile';
import { runCommand, Usage } from '../commandLine';
import { managerActor } from '../managerActor';

export async function main(args: string[]): Promise<void> {
  const [email, file, ...rest] = args;
  if (!email || !file || rest.length > 0) throw new Usage('bench-load MANAGER-E-MAIL FILE.json');
  const read = benchFile.safeParse(JSON.parse(readFileSync(file, 'utf8')));
  if (!read.success) {
    throw new Invalid(read.error.issues.map(({ path, message }) => ({ pointer: `/${path.join('/')}`, message })));
  }
  await unitOfWork(async () => enterBench(await managerActor(email), read.data));
  const { equipment, paths } = read.data;
  process.stderr.write(`${equipment.length} items and ${paths.length} signal paths entered.\n`);
}

if (require.main === module) void runCommand(main);
