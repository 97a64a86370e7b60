import type { Actor } from '@/auth/actor';
import { found } from '@/app/found';
import { worstFirst } from '@/app/(lab)/samples/worstRun';
import type { JobView, SampleView } from '@/schemas/job';
import { standingsOfJobs, type PortStanding } from '@/services/portVerdict';
import { listSamples } from '@/services/samples';

/** The governing port of each open job of a page; jobs without a counted run are not in the answer. */
export async function standsOf(actor: Actor, jobs: readonly JobView[]): Promise<Map<string, PortStanding>> {
  const open = jobs.filter(({ state, samples }) => state === 'open' && samples > 0);
  const standings = await found(
    standingsOfJobs(
      actor,
      open.map(({ id }) => id),
    ),
  );
  return new Map([...standings].map(([id, ports]) => [id, ports.sort(worstFirst)[0]!]));
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
