import type { Metadata } from 'next';
import Link from 'next/link';
import { notFound } from 'next/navigation';
import { requireActor } from '@/app/requireActor';
import { asked, listed, type Search } from '@/app/(lab)/jobs/listed';
import { SheetHeader } from '@/components/shell/SheetHeader';
import { ButtonLink } from '@/components/ui/Button';
import { Id } from '@/components/ui/IdentityLine';
import { PORT_WORDS } from '@/format/words';
import { port as knownPort } from '@/schemas/common';
import { readFinalsSheet, type FinalsAsked } from '@/services/finalsSheet';
import { addressOf } from '../retests/retestQuery';
import { FinalsSheet } from './FinalsSheet';

export const metadata: Metadata = { title: 'Finals' };

/** Final measurement at the bench, for one run or for one state and port. */
export default async function FinalsPage({ searchParams }: { searchParams: Search }) {
  const actor = await requireActor();
  const runId = await asked(searchParams, 'run');
  const stateId = await asked(searchParams, 'state');
  const port = knownPort.safeParse(await asked(searchParams, 'port')).data;
  const which: FinalsAsked | null = runId ? { runId } : stateId && port ? { stateId, port } : null;
  if (!which) notFound();
  const sheet = await listed(readFinalsSheet(actor, which));
  const { run, sample, state } = sheet;
  const queue = run
    ? addressOf({ status: 'all', run: run.id })
    : addressOf({ status: 'open', sample: sample.id, state: state.id, port: sheet.port });
  return (
    <FinalsSheet
      sheet={sheet}
      header={
        <SheetHeader
          title={`Finals, ${PORT_WORDS[sheet.port]}`}
          state={{ label: state.label }}
          identity={
            <>
              <span>{sheet.organisation}</span>
              <span>
                job <Id>{sheet.job.number}</Id>
              </span>
              <span>
                <Link href={`/samples/${sample.id}`}>
                  {sample.code}, {sample.product}
                </Link>
              </span>
              {run && (
                <span>
                  asked for by run{' '}
                  <Link href={`/sweeps/${run.id}`} className="underline">
                    {run.number}
                  </Link>
                </span>
              )}
            </>
          }
          actions={<ButtonLink href={queue}>Show in the queue</ButtonLink>}
        />
      }
    />
  );
}
