import type { Metadata } from 'next';
import { notFound } from 'next/navigation';
import { found } from '@/app/found';
import { requireActor } from '@/app/requireActor';
import { asked, type Search } from '@/app/(lab)/jobs/listed';
import { mayRole } from '@/auth/permissions';
import { dayOf } from '@/format/dates';
import { listFactorTables } from '@/services/factorTables';
import { readEquipment } from '@/services/equipment';
import { labZone } from '@/services/lab';
import { readSweepFile } from '@/services/sweepFiles';
import { TableUpload } from './TableUpload';

export const metadata: Metadata = { title: 'Upload a factor table' };

interface Props {
  params: Promise<{ id: string }>;
  searchParams: Search;
}

/** Drop a table of an item, see it beside the revision before, enter it as the next one. `file` names one that is held. */
export default async function TableUploadPage({ params, searchParams }: Props) {
  const actor = await requireActor();
  if (!mayRole(actor.role, 'equipment.enter')) notFound();
  const item = await found(readEquipment(actor, (await params).id));
  const file = await asked(searchParams, 'file');
  const held = file ? await found(readSweepFile(actor, file)) : null;
  const { items } = await listFactorTables(actor, { limit: 200, equipmentId: item.id });
  const zone = await labZone();
  const today = dayOf(new Date(), zone);
  const named = items.filter(({ newest }) => newest);
  return <TableUpload key={file ?? 'new'} item={item} held={held} named={named} today={today} zone={zone} />;
}
