/*
 * npm run bench: what a lab waits for, as ratios within one run. One JSON line per figure on standard output; `ms` are
 * milliseconds of the clock, `cpuMs` of processor time. Nothing here asserts; machines differ, ratios less.
 * `npm run bench -- 250000` takes a shorter large file.
 */
import { closeDatabase, database } from '@/models/database';
import { benchChart } from './bench/chart';
import { benchCompute } from './bench/compute';
import { sweepText } from './bench/file';
import { benchImporting } from './bench/importing';
import { enterLab } from './bench/lab';
import { say } from './bench/measure';
import { startProduct } from './bench/product';
import { benchWindow } from './bench/window';

const SMALL = 10_000;
const LARGE = Number(process.argv[2] ?? 1_000_000);

async function bench(): Promise<void> {
  database();
  say({ bench: 'machine', node: process.version, arch: process.arch });
  const lab = await enterLab();
  const [small, large] = [sweepText(SMALL), sweepText(LARGE)];
  await benchCompute(lab, small, SMALL, 15);
  await benchCompute(lab, large, LARGE, 5);
  await closeDatabase();
  const product = await startProduct();
  try {
    await benchImporting(product, lab, small, SMALL, 20);
    const runId = await benchImporting(product, lab, large, LARGE, 6);
    await benchWindow(product, runId, LARGE);
    await benchChart(product, runId);
  } finally {
    await product.stop();
  }
}

bench().catch((error: unknown) => {
  process.stderr.write(`${error instanceof Error ? error.stack : String(error)}\n`);
  process.exit(1);
});
