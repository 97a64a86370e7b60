'use client';

import type { FieldErrors } from '@/components/forms/problem';
import { AreaField, Field, SelectField } from '@/components/ui/Field';
import { formatDay } from '@/format/dates';
import type { EquipmentRecord } from '@/schemas/bench';
import type { CalibrationDraft } from './tableDraft';

interface Props {
  item: EquipmentRecord;
  value: CalibrationDraft;
  onChange: (change: Partial<CalibrationDraft>) => void;
  source: string;
  onSource: (source: string) => void;
  reason: string;
  onReason: (reason: string) => void;
  errors: FieldErrors;
}

/** Which calibration the figures are from, where they are printed, and why they are entered. */
export function CalibrationFields({ item, value, onChange, source, onSource, reason, onReason, errors }: Props) {
  const said = (field: string, label: string) => errors[field] && `${label} ${errors[field]}.`;
  return (
    <fieldset className="grid gap-3 border-t-[1.5px] border-ink pt-2">
      <legend className="sr-only">Calibration and source</legend>
      <SelectField
        label="Calibration"
        value={value.id}
        error={said('calibration/id', 'This')}
        onChange={(event) => onChange({ id: event.target.value })}
      >
        {value.id === '' && <option value="">say which</option>}
        <option value="new">a new one</option>
        {item.calibrations.map(({ id, certificate, calibratedOn }) => (
          <option key={id} value={id}>
            {certificate}, {formatDay(calibratedOn)}
          </option>
        ))}
      </SelectField>
      {value.id === 'new' && (
        <>
          <Field
            label="Certificate"
            value={value.certificate}
            maxLength={80}
            autoComplete="off"
            error={said('calibration/certificate', 'Certificate')}
            onChange={(event) => onChange({ certificate: event.target.value })}
          />
          <Field
            label="Laboratory"
            value={value.laboratory}
            maxLength={120}
            autoComplete="off"
            error={said('calibration/laboratory', 'Laboratory')}
            onChange={(event) => onChange({ laboratory: event.target.value })}
          />
          <div className="grid grid-cols-2 gap-2.5">
            <Field
              label="Calibrated on"
              type="date"
              value={value.calibratedOn}
              error={said('calibration/calibratedOn', 'The day')}
              onChange={(event) => onChange({ calibratedOn: event.target.value })}
            />
            <Field
              label="Due on"
              type="date"
              value={value.dueOn}
              hint="empty: no due date"
              error={said('calibration/dueOn', 'The day')}
              onChange={(event) => onChange({ dueOn: event.target.value })}
            />
          </div>
        </>
      )}
      <Field
        label="Source"
        value={source}
        maxLength={300}
        autoComplete="off"
        hint="Where the figures are printed, as in: certificate C-12, table 4"
        error={said('source', 'Source')}
        onChange={(event) => onSource(event.target.value)}
      />
      <AreaField
        label="Reason"
        value={reason}
        maxLength={300}
        rows={2}
        hint="As in: yearly calibration, or a typing error in row 7"
        error={said('reason', 'Reason')}
        onChange={(event) => onReason(event.target.value)}
      />
    </fieldset>
  );
}
