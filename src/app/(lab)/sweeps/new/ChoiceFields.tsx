'use client';

import { mainsLine, type MainsLine, type Polarisation, type Port, type Purpose } from '@/schemas/common';
import { CheckField } from '@/components/ui/CheckField';
import { Field, SelectField } from '@/components/ui/Field';
import { Switch } from '@/components/ui/Switch';
import { MAINS_LINE_WORDS, PORT_WORDS } from '@/format/words';
import type { SweepFileView } from '@/schemas/sweepFile';
import { rangeOf } from './draft';
import type { Draft } from './draftTypes';
import { proposedCorrected, proposedLimitSet, proposedPath } from './proposed';
import { TraceFields } from './TraceFields';
import type { UploadLists } from './uploadLists';

interface Props {
  file: SweepFileView;
  draft: Draft;
  lists: UploadLists;
  errors: Readonly<Record<string, string>>;
  onDraft: (change: (before: Draft) => Draft) => void;
  /** One of several sweeps was chosen. */
  onSweep: (index: number) => void;
}

/** Everything a person says about the file, most of it proposed already. */
export function ChoiceFields({ file, draft, lists, errors, onDraft, onSweep }: Props) {
  const set = (change: Partial<Draft>) => onDraft((before) => ({ ...before, ...change }));
  const { recognition, asBefore: before } = file;
  const path = lists.paths.find(({ id }) => id === draft.pathId);
  const radiated = draft.port === 'enclosure';

  function choosePort(port: Port) {
    const { firstHz, lastHz } = rangeOf(draft, file);
    const pathId = proposedPath(lists.paths, port, firstHz, lastHz);
    const proposed = lists.paths.find(({ id }) => id === pathId);
    const limitSetId = proposedLimitSet(lists.limitSets, port, [firstHz, lastHz], proposed);
    const distance = lists.limitSets.find(({ id }) => id === limitSetId)?.distanceM;
    const alreadyCorrected = proposedCorrected(file, proposed);
    set({ port, pathId, limitSetId, distanceM: String(distance ?? ''), alreadyCorrected });
  }
  function choosePath(pathId: string) {
    set({
      pathId,
      alreadyCorrected: proposedCorrected(
        file,
        lists.paths.find(({ id }) => id === pathId),
      ),
    });
  }
  function chooseLimitSet(limitSetId: string) {
    const distance = lists.limitSets.find(({ id }) => id === limitSetId)?.distanceM;
    set({ limitSetId, distanceM: String(distance ?? draft.distanceM) });
  }

  return (
    <div className="grid gap-3.5">
      <SelectField
        label="Sample and state"
        keyName="1"
        value={draft.stateId}
        error={errors.stateId}
        onChange={(event) => set({ stateId: event.target.value })}
      >
        {draft.stateId === '' && <option value="">say which</option>}
        {lists.samples.map((sample) => (
          <optgroup
            key={sample.id}
            label={`${sample.product.code} ${sample.code}, ${sample.organisation.name}, ${sample.job.number}`}
          >
            {sample.states.map((state) => (
              <option key={state.id} value={state.id} disabled={state.planned}>
                {sample.product.code} {sample.code} {state.label}: {state.description}
                {state.planned ? ' (planned)' : ''}
              </option>
            ))}
          </optgroup>
        ))}
      </SelectField>
      <Switch<Port>
        legend="Port"
        shown
        full
        choices={(['enclosure', 'ac-mains'] as const).map((value) => ({ value, word: PORT_WORDS[value] }))}
        value={draft.port}
        onChange={choosePort}
      />
      <SelectField
        label="Signal path"
        keyName="2"
        value={draft.pathId}
        error={errors.pathId}
        hint={
          draft.pathId === ''
            ? 'Without a path no factor and no uncertainty is known; nothing is concluded.'
            : before && draft.pathId === before.pathId
              ? `As in ${before.run.number}, the last file of this shape.`
              : 'Proposed from the port and the range.'
        }
        onChange={(event) => choosePath(event.target.value)}
      >
        <option value="">none</option>
        {lists.paths
          .filter((candidate) => candidate.port === draft.port)
          .map((candidate) => (
            <option key={candidate.id} value={candidate.id}>
              {candidate.code} {candidate.name}
            </option>
          ))}
      </SelectField>
      <SelectField
        label="Limit set"
        keyName="3"
        value={draft.limitSetId}
        error={errors.limitSetId}
        hint={before && draft.limitSetId === before.limitSetId ? `As in ${before.run.number}.` : undefined}
        onChange={(event) => chooseLimitSet(event.target.value)}
      >
        {draft.limitSetId === '' && <option value="">say which</option>}
        {lists.limitSets
          .filter((candidate) => candidate.port === draft.port)
          .map((candidate) => (
            <option key={candidate.id} value={candidate.id}>
              {candidate.name}
            </option>
          ))}
      </SelectField>
      {radiated ? (
        <div className="grid grid-cols-2 gap-2.5">
          <Switch<Polarisation>
            legend="Polarisation"
            shown
            full
            choices={[
              { value: 'horizontal', word: 'H' },
              { value: 'vertical', word: 'V' },
            ]}
            value={draft.polarisation === '' ? undefined : draft.polarisation}
            onChange={(value) => set({ polarisation: value })}
            error={errors.polarisation}
          />
          <Field
            label="Distance"
            unit="m"
            inputMode="decimal"
            value={draft.distanceM}
            error={errors.distanceM}
            onChange={(event) => set({ distanceM: event.target.value })}
          />
          <Field
            label="Height"
            unit="m"
            inputMode="decimal"
            value={draft.heightM}
            error={errors.heightM}
            onChange={(event) => set({ heightM: event.target.value })}
          />
          <Field
            label="Azimuth"
            unit="°"
            inputMode="decimal"
            value={draft.azimuthDeg}
            error={errors.azimuthDeg}
            onChange={(event) => set({ azimuthDeg: event.target.value })}
          />
          <CheckField
            label="Height swept, maximum held"
            checked={draft.heightSwept}
            onChange={(event) => set({ heightSwept: event.target.checked })}
          />
        </div>
      ) : (
        <SelectField
          label="Line"
          value={draft.line}
          error={errors.line}
          onChange={(event) => set({ line: event.target.value as MainsLine })}
        >
          {draft.line === '' && <option value="">say which conductor</option>}
          {mainsLine.options.map((line) => (
            <option key={line} value={line}>
              {MAINS_LINE_WORDS[line]}
            </option>
          ))}
        </SelectField>
      )}
      <Switch<Purpose>
        legend="Purpose"
        shown
        full
        choices={[
          { value: 'prescan', word: 'Prescan' },
          { value: 'final', word: 'Final' },
          { value: 'ambient', word: 'Ambient' },
        ]}
        value={draft.purpose}
        onChange={(purpose) => set({ purpose })}
        hint={draft.purpose === 'ambient' ? 'With the EUT off; it never judges the sample.' : undefined}
      />
      <Field
        label="Operating mode"
        value={draft.operatingMode}
        error={errors.operatingMode}
        maxLength={120}
        placeholder="what the EUT was doing"
        onChange={(event) => set({ operatingMode: event.target.value })}
      />
      <Field
        label="Trial, if it is one"
        value={draft.trial}
        error={errors.trial}
        maxLength={120}
        list="trial-words"
        placeholder="foil on lid"
        hint={
          draft.trial.trim() === ''
            ? 'A quick trial under this state, named by what was tried.'
            : 'A trial never speaks for its state: it counts for no verdict of the port.'
        }
        onChange={(event) => set({ trial: event.target.value })}
      />
      <datalist id="trial-words">
        {lists.trials.map((trial) => (
          <option key={trial} value={trial} />
        ))}
      </datalist>
      <Switch<Draft['valuesHold']>
        legend="Values are"
        shown
        choices={[
          { value: 'receiver-input', word: 'receiver input' },
          { value: 'field', word: 'field strength' },
        ]}
        value={draft.valuesHold}
        onChange={(valuesHold) => set({ valuesHold })}
        hint={
          draft.valuesHold === 'field'
            ? 'No factor is added.'
            : path
              ? `Factors for ${path.code} are added once, here.`
              : undefined
        }
      />
      {draft.valuesHold === 'receiver-input' && path && path.terms.length > 0 && (
        <fieldset>
          <legend className="field-label">Already in the reading</legend>
          <div className="flex flex-wrap gap-x-5 gap-y-1">
            {path.terms.map((term) => (
              <CheckField
                key={term.id}
                label={`${term.identifier}, ${term.name}`}
                checked={draft.alreadyCorrected.includes(term.id)}
                onChange={(event) =>
                  set({
                    alreadyCorrected: event.target.checked
                      ? [...draft.alreadyCorrected, term.id]
                      : draft.alreadyCorrected.filter((id) => id !== term.id),
                  })
                }
              />
            ))}
          </div>
        </fieldset>
      )}
      <div className="grid grid-cols-2 gap-2.5">
        <SelectField
          label="Frequencies in"
          value={draft.frequencyUnit}
          error={errors.frequencyUnit}
          hint={
            draft.frequencyUnit === ''
              ? `not stated; ${recognition.frequency.proposedUnit} is likely`
              : recognition.frequency.unit === null && before?.frequencyUnit === draft.frequencyUnit
                ? `not stated; as in ${before.run.number}`
                : undefined
          }
          onChange={(event) => set({ frequencyUnit: event.target.value as Draft['frequencyUnit'] })}
        >
          {draft.frequencyUnit === '' && <option value="">say which</option>}
          {(['Hz', 'kHz', 'MHz', 'GHz'] as const).map((unit) => (
            <option key={unit} value={unit}>
              {unit}
            </option>
          ))}
        </SelectField>
        {recognition.frequency.offset && (
          <Field
            label="Centre frequency"
            unit="MHz"
            inputMode="decimal"
            value={draft.centreMhz}
            error={errors.centreHz}
            onChange={(event) => set({ centreMhz: event.target.value })}
          />
        )}
        {recognition.sweeps.length > 1 && (
          <SelectField
            label="Which sweep"
            value={draft.sweepIndex}
            onChange={(event) => event.target.value !== '' && onSweep(Number(event.target.value))}
          >
            {draft.sweepIndex === '' && <option value="">say which</option>}
            {recognition.sweeps.map((sweep, i) => (
              <option key={i} value={i}>
                {sweep.name}
              </option>
            ))}
          </SelectField>
        )}
      </div>
      <TraceFields
        file={file}
        traces={draft.traces}
        errors={errors}
        onChange={(index, change) =>
          onDraft((before) => ({
            ...before,
            traces: before.traces.map((trace) => (trace.index === index ? { ...trace, ...change } : trace)),
          }))
        }
      />
    </div>
  );
}
