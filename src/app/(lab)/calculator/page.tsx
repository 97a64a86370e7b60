import type { Metadata } from 'next';
import { requireActor } from '@/app/requireActor';
import type { Search } from '@/app/(lab)/jobs/listed';
import { CalculatorSheet } from '@/components/calculator/CalculatorSheet';
// the column addition of a Working
import '@/app/(lab)/sweeps/[id]/sum.css';

export const metadata: Metadata = { title: 'Calculator' };

/** For everybody who is signed in; what is typed is computed in the browser and stands in the address alone. */
export default async function CalculatorPage({ searchParams }: { searchParams: Search }) {
  await requireActor();
  const query = new URLSearchParams();
  for (const [name, value] of Object.entries(await searchParams)) {
    const first = Array.isArray(value) ? value[0] : value;
    if (first !== undefined) query.set(name, first);
  }
  return <CalculatorSheet query={query.toString()} />;
}
