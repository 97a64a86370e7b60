import type { Metadata } from 'next';
import Link from 'next/link';
import { found } from '@/app/found';
import { requireActor } from '@/app/requireActor';
import { mayRole } from '@/auth/permissions';
import { notesSection } from '@/app/(lab)/notes/notesSection';
import { sampleFinding } from '@/app/(lab)/samples/sampleFinding';
import { latestStandings, runsOf, standingReader, type Standing } from '@/app/(lab)/samples/standing';
import { Sheet } from '@/components/shell/Sheet';
import { SheetHeader } from '@/components/shell/SheetHeader';
import { EmptyLine } from '@/components/ui/EmptyLine';
import { Id } from '@/components/ui/IdentityLine';
import { SectionHeading } from '@/components/ui/SectionHeading';
import { formatDay } from '@/format/dates';
import { formatCount } from '@/format/quantities';
import type { HistoryEntry } from '@/services/audit';
import { readJob } from '@/services/jobs';
import { labZone } from '@/services/lab';
import { listNotes } from '@/services/notes';
import { historiesOf } from '../history';
import { historySection } from '../HistoryLines';
import { samplesOf } from '../jobStands';
import { AddSample } from './AddSample';
import { JobActs } from './JobActs';
import { JobSample } from './JobSample';
import { stateStandings } from './stateStandings';
import { RULE_NAMES } from '@/format/decisionRules';

interface Props {
  params: Promise<{ id: string }>;
}

export async function generateMetadata({ params }: Props): Promise<Metadata> {
  const { number, title } = await found(readJob(await requireActor(), (await params).id));
  return { title: `${number}, ${title}` };
}

export default async function JobPage({ params }: Props) {
  const actor = await requireActor();
  const job = await found(readJob(actor, (await params).id));
  const samples = await samplesOf(actor, job.id);
  const read = standingReader(actor);
  const latest: Standing[] = [];
  const blocks = [];
  for (const sample of samples) {
    const measured = sample.states.some(({ runs }) => runs > 0);
    const { runs } = measured ? await runsOf(actor, sample.id) : { runs: [] };
    latest.push(...(await latestStandings(read, runs)));
    blocks.push({ sample, standings: await stateStandings(read, runs) });
  }
  const history = await historiesOf(actor, [['job', job.id], ...samples.map(({ id }) => ['sample', id] as const)]);
  const zone = await labZone();
  const notes = await listNotes(actor, { limit: 10, jobId: job.id });
  const finding =
    job.state === 'declined'
      ? {
          verdict: 'not-covered' as const,
          runs: [{ text: `Declined: ${stopped(job.stateReason ?? 'no reason is recorded')}` }],
        }
      : sampleFinding(latest);
  return (
    <Sheet
      header={
        <SheetHeader
          title={job.title}
          identity={
            <>
              <span>{job.organisation.name}</span>
              <span>
                job <Id>{job.number}</Id>
              </span>
              <Link href={`/products/${job.product.id}`}>
                {job.product.name} {job.product.code}
              </Link>
              <span>opened {formatDay(job.createdAt, zone)}</span>
              <span>decided by {RULE_NAMES[job.decisionRule]}</span>
              <span>{stateLine(job.state, job.stateReason, history, zone)}</span>
            </>
          }
          finding={finding}
        />
      }
      margin={[
        notesSection({ jobId: job.id }, notes, zone, actor.role !== 'designer'),
        ...(history.length > 0 ? [historySection(history, zone, true)] : []),
      ]}
      marginLine={history[0]?.action}
    >
      <SectionHeading className="mt-5" remark={samples.length > 0 && `${formatCount(samples.length)}, newest first`}>
        Samples
      </SectionHeading>
      {samples.length === 0 && (
        <EmptyLine lead={job.state === 'open' ? 'No sample is in this job yet.' : 'No sample came into this job.'}>
          {job.state === 'open' && 'Each sample starts in state M0, as received; its runs hang from its states.'}
        </EmptyLine>
      )}
      {blocks.map(({ sample, standings }) => (
        <JobSample key={sample.id} sample={sample} standings={standings} />
      ))}
      {mayRole(actor.role, 'sample.create') && <AddSample job={{ id: job.id, number: job.number, state: job.state }} />}
      {mayRole(actor.role, 'job.change') && (
        <>
          <SectionHeading className="mt-6" remark="by a manager; each change stands in the history">
            This job
          </SectionHeading>
          <JobActs job={job} />
        </>
      )}
    </Sheet>
  );
}

/** `closed 12 Oct 2026 by Anselm Rook: reported and accepted`; who and when only for those who see the history. */
function stateLine(state: string, reason: string | null, history: readonly HistoryEntry[], zone: string): string {
  const change = history.find(({ action }) => action === `job ${state}`);
  const when = change ? ` ${formatDay(change.at, zone)}${change.by ? ` by ${change.by}` : ''}` : '';
  const word = state === 'open' && change ? 'reopened' : state;
  return `${word}${when}${reason && state === 'closed' ? `: ${reason}` : ''}`;
}

function stopped(text: string): string {
  return /[.!?]$/.test(text) ? text : `${text}.`;
}
