import type { Actor } from '@/auth/actor';
import { found } from '@/app/found';
import { latestStandings, runsOf, standingReader, type Standing } from '@/app/(lab)/samples/standing';
import { worstFirst } from '@/app/(lab)/samples/worstRun';
import type { JobView, SampleView } from '@/schemas/job';
import { listSamples } from '@/services/samples';

/** The governing port of each open job of a page; jobs without a counted run are not in the answer. */
export async function standsOf(actor: Actor, jobs: readonly JobView[]): Promise<Map<string, Standing>> {
  const standings = new Map<string, Standing>();
  const open = jobs.filter(({ state, samples }) => state === 'open' && samples > 0);
  for (const job of open) {
    const worst = (await standingsOf(actor, await samplesOf(actor, job.id))).sort(worstFirst)[0];
    if (worst) standings.set(job.id, worst);
  }
  return standings;
}

/** All samples of a job, newest first. */
export async function samplesOf(actor: Actor, jobId: string): Promise<SampleView[]> {
  const samples: SampleView[] = [];
  let after: string | undefined;
  do {
    const page = await found(listSamples(actor, { jobId, limit: 200, after }));
    samples.push(...page.items);
    after = page.next ?? undefined;
  } while (after !== undefined);
  return samples;
}

async function standingsOf(actor: Actor, samples: readonly SampleView[]): Promise<Standing[]> {
  const read = standingReader(actor);
  const standings: Standing[] = [];
  for (const sample of samples) {
    if (sample.states.every(({ runs }) => runs === 0)) continue;
    standings.push(...(await latestStandings(read, (await runsOf(actor, sample.id)).runs)));
  }
  return standings;
}
