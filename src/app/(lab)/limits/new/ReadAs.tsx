'use client';

import type { FieldErrors } from '@/components/forms/problem';
import { SelectField } from '@/components/ui/Field';
import { lineUnit, type LineUnit } from '@/schemas/common';
import { unitLabel } from '@/format/quantities';
import type { LimitLinePreview, LimitLineSummary } from '@/schemas/tables';

export interface Answers {
  frequencyUnit: 'Hz' | 'kHz' | 'MHz' | 'GHz' | '';
  unit: LineUnit | '';
  between: 'log-frequency' | 'linear-frequency' | 'hold' | '';
}

interface Props {
  preview: LimitLinePreview | null;
  answers: Answers;
  onAnswer: (change: Partial<Answers>) => void;
  lines: readonly LimitLineSummary[];
  revises: string | null;
  onRevises: (id: string | null) => void;
  errors: FieldErrors;
}

/** Which line it is, and what the file leaves open of how it is read. */
export function ReadAs({ preview, answers, onAnswer, lines, revises, onRevises, errors }: Props) {
  const asks = (key: keyof Answers) => preview?.questions.includes(key) || answers[key] !== '';
  const said = (field: string, label: string) => errors[field] && `${label} ${errors[field]}.`;
  return (
    <div className="grid gap-3 border-t-[1.5px] border-ink pt-2">
      <SelectField
        label="Enters as"
        value={revises ?? ''}
        error={said('revises', 'This')}
        onChange={(event) => onRevises(event.target.value || null)}
      >
        <option value="">a new line</option>
        {lines.map(({ id, name, revision }) => (
          <option key={id} value={id}>
            revision {revision + 1} of {name}
          </option>
        ))}
      </SelectField>
      {asks('frequencyUnit') && (
        <SelectField
          label="Frequencies in"
          value={answers.frequencyUnit}
          hint={`not stated; ${preview?.proposedFrequencyUnit ?? 'MHz'} is likely`}
          error={said('frequencyUnit', 'The unit')}
          onChange={(event) => onAnswer({ frequencyUnit: event.target.value as Answers['frequencyUnit'] })}
        >
          {answers.frequencyUnit === '' && <option value="">say which</option>}
          {['Hz', 'kHz', 'MHz', 'GHz'].map((unit) => (
            <option key={unit}>{unit}</option>
          ))}
        </SelectField>
      )}
      {preview?.unit ? (
        <p className="t-detail">
          Limits in <span className="t-figure">{unitLabel(preview.unit)}</span>, {preview.unitEvidence}.
        </p>
      ) : (
        <SelectField
          label="Limits in"
          value={answers.unit}
          hint="no line of the file states it"
          error={said('unit', 'The unit')}
          onChange={(event) => onAnswer({ unit: event.target.value as Answers['unit'] })}
        >
          {answers.unit === '' && <option value="">say which</option>}
          {lineUnit.options.map((unit) => (
            <option key={unit} value={unit}>
              {unitLabel(unit)}
            </option>
          ))}
        </SelectField>
      )}
      {asks('between') && (
        <SelectField
          label="Between two different limits"
          value={answers.between}
          hint="most standards mark it as decreasing with the logarithm of frequency"
          error={said('between', 'This')}
          onChange={(event) => onAnswer({ between: event.target.value as Answers['between'] })}
        >
          {answers.between === '' && <option value="">say which</option>}
          <option value="log-frequency">straight in log frequency</option>
          <option value="linear-frequency">straight in frequency</option>
          {preview?.shape === 'break-points' && <option value="hold">each holds until the next</option>}
        </SelectField>
      )}
    </div>
  );
}
