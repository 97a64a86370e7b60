'use client';

import { useMemo } from 'react';
import { leftBetween, type ChartSubject } from '@/components/charts/chartSubject';
import { SweepChart } from '@/components/charts/SweepChart';
import { fieldErrorsOf } from '@/components/forms/problem';
import { ProblemMessage } from '@/components/forms/ProblemMessage';
import type { MarginKey, MarginSection } from '@/components/shell/marginSection';
import { Sheet } from '@/components/shell/Sheet';
import { SheetHeader } from '@/components/shell/SheetHeader';
import { Button } from '@/components/ui/Button';
import { SectionHeading } from '@/components/ui/SectionHeading';
import { VerdictWord } from '@/components/ui/VerdictWord';
import { formatFileName } from '@/format/fileNames';
import { formatFrequency } from '@/format/frequencies';
import { formatBytes, formatCount, formatMarginDb } from '@/format/quantities';
import { ChoiceFields } from './ChoiceFields';
import { choiceOf, rangeOf, stillToSay } from './draft';
import type { Draft } from './draftTypes';
import type { DropEntry } from './dropEntry';
import { FilePreview } from './FilePreview';
import { LookAtFirst } from './LookAtFirst';
import { spanOf } from './spanOf';
import type { UploadLists } from './uploadLists';
import { usePreview } from './usePreview';

interface Props {
  entry: DropEntry;
  draft: Draft;
  lists: UploadLists;
  place: string | null;
  margin: readonly MarginSection[];
  keys: readonly MarginKey[];
  /** The file that something was said of last, when it is another one. */
  last: DropEntry | null;
  onLast: () => void;
  onDraft: (change: (before: Draft) => Draft) => void;
  onSweep: (index: number) => void;
  onKeep: () => Promise<void>;
  onDiscard: () => void;
}

/** What was recognised, how it will be judged, and what a person has to say before it is kept. */
export function RecogniseSheet(props: Props) {
  const { entry, draft, lists, place, margin, keys, last, onLast, onDraft, onSweep, onKeep, onDiscard } = props;
  const file = entry.file!;
  const choice = choiceOf(draft, file);
  const { preview, problem: previewProblem, busy: judging } = usePreview(file.id, choice, draft.stateId);
  const read = rangeOf(draft, file);
  const limitSet = lists.limitSets.find(({ id }) => id === draft.limitSetId);
  const path = lists.paths.find(({ id }) => id === draft.pathId);
  const { firstHz, lastHz, notRead } = spanOf(file, draft, limitSet);
  const errors = {
    ...Object.fromEntries((previewProblem?.errors ?? []).map((e) => [e.pointer.slice(1), e.message])),
    ...fieldErrorsOf(entry.problem),
  };
  const missing = stillToSay(draft, file);

  const subject = useMemo<ChartSubject>(
    () => ({
      firstHz,
      lastHz,
      stepHz: file.recognition.frequency.stepHz,
      limitName: limitSet?.name ?? '',
      lines: limitSet?.lines ?? [],
      traces: preview?.traces ?? [],
      uncertainty: preview ? leftBetween(preview) : [],
      gaps: preview?.gaps ?? [],
      orientation: '',
      notRead: notRead ?? undefined,
    }),
    // The range is made anew with every draft; its figures are what counts.
    // eslint-disable-next-line react-hooks/exhaustive-deps
    [firstHz, lastHz, notRead?.fromHz, notRead?.toHz, file, limitSet, preview],
  );

  const used = draft.traces.filter((trace) => trace.use).length;
  const { points } = file.recognition.frequency;
  return (
    <Sheet
      header={
        <SheetHeader
          title="Recognise a sweep file"
          identity={
            <>
              <span className="t-id">{formatFileName(file.name)}</span>
              <span>{formatBytes(file.bytes)}</span>
              {place && <span>{place}</span>}
              {draft.keepPartial && <span>partial</span>}
            </>
          }
          finding={{
            verdict: missing.length === 0 ? 'under' : 'inconclusive',
            children: (
              <>
                Read as <b className="t-figure">{formatCount(points)}</b> points from{' '}
                <span className="t-figure">{formatFrequency(read.firstHz)}</span> to{' '}
                <span className="t-figure">{formatFrequency(read.lastHz)}</span>,{' '}
                {used === 1 ? 'one trace' : `${used} traces`}
                {draft.keepPartial ? ', up to the broken line' : ''}.{' '}
                {missing.length > 0 ? `Still to say: ${missing.join(', ')}.` : 'Everything is said.'}
              </>
            ),
          }}
          actions={
            <>
              <Button kind="quiet" onClick={onDiscard}>
                Discard file
              </Button>
              {missing.length > 0 ? (
                <Button kind="unavailable">Waits for {missing[0]}</Button>
              ) : (
                <Button kind="primary" keyName="Enter" busy={entry.keeping} onClick={() => void onKeep()}>
                  {draft.keepPartial
                    ? `Keep ${formatCount(points)} points as partial`
                    : draft.trial.trim()
                      ? 'Keep as a trial'
                      : 'Keep as a run'}
                </Button>
              )}
            </>
          }
        />
      }
      margin={margin}
      keys={[{ keys: ['1', '2', '3'], does: 'choices' }, { keys: ['Enter'], does: 'keep' }, ...keys]}
    >
      <ProblemMessage problem={entry.problem} className="mt-3" />
      <div className="mt-2 grid gap-x-7 gap-y-6 wide:grid-cols-[minmax(0,1fr)_minmax(0,402px)]">
        <div className="min-w-0">
          <FilePreview recognition={file.recognition} />
          <SectionHeading className="mt-5" remark={judging ? 'judging' : undefined}>
            As it will be drawn
          </SectionHeading>
          {limitSet && firstHz <= 0 && (
            <p className="t-text mt-1 text-ink2">The chart waits for the centre frequency.</p>
          )}
          {limitSet && firstHz > 0 && (
            <SweepChart
              key={`${firstHz} ${lastHz} ${limitSet.id}`}
              subject={subject}
              window={preview?.window ?? null}
              candidates={preview?.worst ? [preview.worst] : []}
              mode="margin"
              preview
            />
          )}
          {preview ? (
            <p className="t-text mt-1">
              <VerdictWord verdict={preview.verdict} />
              {preview.worst ? (
                <>
                  , worst <span className="t-figure">{formatMarginDb(preview.worst.marginDb)}</span> at{' '}
                  <span className="t-figure">{formatFrequency(preview.worst.frequencyHz)}</span>
                </>
              ) : null}
              . Nothing is kept yet.
            </p>
          ) : previewProblem && previewProblem.errors.length === 0 ? (
            <ProblemMessage problem={previewProblem} />
          ) : null}
          <LookAtFirst
            file={file}
            draft={draft}
            path={path}
            onHolds={() =>
              onDraft((before) => ({ ...before, asBefore: before.asBefore && { ...before.asBefore, holds: true } }))
            }
            onRefuse={() => onDraft((before) => ({ ...before, keepPartial: false }))}
          />
        </div>
        <div className="min-w-0">
          {last && missing.length > 0 && (
            <div className="mb-4">
              <Button onClick={onLast}>Same as {formatFileName(last.name, 28)}</Button>
            </div>
          )}
          <ChoiceFields file={file} draft={draft} lists={lists} errors={errors} onDraft={onDraft} onSweep={onSweep} />
        </div>
      </div>
    </Sheet>
  );
}
