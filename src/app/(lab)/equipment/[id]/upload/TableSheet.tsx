'use client';

import { useState } from 'react';
import { FilePreview } from '@/app/(lab)/sweeps/new/FilePreview';
import { ProblemMessage } from '@/components/forms/ProblemMessage';
import { usePreviewOf } from '@/components/forms/usePreviewOf';
import { useSubmit } from '@/components/forms/useSubmit';
import { Sheet } from '@/components/shell/Sheet';
import { SheetHeader } from '@/components/shell/SheetHeader';
import { Button } from '@/components/ui/Button';
import { SelectField } from '@/components/ui/Field';
import { SectionHeading } from '@/components/ui/SectionHeading';
import { formatBytes, formatCount } from '@/format/quantities';
import { countInWords } from '@/format/words';
import type { SweepFileView } from '@/schemas/sweepFile';
import type { EnteredFactorTables, FactorTablePreview } from '@/schemas/tables';
import { TABLE_WRITES } from '../../writes';
import { CalibrationFields } from './CalibrationFields';
import { RefusedTable } from './RefusedTable';
import { TableFields } from './TableFields';
import { TablePreviewed } from './TablePreviewed';
import {
  choiceTables,
  draftsFor,
  missingOf,
  nameOf,
  type CalibrationDraft,
  type ChosenDraft,
  type UploadFor,
} from './tableDraft';

interface Props extends UploadFor {
  file: SweepFileView;
  onDiscard: () => void;
  onEntered: (entered: EnteredFactorTables) => void;
}

const UNITS = ['Hz', 'kHz', 'MHz', 'GHz'] as const;

/** What was read, beside the revision it would follow, and what a person has to say before it is entered. */
export function TableSheet({ file, item, named, zone, onDiscard, onEntered }: Props) {
  const [frequencyUnit, setFrequencyUnit] = useState<(typeof UNITS)[number] | ''>('');
  const [drafts, setDrafts] = useState<ChosenDraft[] | null>(null);
  const [calibration, setCalibration] = useState<CalibrationDraft>({
    ...{ id: item.calibrations.length === 0 ? 'new' : '', certificate: '', laboratory: '' },
    ...{ calibratedOn: '', dueOn: '' },
  });
  const [source, setSource] = useState<string | null>(null);
  const [reason, setReason] = useState('');
  const { submit, busy, problem, fieldErrors } = useSubmit<unknown, EnteredFactorTables>(
    TABLE_WRITES.enterFactorTables,
  );
  const tables = choiceTables(drafts ?? []);
  const choice = { fileId: file.id, equipmentId: item.id, frequencyUnit: frequencyUnit || null, tables };
  const asked = usePreviewOf<FactorTablePreview>(TABLE_WRITES.previewFactorTable.path, choice);
  const preview = asked.reply;
  if (preview && drafts === null && preview.tablesInFile.length > 0) {
    setDrafts(draftsFor(preview.tablesInFile, named, item));
    if (preview.source !== null) setSource(preview.source);
  }
  if (preview?.refusal) return <RefusedTable file={file} refusal={preview.refusal} item={item} onDiscard={onDiscard} />;

  const said = source ?? '';
  const questions = preview?.questions ?? [];
  const used = (drafts ?? []).filter(({ use }) => use);
  const missing = [
    ...(preview && drafts ? [] : ['the reading']),
    ...(questions.some(({ key }) => key === 'frequencyUnit') ? ['the unit of the frequencies'] : []),
    ...(drafts && used.length === 0 ? ['a table'] : []),
    ...(used.some((draft) => nameOf(draft) === '') ? ['the name'] : []),
    ...(questions.some(({ key }) => key === 'lossOrGain') ? ['loss or gain'] : []),
    ...(questions.some(({ key }) => key === 'quantity') ? ['what the figures are'] : []),
    ...missingOf(calibration, said, reason),
  ];
  const shown = preview?.tables.filter(({ index }) => used.some((draft) => draft.index === index)) ?? [];
  const only = shown.length === 1 ? shown[0]! : null;

  async function enter() {
    if (!preview || missing.length > 0 || !asked.current) return;
    const { id, certificate, laboratory, calibratedOn, dueOn } = calibration;
    const outcome = await submit({
      ...choice,
      tables: tables.map((table) => {
        const before = preview.tables.find(({ index }) => index === table.index)?.before;
        return { ...table, revises: before?.id ?? null };
      }),
      calibration: id === 'new' ? { certificate, laboratory, calibratedOn, dueOn: dueOn || null } : { id },
      source: said,
      reason,
    });
    if (outcome.ok) onEntered(outcome.reply);
  }

  const act = only
    ? only.before
      ? `Enter revision ${only.before.revision + 1} of ${only.name}`
      : `Enter ${only.name}`
    : `Enter ${countInWords(shown.length)} tables`;
  return (
    <Sheet
      header={
        <SheetHeader
          title={`A factor table of ${item.identifier}`}
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
                {preview && drafts ? <Read preview={preview} /> : 'The file is being read.'}{' '}
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
                <Button kind="primary" keyName="Enter" busy={busy || asked.busy} onClick={enter}>
                  {act}
                </Button>
              )}
            </>
          }
        />
      }
    >
      <ProblemMessage problem={problem ?? asked.problem} className="mt-3" />
      <div className="mt-2 grid gap-x-7 gap-y-6 wide:grid-cols-[minmax(0,1fr)_minmax(0,402px)]">
        <div className="min-w-0">
          {shown.map((table) => (
            <TablePreviewed key={table.index} table={table} zone={zone} />
          ))}
          <SectionHeading className="mt-5" remark={`${formatCount(file.recognition.frequency.points)} rows`}>
            The file
          </SectionHeading>
          <FilePreview recognition={file.recognition} />
        </div>
        <div className="grid content-start gap-4">
          {file.recognition.frequency.unit === null && (
            <SelectField
              label="Frequencies in"
              value={frequencyUnit}
              hint={`not stated; ${preview?.proposedFrequencyUnit ?? file.recognition.frequency.proposedUnit} is likely`}
              onChange={(event) => setFrequencyUnit(event.target.value as typeof frequencyUnit)}
            >
              {frequencyUnit === '' && <option value="">say which</option>}
              {UNITS.map((unit) => (
                <option key={unit}>{unit}</option>
              ))}
            </SelectField>
          )}
          {drafts?.map((draft, i) => (
            <TableFields
              key={draft.index}
              draft={draft}
              inFile={preview!.tablesInFile.find(({ index }) => index === draft.index)!}
              several={drafts.length > 1}
              named={named}
              asks={questions.find(({ tableIndex }) => tableIndex === draft.index)?.text ?? null}
              errors={fieldErrors}
              place={used.indexOf(draft)}
              onChange={(change) =>
                setDrafts((before) => before!.map((one, at) => (at === i ? { ...one, ...change } : one)))
              }
            />
          ))}
          <CalibrationFields
            item={item}
            value={calibration}
            onChange={(change) => setCalibration((before) => ({ ...before, ...change }))}
            source={said}
            onSource={setSource}
            reason={reason}
            onReason={setReason}
            errors={fieldErrors}
          />
        </div>
      </div>
    </Sheet>
  );
}

function Read({ preview }: { preview: FactorTablePreview }) {
  const { tablesInFile } = preview;
  const [first] = tablesInFile;
  if (tablesInFile.length === 1 && first)
    return (
      <>
        Read as one table of <b className="t-figure">{formatCount(first.rows)}</b> rows.
      </>
    );
  return <>Read as {countInWords(tablesInFile.length)} tables.</>;
}
