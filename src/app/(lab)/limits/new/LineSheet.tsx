'use client';

import { useState } from 'react';
import { ProblemMessage } from '@/components/forms/ProblemMessage';
import { usePreviewOf } from '@/components/forms/usePreviewOf';
import { useSubmit } from '@/components/forms/useSubmit';
import { Sheet } from '@/components/shell/Sheet';
import { SheetHeader } from '@/components/shell/SheetHeader';
import { Button } from '@/components/ui/Button';
import type { LineUnit } from '@/schemas/common';
import { formatBytes, formatCount } from '@/format/quantities';
import type { SweepFileView } from '@/schemas/sweepFile';
import type { EnteredLimitLine, LimitLinePreview } from '@/schemas/tables';
import { TABLE_WRITES } from '@/app/(lab)/equipment/writes';
import { RefusedFile } from '../RefusedFile';
import { FileLines } from './FileLines';
import { LineFields } from './LineFields';
import { LinePreviewed } from './LinePreviewed';
import { lineBody, lineDraftFrom, missingOfLine, type LineDraft, type LineUploadFor } from './lineDraft';
import { ReadAs, type Answers } from './ReadAs';

interface Props extends LineUploadFor {
  file: SweepFileView;
  onDiscard: () => void;
  onEntered: (entered: EnteredLimitLine) => void;
}

const QUESTION_WORDS = { frequencyUnit: 'the unit of the frequencies', unit: 'the unit of the limits', between: 'how it runs between two limits' }; // prettier-ignore

/** What was read, beside the revision it would follow, and what a person has to say before it is entered. */
export function LineSheet({ file, revises: asked, lines, zone, onDiscard, onEntered }: Props) {
  const [answers, setAnswers] = useState<Answers>({ frequencyUnit: '', unit: '', between: '' });
  const [revises, setRevises] = useState(asked);
  const [draft, setDraft] = useState<LineDraft | null>(null);
  const [setIds, setSetIds] = useState<string[] | null>(null);
  const { submit, busy, problem, fieldErrors } = useSubmit<unknown, EnteredLimitLine>(TABLE_WRITES.enterLimitLine);
  const choice = {
    fileId: file.id,
    revises,
    frequencyUnit: answers.frequencyUnit || null,
    unit: answers.unit || null,
    between: answers.between || null,
  };
  const { reply: preview, problem: previewProblem, busy: reading, current } = usePreviewOf<LimitLinePreview>(TABLE_WRITES.previewLimitLine.path, choice); // prettier-ignore
  const before = lines.find(({ id }) => id === revises) ?? null;
  if (preview && current && draft === null && !preview.refusal) {
    setDraft(lineDraftFrom(before, preview.stated));
    setSetIds(preview.sets.map(({ id }) => id));
  }
  if (preview?.refusal && current)
    return (
      <RefusedFile
        what="a limit line"
        file={file}
        refusal={preview.refusal}
        ways={[
          'Correct that line in the file and drop the new copy.',
          'Copy the rows out of the standard: start, stop, limit at start, limit at stop, with MHz and the unit in the heading.',
        ]}
        onDiscard={onDiscard}
      >
        <FileLines lines={file.recognition.preview} more={preview.lines} wrongLine={preview.refusal.line} />
      </RefusedFile>
    );

  const unit: LineUnit | null = preview?.unit ?? (answers.unit || null);
  const missing = [
    ...(preview && draft ? [] : ['the reading']),
    ...(preview?.questions ?? []).map((key) => QUESTION_WORDS[key]),
    ...(draft ? missingOfLine(draft, unit) : []),
  ];

  function revise(id: string | null) {
    setRevises(id);
    // Asked anew for the other line: its words, its sets.
    setDraft(null);
    setSetIds(null);
  }

  async function enter() {
    if (!draft || missing.length > 0 || !current) return;
    const outcome = await submit({ ...choice, ...lineBody(draft), unit, setIds: setIds ?? [] });
    if (outcome.ok) onEntered(outcome.reply);
  }

  return (
    <Sheet
      header={
        <SheetHeader
          title={before ? `Revision ${before.revision + 1} of a limit line` : 'A new limit line'}
          identity={
            <>
              {before && <span>{before.name}</span>}
              <span className="t-id">{file.name}</span>
              <span>{formatBytes(file.bytes)}</span>
            </>
          }
          finding={{
            verdict: missing.length === 0 ? 'under' : 'inconclusive',
            children: (
              <>
                {preview?.shape ? (
                  <>
                    Read as <b className="t-figure">{formatCount(preview.rows)}</b>{' '}
                    {preview.shape === 'segments' ? 'segments' : 'break points'}.
                  </>
                ) : (
                  'The file is being read.'
                )}{' '}
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
                <Button kind="primary" keyName="Enter" busy={busy || reading} onClick={enter}>
                  {before ? `Enter revision ${before.revision + 1}` : 'Enter the line'}
                </Button>
              )}
            </>
          }
        />
      }
    >
      <ProblemMessage problem={problem ?? previewProblem} className="mt-3" />
      <div className="mt-2 grid gap-x-7 gap-y-6 wide:grid-cols-[minmax(0,1fr)_minmax(0,402px)]">
        <div className="min-w-0">
          <LinePreviewed preview={preview} unit={unit} zone={zone} />
          <FileLines lines={file.recognition.preview} more={preview?.lines ?? []} wrongLine={null} />
        </div>
        <div className="grid content-start gap-4">
          <ReadAs
            preview={preview}
            answers={answers}
            onAnswer={(change) => setAnswers((now) => ({ ...now, ...change }))}
            lines={lines}
            revises={revises}
            onRevises={revise}
            errors={fieldErrors}
          />
          {draft && (
            <LineFields
              draft={draft}
              fixed={before !== null}
              sets={preview?.sets ?? []}
              setIds={setIds ?? []}
              onSets={setSetIds}
              onChange={(change) => setDraft((now) => now && { ...now, ...change })}
              errors={fieldErrors}
            />
          )}
        </div>
      </div>
    </Sheet>
  );
}
