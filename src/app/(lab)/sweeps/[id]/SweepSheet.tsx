'use client';

import Link from 'next/link';
import { useCallback, useId, useMemo, useRef, useState } from 'react';
import { LayOver } from '@/app/(lab)/compare/LayOver';
import type { ListedRun } from '@/app/(lab)/compare/runLabel';
import type { HistoryLine } from '@/app/(lab)/jobs/HistoryLines';
import type { NotesPage } from '@/app/(lab)/notes/Notes';
import { notesSection } from '@/app/(lab)/notes/notesSection';
import { finalsToMeasure, retestsSection } from '@/app/(lab)/retests/runRetests';
import { ChartLegend } from '@/components/charts/ChartLegend';
import { chartSubject } from '@/components/charts/chartSubject';
import type { ChartMode } from '@/components/charts/marginSeries';
import { SweepChart } from '@/components/charts/SweepChart';
import { CandidateGrid, type CandidateFigure } from '@/components/grids/CandidateGrid';
import { Sheet } from '@/components/shell/Sheet';
import { SheetHeader } from '@/components/shell/SheetHeader';
import { useKey } from '@/components/shell/keys';
import { ButtonLink } from '@/components/ui/Button';
import { Id } from '@/components/ui/IdentityLine';
import { SectionHeading } from '@/components/ui/SectionHeading';
import type { ReceiverCheckView } from '@/schemas/receiver';
import type { RetestItem } from '@/schemas/retest';
import type { EvaluationItem } from '@/schemas/runActs';
import type { PhotoView, SetupView } from '@/schemas/setup';
import type { CandidateView, SweepView, WindowView } from '@/schemas/sweep';
import { formatDayTime } from '@/format/dates';
import { formatBandwidth, formatFrequency } from '@/format/frequencies';
import { formatCount, formatMargin } from '@/format/quantities';
import { PURPOSE_WORDS } from '@/format/words';
import { Coverage } from './Coverage';
import { History } from './History';
import { NewerRevisions } from './NewerRevisions';
import { receiverSection } from './receiverSection';
import { Record } from './Record';
import { RunActs } from './RunActs';
import { runFinding, runTitle } from './runFinding';
import { orientationOf, runWords } from './runWords';
import { setUpSection } from './setUpSection';
import { SettingsLine } from './SettingsLine';
import { sourcesSection } from './sourcesSection';
import { useCandidates, type CandidatePage } from './useCandidates';
import { useSources } from './useSources';
import { useWindow } from './useWindow';
import { useWorking } from './useWorking';
import { Working } from './Working';
import './sum.css';

interface Props {
  sweep: SweepView;
  overview: WindowView;
  first: CandidatePage;
  /** null for a reader who does not see it. */
  history: HistoryLine[] | null;
  evaluations: { items: EvaluationItem[]; next: string | null; newer: string[] };
  /** Runs of the same sample, this one among them. */
  others: ListedRun[];
  notes: NotesPage;
  setup: SetupView;
  photos: { items: PhotoView[]; next: string | null };
  /** What this run asked for or settled. */
  retests: { items: RetestItem[]; next: string | null };
  receiver: ReceiverCheckView;
  zone: string;
  /** Whether the reader is one of the lab's people. */
  lab: boolean;
}

/** What is open in the Working: a figure of a candidate. */
interface Open {
  rank: number;
  figure: CandidateFigure;
}

/** The sheet of one run: finding, chart, candidates, and beside them how each figure came about. */
export function SweepSheet(props: Props) {
  const { sweep, overview, first, history, evaluations, others, notes, setup, photos, retests, receiver, zone, lab } =
    props;
  const tableId = useId();
  const legend = useRef<HTMLDivElement>(null);
  const [mode, setMode] = useState<ChartMode>('margin');
  const [clockHz, setClockHz] = useState<number | null>(null);
  const [selectedRank, setSelectedRank] = useState<number | null>(first.items[0]?.rank ?? null);
  const [open, setOpen] = useState<Open | null>(null);
  const { candidates, total, more, busy: loadingMore } = useCandidates(sweep.id, first);
  const { window, ask } = useWindow(sweep.id, overview);
  const { working, busy, problem, load, clear } = useWorking(sweep.id);
  const sources = useSources(sweep.id, sweep.evaluation.id);
  const subject = useMemo(() => chartSubject(sweep, orientationOf(sweep)), [sweep]);

  const show = useCallback(
    (candidate: CandidateView, figure: CandidateFigure = 'margin') => {
      setSelectedRank(candidate.rank);
      setOpen({ rank: candidate.rank, figure });
      load({ frequencyHz: candidate.frequencyHz, trace: candidate.traceIndex, line: candidate.lineId });
    },
    [load],
  );
  const close = useCallback(() => {
    setOpen(null);
    clear();
  }, [clear]);
  function nameClock() {
    legend.current?.querySelector<HTMLInputElement>('input[type="text"]')?.focus();
  }
  const step = (by: 1 | -1) => {
    const at = candidates.findIndex(({ rank }) => rank === selectedRank);
    const next = candidates[at + by];
    if (!next) return;
    if (open) show(next, open.figure);
    else setSelectedRank(next.rank);
  };
  useKey('C', nameClock, { says: 'harmonics of a clock', weak: true });
  useKey('L', () => setMode((now) => (now === 'margin' ? 'level' : 'margin')), { says: 'margin or level', weak: true });
  useKey('ArrowDown', () => step(1), { says: 'next candidate', weak: true });
  useKey('ArrowUp', () => step(-1), { says: 'candidate before', weak: true });
  const selected = candidates.find(({ rank }) => rank === selectedRank) ?? null;
  useKey('W', () => void (selected && show(selected)), { says: 'working', when: selected !== null });
  useKey('Enter', () => void (selected && show(selected)), { when: selected !== null, weak: true });

  const finals = finalsToMeasure(retests, sweep.id);
  const current = selected ? `${formatMargin(selected.marginDb)} at ${formatFrequency(selected.frequencyHz)}` : null;

  return (
    <Sheet
      header={
        <SheetHeader
          title={runTitle(sweep)}
          state={{ label: sweep.state.label }}
          identity={
            <>
              <span>{sweep.organisation.name}</span>
              <span>
                job <Id>{sweep.job.number}</Id>
              </span>
              <span>
                run <Id>{sweep.number}</Id>, {runWords(sweep)}
              </span>
              {sweep.path && (
                <span>
                  path{' '}
                  {lab ? (
                    <Link href={`/paths/${sweep.path.id}?revision=${sweep.path.revision}`} className="t-id text-pen">
                      {sweep.path.code}
                    </Link>
                  ) : (
                    <Id>{sweep.path.code}</Id>
                  )}
                </span>
              )}
              <span>{formatDayTime(sweep.measuredAt ?? sweep.keptAt, zone)}</span>
              <span>{sweep.by.name}</span>
            </>
          }
          finding={runFinding(sweep, zone)}
          actions={
            lab ? (
              <>
                <ButtonLink
                  kind={finals ? undefined : 'primary'}
                  keyName="U"
                  href={`/sweeps/new?state=${sweep.state.id}`}
                >
                  Upload sweep files
                </ButtonLink>
                {finals && (
                  <ButtonLink kind="primary" keyName="F" href={finals.href}>
                    {finals.act}
                  </ButtonLink>
                )}
              </>
            ) : undefined
          }
        />
      }
      margin={[
        {
          id: 'working',
          title: 'Working',
          subject: working && open ? `${open.figure} at ${formatFrequency(working.frequencyHz)}` : undefined,
          onClose: open ? close : undefined,
          children: (
            <div aria-busy={busy} aria-live="polite">
              {open && working ? (
                <Working working={working} />
              ) : problem ? (
                <p className="text-madder">
                  {problem.title} {problem.detail}
                </p>
              ) : (
                <>
                  <p className="column-quiet">{busy ? 'Adding up.' : 'Click any figure and its working opens here.'}</p>
                  {selected && !busy && (
                    <button type="button" className="text-pen" onClick={() => show(selected)}>
                      Show {current}
                    </button>
                  )}
                </>
              )}
            </div>
          ),
        },
        {
          id: 'coverage',
          title: 'Port',
          summary: <Coverage.Summary sweep={sweep} />,
          children: <Coverage sweep={sweep} />,
        },
        sourcesSection(sources, { clockHz, onClock: setClockHz }),
        receiverSection(receiver),
        ...retestsSection(retests, sweep.id),
        setUpSection({ sweep, setup, photos, zone, lab }),
        notesSection({ sweepId: sweep.id }, notes, zone, lab),
        {
          id: 'record',
          title: 'Record',
          summary: sweep.file.name,
          children: <Record sweep={sweep} zone={zone} />,
        },
        ...(history || evaluations.items.length > 1
          ? [
              {
                id: 'history',
                title: 'History',
                summary: historySummary(history, evaluations.items.length),
                children: (
                  <History
                    sweepId={sweep.id}
                    evaluations={evaluations.items}
                    more={evaluations.next !== null}
                    entries={history}
                    zone={zone}
                  />
                ),
              },
            ]
          : []),
      ]}
      marginLine={current}
      keys={[
        { keys: ['ArrowUp', 'ArrowDown'], does: 'rows' },
        { keys: ['W'], does: 'working' },
        { keys: ['L'], does: 'level' },
        { keys: ['N'], does: 'note' },
        { keys: ['?'], does: 'all keys' },
      ]}
    >
      <NewerRevisions id={sweep.id} number={sweep.number} newer={evaluations.newer} />
      <div ref={legend}>
        <ChartLegend
          mode={mode}
          onMode={setMode}
          traces={sweep.traces}
          purpose={PURPOSE_WORDS[sweep.purpose]}
          clockHz={clockHz}
          onClock={setClockHz}
        >
          <SettingsLine sweep={sweep} />
        </ChartLegend>
      </div>
      <SweepChart
        subject={subject}
        window={window}
        candidates={candidates}
        total={total}
        mode={mode}
        onMode={setMode}
        selectedRank={selectedRank}
        onSelect={(candidate) => (open ? show(candidate, open.figure) : setSelectedRank(candidate.rank))}
        onWorking={show}
        onWindow={ask}
        clockHz={clockHz}
        onClock={setClockHz}
        onCombKey={nameClock}
        tableId={tableId}
      />
      <CandidateGrid
        id={tableId}
        sweep={sweep}
        candidates={candidates}
        total={total}
        selectedRank={selectedRank}
        open={open}
        onSelect={(candidate) => setSelectedRank(candidate.rank)}
        onFigure={show}
        clockHz={clockHz}
        onMore={more}
        loading={loadingMore}
      />
      <section aria-labelledby="this-run" className="print:hidden">
        <SectionHeading
          id="this-run"
          className="mt-6"
          remark={lab && 'nothing is deleted; each change stands in the history'}
        >
          This run
        </SectionHeading>
        <LayOver runs={others} over={{ id: sweep.id, number: sweep.number }} />
        {lab && <RunActs sweep={sweep} newer={evaluations.newer} />}
      </section>
      <p className="t-detail mt-4">
        A pre-compliance record of {formatCount(sweep.points)} points, step{' '}
        {sweep.stepHz === null ? 'uneven' : formatBandwidth(sweep.stepHz)}; not a certificate.
      </p>
    </Sheet>
  );
}

function historySummary(history: readonly HistoryLine[] | null, evaluations: number): string {
  const changes = history && (history.length === 1 ? '1 change' : `${history.length} changes`);
  return [changes, evaluations > 1 && `${evaluations} evaluations`].filter(Boolean).join(', ');
}
