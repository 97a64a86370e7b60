import type { Metadata } from 'next';
import { notFound } from 'next/navigation';
import { found } from '@/app/found';
import { requireActor } from '@/app/requireActor';
import { listLimitSets } from '@/services/limitSets';
import { listSamples } from '@/services/samples';
import { listPaths } from '@/services/signalPaths';
import { readSweepFile } from '@/services/sweepFiles';
import { listTrialWords } from '@/services/trialWords';
import { UploadSheet } from './UploadSheet';

export const metadata: Metadata = { title: 'Upload a sweep file' };

const MOST = { limit: 200 };

interface Props {
  searchParams: Promise<{ file?: string; state?: string }>;
}

/** Drop a file, see what was recognised in it, keep it as a run. `file` names one that is held already. */
export default async function UploadPage({ searchParams }: Props) {
  const actor = await requireActor();
  if (actor.role === 'designer') notFound();
  const { file, state } = await searchParams;
  const [samples, paths, limitSets, held, trials] = await Promise.all([
    listSamples(actor, MOST),
    listPaths(actor, MOST),
    listLimitSets(actor, MOST),
    file ? found(readSweepFile(actor, file)) : null,
    listTrialWords(actor),
  ]);
  return (
    <UploadSheet
      key={file ?? 'new'}
      held={held}
      stateId={state ?? null}
      samples={samples.items}
      paths={paths.items}
      limitSets={limitSets.items}
      trials={trials}
    />
  );
}
