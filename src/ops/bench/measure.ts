import { readFileSync } from 'node:fs';
import { loadavg } from 'node:os';

/** One JSON line per figure; the load average says how much else the machine was doing. */
export function say(line: Record<string, unknown>): void {
  process.stdout.write(`${JSON.stringify({ ...line, load: rounded(loadavg()[0]!) })}\n`);
}

export const rounded = (value: number): number => Math.round(value * 100) / 100;

/** The value below which a share of the list lies; the list is sorted in place. */
export function quantile(list: number[], share: number): number {
  list.sort((a, b) => a - b);
  return list[Math.min(list.length - 1, Math.floor(list.length * share))] ?? NaN;
}

export interface Timed {
  /** Median and shortest of the rounds, in milliseconds of the clock. */
  ms: number;
  bestMs: number;
  /** The same in milliseconds of processor time, which others on the machine disturb less. */
  cpuMs: number;
  bestCpuMs: number;
}

/** Runs `work` twice to warm up and then `rounds` times. */
export async function timed(work: () => unknown, rounds: number): Promise<Timed> {
  const wall: number[] = [];
  const cpu: number[] = [];
  for (let i = 0; i < rounds + 2; i++) {
    const before = process.cpuUsage();
    const start = performance.now();
    await work();
    const { user, system } = process.cpuUsage(before);
    if (i < 2) continue;
    wall.push(performance.now() - start);
    cpu.push((user + system) / 1000);
  }
  return {
    ms: rounded(quantile(wall, 0.5)),
    bestMs: rounded(Math.min(...wall)),
    cpuMs: rounded(quantile(cpu, 0.5)),
    bestCpuMs: rounded(Math.min(...cpu)),
  };
}

/** Resident memory of a process in megabytes (Linux); null elsewhere. */
export function residentMb(pid: number): number | null {
  return fromProc(`/proc/${pid}/status`, /VmRSS:\s+(\d+) kB/, 1 / 1024);
}

/** Milliseconds that the main thread of a process was ready to run and had to wait for a processor (Linux). */
export function waitedMs(pid: number): number | null {
  return fromProc(`/proc/${pid}/task/${pid}/schedstat`, /^\d+ (\d+)/, 1e-6);
}

/** Milliseconds of processor time of the main thread (Linux). */
export function ranMs(pid: number): number | null {
  return fromProc(`/proc/${pid}/task/${pid}/schedstat`, /^(\d+)/, 1e-6);
}

function fromProc(file: string, figure: RegExp, scale: number): number | null {
  try {
    const found = figure.exec(readFileSync(file, 'utf8'))?.[1];
    return found === undefined ? null : Number(found) * scale;
  } catch {
    return null;
  }
}
