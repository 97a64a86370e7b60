import type { Metadata } from 'next';
import { found } from '@/app/found';
import { requireActor } from '@/app/requireActor';
import { LAYER_COLUMNS } from '@/emc/columns';
import { labZone } from '@/services/lab';
import { historyOf } from '@/services/audit';
import { listCandidates, readSweep } from '@/services/sweeps';
import { readWindow } from '@/services/sweepWindow';
import { SweepSheet } from './SweepSheet';

interface Props {
  params: Promise<{ id: string }>;
}

const FIRST_CANDIDATES = 50;

export async function generateMetadata({ params }: Props): Promise<Metadata> {
  const { number, sample } = await found(readSweep(await requireActor(), (await params).id));
  return { title: `${number}, ${sample.product}` };
}

export default async function SweepPage({ params }: Props) {
  const actor = await requireActor();
  const { id } = await params;
  const sweep = await found(readSweep(actor, id));
  const whole = { fromHz: sweep.firstHz, toHz: sweep.lastHz, columns: LAYER_COLUMNS };
  const [window, candidates, zone] = await Promise.all([
    readWindow(actor, id, whole),
    listCandidates(actor, id, { limit: FIRST_CANDIDATES }),
    labZone(),
  ]);
  const history = actor.role === 'designer' ? null : await historyOf(actor, 'sweep', id);
  return (
    <SweepSheet
      key={id}
      sweep={sweep}
      overview={window}
      first={candidates}
      history={history}
      zone={zone}
      lab={actor.role !== 'designer'}
    />
  );
}
