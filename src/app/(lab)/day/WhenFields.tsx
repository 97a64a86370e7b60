'use client';

import { Field } from '@/components/ui/Field';
import { Switch } from '@/components/ui/Switch';
import type { TypedTime } from './typedSpan';

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
      <Field
        label={`${what}, time`}
        type="time"
        step={900}
        figure
        required
        value={value.time}
        onChange={(event) => onChange({ ...value, time: event.target.value })}
        error={problem}
      />
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
