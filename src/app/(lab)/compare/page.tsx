import type { Metadata } from 'next';
import { notFound } from 'next/navigation';
import { found } from '@/app/found';
import { requireActor } from '@/app/requireActor';
import { asked, listed, type Search } from '@/app/(lab)/jobs/listed';
import { Sheet } from '@/components/shell/Sheet';
import { SheetHeader } from '@/components/shell/SheetHeader';
import { EmptyLine } from '@/components/ui/EmptyLine';
import { comparisonQuery } from '@/schemas/comparison';
import { compareSweeps } from '@/services/comparison';
import { labZone } from '@/services/lab';
import { listSweeps, readSweep } from '@/services/sweeps';
import { CompareSheet } from './CompareSheet';
import { LayOver } from './LayOver';

export const metadata: Metadata = { title: 'Two runs over each other' };

/** Older runs of a sample are not offered here. */
const RUNS = 200;

/** `?a=…&b=…`: b beside a. With one of them the other is chosen here. */
export default async function ComparePage({ searchParams }: { searchParams: Search }) {
  const actor = await requireActor();
  const [a, b] = [await asked(searchParams, 'a'), await asked(searchParams, 'b')];
  const given = b ?? a;
  if (given === undefined) return <NothingChosen />;
  if (a === undefined || b === undefined) {
    const run = await found(readSweep(actor, given));
    const { items } = await listSweeps(actor, { limit: RUNS, sampleId: run.sample.id });
    return (
      <Sheet header={<SheetHeader title="Two runs over each other" identity={<span>{run.sample.product}</span>} />}>
        <EmptyLine lead={`Choose the run to lay ${run.number} over.`} />
        <LayOver runs={items} over={run} />
      </Sheet>
    );
  }
  const query = comparisonQuery.safeParse({ a, b });
  if (!query.success) notFound();
  const comparison = await listed(compareSweeps(actor, query.data));
  const { items } = await listSweeps(actor, { limit: RUNS, sampleId: comparison.about!.b.sample.id });
  return (
    <CompareSheet
      key={`${a} ${b}`}
      comparison={comparison}
      about={comparison.about!}
      runs={items}
      zone={await labZone()}
    />
  );
}

function NothingChosen() {
  return (
    <Sheet header={<SheetHeader title="Two runs over each other" />}>
      <EmptyLine lead="Choose two runs on the sheet of their sample.">
        A modification shows in what its run moves against the run before it.
      </EmptyLine>
    </Sheet>
  );
}
