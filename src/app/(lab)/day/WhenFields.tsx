'use client';

import { Field, SelectField } from '@/components/ui/Field';
import { Switch } from '@/components/ui/Switch';
import { QUARTER_MS } from '@/schemas/labTime';
import type { TypedTime } from './typedSpan';

/** A browser's own time field follows its language, with am and pm; the lab writes 24 h. */
const QUARTERS = Array.from({ length: 96 }, (_, i) => new Date(i * QUARTER_MS).toISOString().slice(11, 16));

interface Props {
  what: 'Start' | 'End';
  value: TypedTime;
  onChange: (value: TypedTime) => void;
  problem: string | null;
  twice: boolean;
}

/** Day and time on the lab's wall. In the hour that comes twice it asks which one is meant. */
export function WhenFields({ what, value, onChange, problem, twice }: Props) {
  return (
    <div className="grid grid-cols-2 items-start gap-3">
      <Field
        label={`${what}, day`}
        type="date"
        figure
        required
        value={value.day}
        onChange={(event) => onChange({ ...value, day: event.target.value })}
      />
      <SelectField
        label={`${what}, time`}
        value={value.time}
        onChange={(event) => onChange({ ...value, time: event.target.value })}
        error={problem}
      >
        {QUARTERS.map((time) => (
          <option key={time}>{time}</option>
        ))}
      </SelectField>
      {twice && (
        <Switch
          legend={`${value.time} comes twice that night`}
          shown
          value={value.second ? 'second' : 'first'}
          onChange={(chosen) => onChange({ ...value, second: chosen === 'second' })}
          choices={[
            { value: 'first', word: 'the first' },
            { value: 'second', word: 'the second' },
          ]}
          className="col-span-2"
        />
      )}
    </div>
  );
}
