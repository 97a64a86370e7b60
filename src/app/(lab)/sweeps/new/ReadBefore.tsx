'use client';

import { useMemo } from 'react';
import { leftBetween, type ChartSubject } from '@/components/charts/chartSubject';
import { SweepChart } from '@/components/charts/SweepChart';
import { SectionHeading } from '@/components/ui/SectionHeading';
import { formatFrequencyRange } from '@/format/frequencies';
import { formatCount } from '@/format/quantities';
import type { SweepFileView } from '@/schemas/sweepFile';
import { choiceOf, rangeOf } from './draft';
import type { Draft } from './draftTypes';
import { spanOf } from './spanOf';
import type { UploadLists } from './uploadLists';
import { usePreview } from './usePreview';

/** What was read before the broken line, in the chart's frame; the rest is shaded. */
export function ReadBefore({ file, draft, lists }: { file: SweepFileView; draft: Draft; lists: UploadLists }) {
  const limitSet = lists.limitSets.find(({ id }) => id === draft.limitSetId);
  const { firstHz, lastHz, notRead } = spanOf(file, draft, limitSet);
  const drawn = drawable(draft);
  const choice = choiceOf(drawn, file);
  const { preview } = usePreview(file.id, choice, draft.stateId);
  const subject = useMemo<ChartSubject>(
    () => ({
      firstHz,
      lastHz,
      stepHz: file.recognition.frequency.stepHz,
      limitName: limitSet?.name ?? '',
      lines: limitSet?.lines ?? [],
      traces: preview?.traces ?? [],
      uncertainty: preview ? leftBetween(preview) : [],
      gaps: [],
      orientation: '',
      notRead: notRead ?? undefined,
    }),
    // The range is made anew with every draft; its figures are what counts.
    // eslint-disable-next-line react-hooks/exhaustive-deps
    [firstHz, lastHz, notRead?.fromHz, notRead?.toHz, file, limitSet, preview],
  );
  const read = rangeOf(draft, file);
  return (
    <section className="mt-5">
      <SectionHeading>What was read before it</SectionHeading>
      {limitSet && firstHz > 0 && (
        <SweepChart
          key={`${firstHz} ${lastHz} ${limitSet.id}`}
          subject={subject}
          window={preview?.window ?? null}
          candidates={[]}
          mode="margin"
          preview
        />
      )}
      <p className="t-text mt-1 text-ink2">
        {formatCount(file.recognition.partial!.points)} points,{' '}
        <span className="t-figure">
          {formatFrequencyRange(Math.min(read.firstHz, read.lastHz), Math.max(read.firstHz, read.lastHz))}
        </span>
        . {choice ? '' : 'The trace is drawn once its units are said. '}Nothing is saved yet.
      </p>
    </section>
  );
}

/** For drawing alone: where the antenna stood, and which conductor it was, moves no line of the chart. */
function drawable(draft: Draft): Draft {
  return {
    ...draft,
    keepPartial: true,
    polarisation: draft.polarisation || 'horizontal',
    line: draft.line || 'L',
    traces: draft.traces.map((trace) => ({ ...trace, detector: trace.detector || 'unknown' })),
  };
}
