import type { Metadata } from 'next';
import { notFound } from 'next/navigation';
import { requireActor } from '@/app/requireActor';
import { mayRole } from '@/auth/permissions';
import { Sheet } from '@/components/shell/Sheet';
import { SheetHeader } from '@/components/shell/SheetHeader';
import type { SampleView } from '@/schemas/job';
import { listOrganisations } from '@/services/organisations';
import { listProducts, readProduct } from '@/services/products';
import { asked, listed, type Search } from '../listed';
import { NewJobForm } from './NewJobForm';

export const metadata: Metadata = { title: 'Open a job' };

type Client = SampleView['organisation'];

/** `?product=` chooses the product. */
export default async function NewJobPage({ searchParams }: { searchParams: Search }) {
  const actor = await requireActor();
  if (!mayRole(actor.role, 'job.create')) notFound();
  const wanted = await asked(searchParams, 'product');
  const products = await listProducts(actor, { limit: 200 });
  const chosen = wanted ? await listed(readProduct(actor, wanted)) : null;
  const items =
    chosen && !products.items.some(({ id }) => id === chosen.id) ? [chosen, ...products.items] : products.items;
  const clients: Client[] = [];
  for (let after: string | undefined; ;) {
    const page = await listOrganisations(actor, { limit: 200, after });
    clients.push(...page.items.map(({ id, name }) => ({ id, name })));
    if (page.next === null) break;
    after = page.next;
  }
  return (
    <Sheet
      header={
        <SheetHeader
          title="Open a job"
          identity={<span>It takes the next number of the year and stays open until a manager closes it.</span>}
        />
      }
    >
      <NewJobForm
        products={{ items, next: products.next }}
        clients={clients.sort((a, b) => a.name.localeCompare(b.name, 'en'))}
        chosen={chosen?.id ?? null}
      />
    </Sheet>
  );
}
