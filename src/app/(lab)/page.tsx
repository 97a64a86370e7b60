import { redirect } from 'next/navigation';
import { requireActor } from '@/app/requireActor';
import { listJobs } from '@/services/jobs';

/** Where a person's work is: the lab's day; for a designer the product of the newest open job. */
export default async function Home() {
  const actor = await requireActor();
  if (actor.role !== 'designer') redirect('/day');
  const { items } = await listJobs(actor, { limit: 50 });
  const job = items.find(({ state }) => state === 'open') ?? items[0];
  redirect(job ? `/products/${job.product.id}` : '/products');
}
