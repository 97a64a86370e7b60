'use client';

import { useRouter } from 'next/navigation';
import { useMemo, useState } from 'react';
import type { ChartSubject } from '@/components/charts/chartSubject';
import { SweepChart } from '@/components/charts/SweepChart';
import { ProblemMessage } from '@/components/forms/ProblemMessage';
import { useSubmit } from '@/components/forms/useSubmit';
import { Sheet } from '@/components/shell/Sheet';
import { SheetHeader } from '@/components/shell/SheetHeader';
import { Button } from '@/components/ui/Button';
import { SectionHeading } from '@/components/ui/SectionHeading';
import { VerdictWord } from '@/components/ui/VerdictWord';
import { formatFrequency } from '@/format/frequencies';
import { formatBytes, formatCount, formatMarginDb } from '@/format/quantities';
import { keepSweepOperation, type SweepView } from '@/schemas/sweep';
import type { SweepFileView } from '@/schemas/sweepFile';
import { ChoiceFields } from './ChoiceFields';
import { choiceOf, draftFrom, rangeOf, unsaid, type Draft } from './draft';
import { FilePreview } from './FilePreview';
import { LookAtFirst } from './LookAtFirst';
import { Recognised } from './Recognised';
import { typedNumber } from './typedNumber';
import type { UploadLists } from './uploadLists';
import { usePreview } from './usePreview';

interface Props extends UploadLists {
  file: SweepFileView;
  stateId: string | null;
  onDiscard: () => void;
}

/** What was recognised, how it will be judged, and what a person has to say before it is kept. */
export function RecogniseSheet({ file, stateId, onDiscard, ...lists }: Props) {
  const router = useRouter();
  const [draft, setDraft] = useState<Draft>(() => draftFrom(file, lists, stateId));
  const { submit, busy, problem, fieldErrors } = useSubmit<unknown, SweepView>(keepSweepOperation);
  const [leaving, setLeaving] = useState(false);
  const choice = choiceOf(draft, file);
  const { preview, problem: previewProblem, busy: judging } = usePreview(file.id, choice);
  const { firstHz, lastHz } = rangeOf(draft, file);
  const limitSet = lists.limitSets.find(({ id }) => id === draft.limitSetId);
  const path = lists.paths.find(({ id }) => id === draft.pathId);
  const errors = {
    ...Object.fromEntries((previewProblem?.errors ?? []).map((e) => [e.pointer.slice(1), e.message])),
    ...fieldErrors,
  };
  const missing = [
    ...(draft.stateId === '' ? ['the sample and state'] : []),
    ...unsaid(draft, file),
    ...(draft.operatingMode.trim() === '' ? ['the operating mode'] : []),
  ];

  const subject = useMemo<ChartSubject>(
    () => ({
      firstHz,
      lastHz,
      stepHz: file.recognition.frequency.stepHz,
      limitName: limitSet?.name ?? '',
      lines: limitSet?.lines ?? [],
      traces: preview?.traces ?? [],
      uncertainty: preview?.uncertainty ?? [],
      gaps: preview?.gaps ?? [],
      orientation: '',
    }),
    [firstHz, lastHz, file, limitSet, preview],
  );

  async function keep() {
    if (!choice || missing.length > 0) return;
    const outcome = await submit({
      ...choice,
      fileId: file.id,
      stateId: draft.stateId,
      operatingMode: draft.operatingMode,
      heightM: typedNumber(draft.heightM),
      heightSwept: draft.port === 'enclosure' && draft.heightSwept,
      azimuthDeg: typedNumber(draft.azimuthDeg),
    });
    if (!outcome.ok) return;
    setLeaving(true);
    router.push(`/sweeps/${outcome.reply.id}`);
  }

  const used = draft.traces.filter((trace) => trace.use).length;
  const { points } = file.recognition.frequency;
  return (
    <Sheet
      header={
        <SheetHeader
          title="Recognise a sweep file"
          identity={
            <>
              <span className="t-id">{file.name}</span>
              <span>{formatBytes(file.bytes)}</span>
            </>
          }
          finding={{
            verdict: missing.length === 0 ? 'under' : 'inconclusive',
            children: (
              <>
                Read as <b className="t-figure">{formatCount(points)}</b> points from{' '}
                <span className="t-figure">{formatFrequency(firstHz)}</span> to{' '}
                <span className="t-figure">{formatFrequency(lastHz)}</span>,{' '}
                {used === 1 ? 'one trace' : `${used} traces`}.{' '}
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
                <Button kind="primary" keyName="Enter" busy={busy || leaving} onClick={keep}>
                  Keep as a run
                </Button>
              )}
            </>
          }
        />
      }
      margin={[
        { id: 'recognised', title: 'What was recognised', children: <Recognised recognition={file.recognition} /> },
      ]}
      keys={[
        { keys: ['1', '2', '3'], does: 'choices' },
        { keys: ['Enter'], does: 'keep' },
      ]}
    >
      <ProblemMessage problem={problem} className="mt-3" />
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
          <LookAtFirst file={file} draft={draft} path={path} />
        </div>
        <div className="min-w-0">
          <ChoiceFields file={file} draft={draft} lists={lists} errors={errors} onDraft={setDraft} />
        </div>
      </div>
    </Sheet>
  );
}
