'use client';

import type { FieldErrors } from '@/components/forms/problem';
import { CheckField } from '@/components/ui/CheckField';
import { Field, SelectField } from '@/components/ui/Field';
import { formatFrequencyRange } from '@/format/frequencies';
import { formatCount } from '@/format/quantities';
import { QUANTITY_USES, QUANTITY_WORDS } from '@/format/revisions';
import { factorQuantity, type FactorTablePreview, type FactorTableSummary } from '@/schemas/tables';
import type { ChosenDraft } from './tableDraft';

interface Props {
  draft: ChosenDraft;
  inFile: FactorTablePreview['tablesInFile'][number];
  /** The file holds more than this one. */
  several: boolean;
  named: readonly FactorTableSummary[];
  /** What is asked where the table does not say what its figures are. */
  asks: string | null;
  errors: FieldErrors;
  /** Among the tables that are entered, for the errors of its fields. */
  place: number;
  onChange: (change: Partial<ChosenDraft>) => void;
}

/** As what one table of the file is entered. */
export function TableFields({ draft, inFile, several, named, asks, errors, place, onChange }: Props) {
  const error = (field: string, label: string) => {
    const message = errors[`tables/${place}/${field}`];
    return message && `${label} ${message}.`;
  };
  const before = named.find(({ name }) => name === draft.revises);
  const antenna = (inFile.quantity ?? draft.quantity) === 'antenna-factor';
  return (
    <fieldset className="grid gap-3 border-t-[1.5px] border-ink pt-2">
      <legend className="sr-only">{inFile.heading}</legend>
      {several ? (
        <CheckField
          label={
            <>
              <b>{inFile.heading}</b>, {formatCount(inFile.rows)} rows,{' '}
              {formatFrequencyRange(inFile.firstHz, inFile.lastHz)}
            </>
          }
          checked={draft.use}
          onChange={(event) => onChange({ use: event.target.checked })}
        />
      ) : (
        <p className="t-text">
          Written as <b>{inFile.heading}</b>
        </p>
      )}
      {draft.use && (
        <>
          <SelectField
            label="Enters as"
            value={draft.revises}
            error={error('name', 'Name')}
            onChange={(event) => {
              const next = named.find(({ name }) => name === event.target.value);
              onChange({
                revises: event.target.value,
                ...(next && { polarisation: next.polarisation ?? '', distanceM: String(next.distanceM ?? '') }),
                ...(next && inFile.quantity === null && { quantity: next.quantity }),
              });
            }}
          >
            <option value="">a new table</option>
            {named.map(({ id, name, revision }) => (
              <option key={id} value={name}>
                revision {revision + 1} of {name}
              </option>
            ))}
          </SelectField>
          {draft.revises === '' && (
            <Field
              label="Name"
              value={draft.newName}
              maxLength={120}
              autoComplete="off"
              hint="Under this name its next revisions follow"
              error={error('name', 'Name')}
              onChange={(event) => onChange({ newName: event.target.value })}
            />
          )}
          {inFile.quantity === null ? (
            <SelectField
              label="Its figures are"
              value={draft.quantity}
              error={error('quantity', 'The quantity')}
              hint={asks ?? undefined}
              onChange={(event) => onChange({ quantity: event.target.value as ChosenDraft['quantity'] })}
            >
              {draft.quantity === '' && <option value="">say which</option>}
              {factorQuantity.options.map((quantity) => (
                <option key={quantity} value={quantity}>
                  {QUANTITY_WORDS[quantity]}, {QUANTITY_USES[quantity]}
                </option>
              ))}
            </SelectField>
          ) : (
            <p className="t-detail">
              Read as {QUANTITY_WORDS[inFile.quantity]}, by its heading and its signs.
              {error('quantity', 'The quantity') && (
                <span className="block text-madder">{error('quantity', 'The quantity')}</span>
              )}
            </p>
          )}
          {(antenna || before?.polarisation || draft.polarisation !== '') && (
            <div className="grid grid-cols-2 gap-2.5">
              <SelectField
                label="Polarisation"
                value={draft.polarisation}
                error={error('polarisation', 'Polarisation')}
                onChange={(event) => onChange({ polarisation: event.target.value as ChosenDraft['polarisation'] })}
              >
                <option value="">either</option>
                <option value="horizontal">horizontal</option>
                <option value="vertical">vertical</option>
              </SelectField>
              <Field
                label="Distance"
                unit="m"
                inputMode="decimal"
                value={draft.distanceM}
                error={error('distanceM', 'Distance')}
                onChange={(event) => onChange({ distanceM: event.target.value })}
              />
            </div>
          )}
        </>
      )}
    </fieldset>
  );
}
