import type { Metadata } from 'next';
import { notFound } from 'next/navigation';
import { requireActor } from '@/app/requireActor';
import type { Actor } from '@/auth/actor';
import { NotFound } from '@/errors';
import type { SweepFileView } from '@/schemas/sweepFile';
import { listLimitSets } from '@/services/limitSets';
import { listSamples } from '@/services/samples';
import { listPaths } from '@/services/signalPaths';
import { readSweepFile } from '@/services/sweepFiles';
import { listTrialWords } from '@/services/trialWords';
import { UploadSheet } from './UploadSheet';

export const metadata: Metadata = { title: 'Upload sweep files' };

const MOST = { limit: 200 };
const MOST_FILES = 60;

interface Props {
  searchParams: Promise<{ file?: string | string[]; state?: string | string[] }>;
}

/** Drop files, see what was recognised in each, keep them as runs. `file` names those that are held already. */
export default async function UploadPage({ searchParams }: Props) {
  const actor = await requireActor();
  if (actor.role === 'designer') notFound();
  const { file = [], state } = await searchParams;
  const named = [...new Set([file].flat())].slice(0, MOST_FILES);
  const [samples, paths, limitSets, trials, held] = await Promise.all([
    listSamples(actor, MOST),
    listPaths(actor, MOST),
    listLimitSets(actor, MOST),
    listTrialWords(actor),
    Promise.all(named.map((id) => heldFile(actor, id))),
  ]);
  return (
    <UploadSheet
      held={held.filter((one) => one !== null)}
      stateId={[state].flat()[0] ?? null}
      samples={samples.items}
      paths={paths.items}
      limitSets={limitSets.items}
      trials={trials}
    />
  );
}

/** Null for a file that is held no longer; the sheet says so. */
async function heldFile(actor: Actor, id: string): Promise<SweepFileView | null> {
  try {
    return await readSweepFile(actor, id);
  } catch (error) {
    if (error instanceof NotFound) return null;
    throw error;
  }
}
