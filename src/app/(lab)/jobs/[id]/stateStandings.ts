import { counted, portsOf, stateNumber, type Run } from '@/app/(lab)/samples/worstRun';
import type { Standing, StandingReader } from '@/app/(lab)/samples/standing';

/** Beyond this many the older ones are left to the sample's own sheet. */
const MOST = 24;

/** Each port of each state of one sample, newest state first. */
export async function stateStandings(read: StandingReader, runs: readonly Run[]): Promise<Standing[]> {
  const standings: Standing[] = [];
  const labels = [...new Set(counted(runs).map(({ state }) => state))].sort((a, b) => stateNumber(b) - stateNumber(a));
  for (const label of labels) {
    const own = runs.filter(({ state }) => state === label);
    for (const port of portsOf(own)) {
      if (standings.length >= MOST) return standings;
      const standing = await read(own.filter((run) => run.port === port));
      if (standing) standings.push(standing);
    }
  }
  return standings;
}
