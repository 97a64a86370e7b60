import type { Metadata } from 'next';
import { notFound } from 'next/navigation';
import { found } from '@/app/found';
import { requireActor } from '@/app/requireActor';
import { asked, type Search } from '@/app/(lab)/jobs/listed';
import { mayRole } from '@/auth/permissions';
import { Sheet } from '@/components/shell/Sheet';
import { SheetHeader } from '@/components/shell/SheetHeader';
import { ButtonLink } from '@/components/ui/Button';
import { EmptyLine } from '@/components/ui/EmptyLine';
import { listLimitLines } from '@/services/limitLines';
import { readLimitSet } from '@/services/limitSets';
import { SetForm } from './SetForm';

export const metadata: Metadata = { title: 'Make a limit set' };

/** A set of newest lines; `revises` names one in use, `line` a line that is chosen at first. */
export default async function NewSetPage({ searchParams }: { searchParams: Search }) {
  const actor = await requireActor();
  if (!mayRole(actor.role, 'limit.enter')) notFound();
  const revises = await asked(searchParams, 'revises');
  const line = await asked(searchParams, 'line');
  const before = revises ? await found(readLimitSet(actor, revises)) : null;
  if (before && before.withdrawnAt !== null) notFound();
  const { items, next } = await listLimitLines(actor, { limit: 200 });
  const names = new Set(before?.lines.map(({ name }) => name));
  const chosen = items.filter(({ id, name }) => id === line || names.has(name)).map(({ id }) => id);
  return (
    <Sheet
      header={
        <SheetHeader
          title={before ? `Revise ${before.name}` : 'Make a limit set'}
          finding={{
            verdict: 'not-covered',
            children: before
              ? `Revision ${before.revision} takes no new run once revision ${before.revision + 1} is made; it stays readable.`
              : 'A run is judged against every line of its set.',
          }}
          actions={
            <ButtonLink kind="quiet" href="/limits#sets">
              Leave it
            </ButtonLink>
          }
        />
      }
    >
      {items.length === 0 ? (
        <EmptyLine lead="No limit line is entered yet.">Upload one first.</EmptyLine>
      ) : (
        <SetForm before={before} lines={items} chosen={chosen} more={next !== null} />
      )}
    </Sheet>
  );
}
