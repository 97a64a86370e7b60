import type { Metadata } from 'next';
import { cache } from 'react';
import { found } from '@/app/found';
import { requireActor } from '@/app/requireActor';
import type { Actor } from '@/auth/actor';
import { historyOf } from '@/services/audit';
import { listEvaluations } from '@/services/evaluations';
import { labZone } from '@/services/lab';
import { listNotes } from '@/services/notes';
import { listPhotos } from '@/services/photos';
import { readReceiverCheck } from '@/services/receiverCheck';
import { listRetests } from '@/services/retests';
import { readSetup } from '@/services/setup';
import { listCandidates, listSweeps, readSweep } from '@/services/sweeps';
import { readOverview } from '@/services/sweepWindow';
import { runTitle } from './runFinding';
import { SweepSheet } from './SweepSheet';

interface Props {
  params: Promise<{ id: string }>;
}

const FIRST_CANDIDATES = 50;
/** Runs of the sample that this one can be laid over from here; older ones from the sample's list. */
const OTHERS = 200;
const EVALUATIONS = 20;
const PHOTOS = 12;
const RETESTS = 50;

/** Title and sheet are one read per request; the actor is the same object in both. */
const readOnce = cache((actor: Actor, id: string) => found(readSweep(actor, id)));

export async function generateMetadata({ params }: Props): Promise<Metadata> {
  const sweep = await readOnce(await requireActor(), (await params).id);
  return { title: `${sweep.number}, ${runTitle(sweep)}` };
}

export default async function SweepPage({ params }: Props) {
  const actor = await requireActor();
  const { id } = await params;
  const sweep = await readOnce(actor, id);
  const [window, candidates, zone, notes, evaluations, others, setup, photos, retests, receiver] = await Promise.all([
    readOverview(actor, id),
    listCandidates(actor, id, { limit: FIRST_CANDIDATES }),
    labZone(),
    listNotes(actor, { limit: 10, sweepId: id }),
    listEvaluations(actor, id, { limit: EVALUATIONS }),
    listSweeps(actor, { limit: OTHERS, sampleId: sweep.sample.id }),
    readSetup(actor, id),
    listPhotos(actor, id, { limit: PHOTOS }),
    listRetests(actor, { limit: RETESTS, runId: id }),
    readReceiverCheck(actor, id),
  ]);
  const history = actor.role === 'designer' ? null : await historyOf(actor, 'sweep', id);
  return (
    <SweepSheet
      key={id}
      sweep={sweep}
      overview={window}
      first={candidates}
      history={history}
      evaluations={evaluations}
      others={others.items}
      notes={notes}
      setup={setup}
      photos={photos}
      retests={retests}
      receiver={receiver}
      zone={zone}
      lab={actor.role !== 'designer'}
    />
  );
}
