import type { Metadata } from 'next';
import { found } from '@/app/found';
import { requireActor } from '@/app/requireActor';
import { historiesOf } from '@/app/(lab)/jobs/history';
import { asked, listed, type Search } from '@/app/(lab)/jobs/listed';
import { typedNumber } from '@/app/(lab)/sweeps/new/typedNumber';
import { mayRole } from '@/auth/permissions';
import { dayOf } from '@/format/dates';
import { readPath as readPathOperation } from '@/schemas/paths';
import { labZone } from '@/services/lab';
import { readPath } from '@/services/pathRecord';
import { PathSheet } from './PathSheet';

interface Props {
  params: Promise<{ id: string }>;
  searchParams: Search;
}

export async function generateMetadata({ params }: Props): Promise<Metadata> {
  const { code } = await found(readPath(await requireActor(), (await params).id));
  return { title: `Signal path ${code}` };
}

/** One signal path: its items, what it adds to a reading, how certain that is, and what was measured through it. */
export default async function PathPage({ params, searchParams }: Props) {
  const actor = await requireActor();
  const mhz = typedNumber((await asked(searchParams, 'mhz')) ?? '');
  const query = readPathOperation.query!.safeParse({
    revision: await asked(searchParams, 'revision'),
    ...(mhz !== null && { atHz: mhz * 1e6 }),
  });
  const path = await listed(readPath(actor, (await params).id, query.data));
  const zone = await labZone();
  return (
    <PathSheet
      key={`${path.id} ${path.revision} ${query.data?.atHz ?? ''}`}
      path={path}
      askedHz={query.data?.atHz ?? null}
      history={await historiesOf(actor, [['path', path.id]])}
      zone={zone}
      today={dayOf(new Date(), zone)}
      manager={mayRole(actor.role, 'path.enter')}
    />
  );
}
