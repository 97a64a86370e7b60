import type { Actor } from '@/auth/actor';
import { found } from '@/app/found';
import { samplesOf } from '@/app/(lab)/jobs/jobStands';
import type { JobView, SampleView } from '@/schemas/job';
import { listJobs } from '@/services/jobs';

/** Jobs are listed whole, not by product, so the lab's list is gone through; further back than this it is not. */
const PAGES = 20;

/** Jobs of one product and their samples, newest first; `more` says that older jobs were not looked at. */
export async function productRecord(
  actor: Actor,
  productId: string,
): Promise<{ jobs: JobView[]; samples: SampleView[]; more: boolean }> {
  const jobs: JobView[] = [];
  let after: string | undefined;
  let more = true;
  for (let page = 0; page < PAGES; page++) {
    const { items, next } = await found(listJobs(actor, { limit: 200, after }));
    jobs.push(...items.filter(({ product }) => product.id === productId));
    if (next === null) {
      more = false;
      break;
    }
    after = next;
  }
  const samples: SampleView[] = [];
  for (const job of jobs) if (job.samples > 0) samples.push(...(await samplesOf(actor, job.id)));
  return { jobs, samples, more };
}
