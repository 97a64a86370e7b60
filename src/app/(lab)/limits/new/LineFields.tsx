'use client';

import type { FieldErrors } from '@/components/forms/problem';
import { AreaField, Field, SelectField } from '@/components/ui/Field';
import { CheckField } from '@/components/ui/CheckField';
import { lineDetector } from '@/schemas/common';
import { DETECTOR_WORDS } from '@/format/words';
import type { LimitLinePreview } from '@/schemas/tables';
import { BASES, PORTS_OF_LINES, type LineDraft } from './lineDraft';

interface Props {
  draft: LineDraft;
  /** A revision: detector, bandwidth and distance are those of the line. */
  fixed: boolean;
  sets: LimitLinePreview['sets'];
  setIds: readonly string[];
  onSets: (ids: string[]) => void;
  onChange: (change: Partial<LineDraft>) => void;
  errors: FieldErrors;
}

/** What the line is, where it is printed, how sure that is, and which sets follow it. */
export function LineFields({ draft, fixed, sets, setIds, onSets, onChange, errors }: Props) {
  const said = (field: string, label: string) => errors[field] && `${label} ${errors[field]}.`;
  const word = (field: keyof LineDraft, label: string, most: number, hint?: string, list?: readonly string[]) => (
    <Field
      label={label}
      value={draft[field]}
      maxLength={most}
      autoComplete="off"
      hint={hint}
      list={list && `list-${field}`}
      error={said(field, label)}
      onChange={(event) => onChange({ [field]: event.target.value })}
    />
  );
  return (
    <fieldset className="grid gap-3 border-t-[1.5px] border-ink pt-2">
      <legend className="sr-only">What the line is</legend>
      {word('name', 'Name', 200, 'As it is offered for a set')}
      {word('document', 'Document', 160, 'With its edition, as in CISPR 32:2015')}
      <div className="grid grid-cols-2 gap-2.5">
        {word('class', 'Class', 120)}
        {word('port', 'Port', 120, undefined, PORTS_OF_LINES)}
        <SelectField
          label="Detector"
          value={draft.detector}
          disabled={fixed}
          error={said('detector', 'Detector')}
          onChange={(event) => onChange({ detector: event.target.value as LineDraft['detector'] })}
        >
          {draft.detector === '' && <option value="">say which</option>}
          {lineDetector.options.map((detector) => (
            <option key={detector} value={detector}>
              {DETECTOR_WORDS[detector]}
            </option>
          ))}
        </SelectField>
        <Field
          label="Bandwidth"
          unit="kHz"
          inputMode="decimal"
          value={draft.bandwidthKhz}
          readOnly={fixed}
          error={said('bandwidthHz', 'Bandwidth')}
          onChange={(event) => onChange({ bandwidthKhz: event.target.value })}
        />
        <Field
          label="Distance"
          unit="m"
          inputMode="decimal"
          value={draft.distanceM}
          readOnly={fixed}
          hint={fixed ? undefined : 'empty for a conducted line'}
          error={said('distanceM', 'Distance')}
          onChange={(event) => onChange({ distanceM: event.target.value })}
        />
      </div>
      {word('source', 'Source', 300, 'Table and page, as in: Table A.4, row A4.2')}
      <SelectField
        label="How sure it is"
        value={draft.basis}
        error={said('basis', 'Basis')}
        hint={draft.basis === 'verified' ? 'You have the text before you and compared every figure.' : undefined}
        onChange={(event) => onChange({ basis: event.target.value })}
      >
        {draft.basis === '' && <option value="">say which</option>}
        {[...new Set([...(draft.basis === '' ? [] : [draft.basis]), ...BASES])].map((basis) => (
          <option key={basis}>{basis}</option>
        ))}
      </SelectField>
      <AreaField
        label="Reason"
        value={draft.reason}
        maxLength={300}
        rows={2}
        hint="As in: new edition, or a typing error in the second segment"
        error={said('reason', 'Reason')}
        onChange={(event) => onChange({ reason: event.target.value })}
      />
      <datalist id="list-port">
        {PORTS_OF_LINES.map((port) => (
          <option key={port} value={port} />
        ))}
      </datalist>
      {sets.length > 0 && (
        <fieldset>
          <legend className="field-label">Sets that follow</legend>
          <p className="t-detail">
            A set that follows gets its next revision; the one before takes no new run and stays readable. Runs keep
            theirs.
          </p>
          {sets.map(({ id, name, revision }) => (
            <CheckField
              key={id}
              label={`${name}, to revision ${revision + 1}`}
              checked={setIds.includes(id)}
              onChange={(event) => onSets(event.target.checked ? [...setIds, id] : setIds.filter((one) => one !== id))}
            />
          ))}
        </fieldset>
      )}
    </fieldset>
  );
}
