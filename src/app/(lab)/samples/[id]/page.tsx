import type { Metadata } from 'next';
import Link from 'next/link';
import { found } from '@/app/found';
import { requireActor } from '@/app/requireActor';
import { mayRole } from '@/auth/permissions';
import { LayOver } from '@/app/(lab)/compare/LayOver';
import { historiesOf } from '@/app/(lab)/jobs/history';
import { custodySection } from '@/app/(lab)/custody/custodySection';
import { notesSection } from '@/app/(lab)/notes/notesSection';
import { historySection } from '@/app/(lab)/jobs/HistoryLines';
import { addressOf } from '@/app/(lab)/retests/retestQuery';
import { Sheet } from '@/components/shell/Sheet';
import { SheetHeader } from '@/components/shell/SheetHeader';
import { ButtonLink } from '@/components/ui/Button';
import { Id } from '@/components/ui/IdentityLine';
import { SectionHeading } from '@/components/ui/SectionHeading';
import { formatCount } from '@/format/quantities';
import { listLimitSets } from '@/services/limitSets';
import { prescanUncertainty } from '@/services/pathUncertainty';
import { labZone } from '@/services/lab';
import { openByState } from '@/services/openRetests';
import { listCustody } from '@/services/custody';
import { listNotes } from '@/services/notes';
import { readSample } from '@/services/samples';
import { missingLine, missingSection } from '../missingSection';
import { sampleRecord } from '../sampleRecord';
import { StateGrid } from '../StateGrid';
import { trialMoves } from '../trials';
import { AddState } from './AddState';
import { DropOnList } from '@/app/(lab)/sweeps/DropOnList';
import { CorrectSample } from './CorrectSample';
import { NothingMeasured } from './NothingMeasured';
import { resultMailSection } from './resultMailSection';
import { StateRuns } from './StateRuns';

interface Props {
  params: Promise<{ id: string }>;
}

export async function generateMetadata({ params }: Props): Promise<Metadata> {
  const { code, product } = await found(readSample(await requireActor(), (await params).id));
  return { title: `${code}, ${product.name} ${product.code}` };
}

export default async function SamplePage({ params }: Props) {
  const actor = await requireActor();
  const sample = await found(readSample(actor, (await params).id));
  const zone = await labZone();
  const { runs, more, grid, latest, finding, days } = await sampleRecord(actor, sample, zone);
  const moves = await trialMoves(actor, runs);
  const retests = await openByState(actor, sample.id);
  const history = await historiesOf(actor, [
    ['sample', sample.id],
    ...sample.states.map(({ id }) => ['state', id] as const),
  ]);
  const custody = await listCustody(actor, sample.id, { limit: 10 });
  const notes = await listNotes(actor, { limit: 10, sampleId: sample.id });
  const upload = mayRole(actor.role, 'sweep.keep');
  const change = mayRole(actor.role, 'state.change');
  const empty = runs.length === 0 ? await whatHangsHere() : null;
  const newest = sample.states.filter(({ planned }) => !planned).at(-1);
  return (
    <Sheet
      header={
        <SheetHeader
          title={`${sample.product.name} ${sample.product.code}`}
          state={newest && { label: newest.label }}
          identity={
            <>
              <span>{sample.organisation.name}</span>
              <span>
                job{' '}
                <Link href={`/jobs/${sample.job.id}`} className="t-id text-pen">
                  {sample.job.number}
                </Link>
              </span>
              <span>
                sample <Id>{sample.code}</Id>
              </span>
              <span>
                serial <Id>{sample.serial}</Id>
              </span>
              {sample.firmware && <span>firmware {sample.firmware}</span>}
              {sample.description && <span>{sample.description}</span>}
            </>
          }
          finding={finding}
          actions={
            upload &&
            newest && (
              <ButtonLink kind="primary" keyName="U" href={`/sweeps/new?state=${newest.id}`}>
                Upload sweep files
              </ButtonLink>
            )
          }
        />
      }
      margin={margin()}
      marginLine={missingLine(latest) ?? history[0]?.action}
      keys={
        grid.rows.length > 0
          ? [
              { keys: ['ArrowLeft', 'ArrowRight'], does: 'states' },
              { keys: ['ArrowUp', 'ArrowDown'], does: 'ports' },
              ...(upload ? [{ keys: ['U'], does: 'upload' }] : []),
            ]
          : undefined
      }
    >
      {empty && <NothingMeasured {...empty} upload={upload && newest !== undefined} />}
      {upload && newest && <DropOnList state={newest.id} />}
      {grid.rows.length > 0 && (
        <div className="mt-5">
          <StateGrid grid={grid} days={days} />
          {grid.left > 0 && (
            <p className="t-detail mt-2">{formatCount(grid.left)} older states stand in the list below.</p>
          )}
        </div>
      )}
      {[...sample.states].reverse().map((state) => (
        <StateRuns
          key={state.id}
          state={state}
          runs={runs.filter((run) => run.state === state.label)}
          moves={moves}
          retests={retests.get(state.id) ?? 0}
          retestsHref={addressOf({ status: 'open', sample: sample.id, state: state.id })}
          zone={zone}
          upload={upload}
          change={change}
        />
      ))}
      {more && (
        <p className="t-detail mt-2">
          Older runs stand in the <Link href={`/sweeps?sample=${sample.id}`}>list of its runs</Link>.
        </p>
      )}
      {runs.length > 1 && (
        <section aria-labelledby="two-runs" className="print:hidden">
          <SectionHeading id="two-runs" className="mt-6" remark="trials too">
            Two runs over each other
          </SectionHeading>
          <LayOver runs={runs} />
        </section>
      )}
      {mayRole(actor.role, 'state.create') && <AddState sampleId={sample.id} next={`M${sample.states.length}`} />}
      {await resultMailSection(actor, sample, zone)}
      {mayRole(actor.role, 'sample.change') && (
        <>
          <SectionHeading className="mt-6" remark="each change stands in the history">
            This sample
          </SectionHeading>
          <CorrectSample sample={sample} />
        </>
      )}
    </Sheet>
  );

  /** Lines for the sheet of a sample that nobody has measured yet. */
  async function whatHangsHere() {
    const [{ items: sets }, uncertainty] = await Promise.all([
      listLimitSets(actor, { limit: 50 }),
      prescanUncertainty(actor),
    ]);
    return { sets, uncertainty };
  }

  function margin() {
    const sections = [
      ...missingSection(latest),
      custodySection(custody.items, zone),
      notesSection({ sampleId: sample.id }, notes, zone, actor.role !== 'designer'),
      ...(history.length > 0 ? [historySection(history, zone, true)] : []),
    ];
    return sections.length > 0 ? sections : undefined;
  }
}
