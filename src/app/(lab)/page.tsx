import { redirect } from 'next/navigation';
import { requireActor } from '@/app/requireActor';
import { listProducts } from '@/services/products';

/** Where a person's work is: a designer's newest product, the lab's runs. */
export default async function Home() {
  const actor = await requireActor();
  if (actor.role !== 'designer') redirect('/sweeps');
  const { items } = await listProducts(actor, { limit: 1 });
  redirect(items[0] ? `/products/${items[0].id}` : '/products');
}
