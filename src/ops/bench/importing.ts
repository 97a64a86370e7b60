import { spawn } from 'node:child_process';
import path from 'node:path';
import { createInterface } from 'node:readline';
import type { SweepFileView } from '@/schemas/sweepFile';
import type { SweepView } from '@/schemas/sweep';
import type { Lab } from './lab';
import { quantile, ranMs, residentMb, rounded, say, waitedMs } from './measure';
import type { Product } from './product';

interface Answer {
  which: 'trivial' | 'page';
  at: number;
  ms: number;
}

const pause = (ms: number) => new Promise((resolve) => setTimeout(resolve, ms));

/** Somebody else who keeps asking; `answers` grows while they do. */
function secondClient({ origin, cookie }: Product, page: string): { answers: Answer[]; stop(): void } {
  const file = path.join(process.cwd(), 'src/ops/bench/secondClient.ts');
  const child = spawn(process.execPath, ['--import', 'tsx', file, origin, cookie, page], {
    stdio: ['ignore', 'pipe', 'ignore', 'ipc'],
  });
  const answers: Answer[] = [];
  createInterface({ input: child.stdout! }).on('line', (line) => answers.push(JSON.parse(line) as Answer));
  return { answers, stop: () => void child.kill('SIGTERM') };
}

/** Uploads a file and keeps it as a run, by the doors everybody uses. */
async function importOnce({ origin, cookie }: Product, { choice, stateId }: Lab, file: File) {
  const headers = { cookie, origin };
  const form = new FormData();
  form.append('file', file);
  const start = performance.now();
  const sent = await fetch(`${origin}/api/sweep-files`, { method: 'POST', headers, body: form });
  if (!sent.ok) throw new Error(`upload: ${sent.status} ${await sent.text()}`);
  const { id: fileId } = (await sent.json()) as SweepFileView;
  const uploadMs = performance.now() - start;
  const about = {
    operatingMode: 'bench',
    heightM: null,
    heightSwept: false,
    azimuthDeg: null,
    measuredAt: null,
    trial: null,
  };
  const kept = await fetch(`${origin}/api/sweeps`, {
    method: 'POST',
    headers: { ...headers, 'content-type': 'application/json' },
    body: JSON.stringify({ ...choice, ...about, stateId, fileId }),
  });
  if (!kept.ok) throw new Error(`keep: ${kept.status} ${await kept.text()}`);
  const { id } = (await kept.json()) as SweepView;
  return { id, uploadMs, keepMs: performance.now() - start - uploadMs };
}

/**
 * Imports a file again and again while a second client asks a trivial route and a page. What an import adds to their
 * waiting is held against the same client's median when nothing is imported.
 */
export async function benchImporting(
  product: Product,
  lab: Lab,
  text: string,
  points: number,
  rounds: number,
): Promise<string> {
  const other = secondClient(product, '/samples');
  try {
    // pages and workers warm up, then a while of nothing
    let { id } = await importOnce(product, lab, new File([text], 'warm.csv'));
    await pause(3_000);
    const quietFrom = Date.now();
    await pause(5_000);
    const quietTo = Date.now();
    const before = residentMb(product.pid);
    let peak = before;
    const watch = setInterval(() => (peak = Math.max(peak ?? 0, residentMb(product.pid) ?? 0)), 20);
    const [waited, ran] = [waitedMs(product.pid), ranMs(product.pid)];
    const from = Date.now();
    const imports = [];
    for (let i = 0; i < rounds; i++) {
      const one = await importOnce(product, lab, new File([text], `bench-${i}.csv`));
      imports.push(one);
      id = one.id;
    }
    const to = Date.now();
    const [waitedAfter, ranAfter] = [waitedMs(product.pid), ranMs(product.pid)];
    clearInterval(watch);
    const among = (which: Answer['which'], since: number, until: number) =>
      other.answers
        .filter((one) => one.which === which && one.at >= since && one.at + one.ms <= until + 500)
        .map(({ ms }) => ms);
    const seen = (which: Answer['which']) => {
      const quiet = among(which, quietFrom, quietTo);
      const during = among(which, from, to);
      const usual = quantile(quiet, 0.5);
      return {
        asked: during.length,
        quietMedianMs: rounded(usual),
        quietP99ExtraMs: rounded(quantile(quiet, 0.99) - usual),
        medianExtraMs: rounded(quantile(during, 0.5) - usual),
        p99ExtraMs: rounded(quantile(during, 0.99) - usual),
        worstExtraMs: rounded(Math.max(...during) - usual),
      };
    };
    say({
      bench: 'import',
      points,
      traces: 2,
      bytes: text.length,
      rounds,
      uploadMs: rounded(
        quantile(
          imports.map(({ uploadMs }) => uploadMs),
          0.5,
        ),
      ),
      keepMs: rounded(
        quantile(
          imports.map(({ keepMs }) => keepMs),
          0.5,
        ),
      ),
      bestMs: rounded(Math.min(...imports.map(({ uploadMs, keepMs }) => uploadMs + keepMs))),
      memoryMb: { before: before && rounded(before), peak: peak && rounded(peak) },
      secondClient: { trivialRoute: seen('trivial'), page: seen('page') },
      mainThread: {
        ofMs: to - from,
        ranMs: ran === null ? null : rounded(ranAfter! - ran),
        waitedForAProcessorMs: waited === null ? null : rounded(waitedAfter! - waited),
      },
    });
    return id;
  } finally {
    other.stop();
  }
}
