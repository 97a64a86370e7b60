import type { Metadata } from 'next';
import { notFound } from 'next/navigation';
import { found } from '@/app/found';
import { requireActor } from '@/app/requireActor';
import { asked, type Search } from '@/app/(lab)/jobs/listed';
import { mayRole } from '@/auth/permissions';
import { labZone } from '@/services/lab';
import { listLimitLines, readLimitLine } from '@/services/limitLines';
import { readSweepFile } from '@/services/sweepFiles';
import { LineUpload } from './LineUpload';

export const metadata: Metadata = { title: 'Upload a limit line' };

/** Drop a limit line, see it beside the revision before, enter it. `revises` names the line it follows, `file` a held one. */
export default async function LineUploadPage({ searchParams }: { searchParams: Search }) {
  const actor = await requireActor();
  if (!mayRole(actor.role, 'limit.enter')) notFound();
  const file = await asked(searchParams, 'file');
  const revises = await asked(searchParams, 'revises');
  const held = file ? await found(readSweepFile(actor, file)) : null;
  const line = revises ? await found(readLimitLine(actor, revises)) : null;
  const { items } = await listLimitLines(actor, { limit: 200 });
  const before = line?.revisions[0] ?? null;
  const lines = before && !items.some(({ id }) => id === before.id) ? [before, ...items] : items;
  return (
    <LineUpload key={file ?? 'new'} held={held} revises={before?.id ?? null} lines={lines} zone={await labZone()} />
  );
}
