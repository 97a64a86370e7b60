import { useId, type ReactNode } from 'react';
import { classes } from './classes';
import { FieldNotes, described } from './Field';

export interface SwitchChoice<Value extends string> {
  value: Value;
  word: string;
}

export interface SwitchProps<Value extends string> {
  /** Says what is chosen; shown above only with `shown`. */
  legend: string;
  shown?: boolean;
  name?: string;
  choices: readonly SwitchChoice<Value>[];
  value?: Value;
  defaultValue?: Value;
  onChange?: (value: Value) => void;
  required?: boolean;
  hint?: ReactNode;
  error?: string | null;
  /** Fills its place, the words sharing it evenly. */
  full?: boolean;
  className?: string;
}

/** Two or three words in one frame, one of them chosen: a group of radio buttons. Works in a form without a script. */
export function Switch<Value extends string>({
  legend,
  shown = false,
  name,
  choices,
  value,
  defaultValue,
  onChange,
  required,
  hint,
  error,
  full,
  className,
}: SwitchProps<Value>) {
  const id = useId();
  const frame = (
    <span className="switch-frame">
      {choices.map((choice) => (
        <label key={choice.value} className="switch-choice">
          <input
            type="radio"
            name={name ?? id}
            value={choice.value}
            required={required}
            {...(value === undefined
              ? { defaultChecked: choice.value === defaultValue }
              : { checked: choice.value === value })}
            onChange={onChange ? () => onChange(choice.value) : value === undefined ? undefined : ignored}
          />
          <span data-word={choice.word}>{choice.word}</span>
        </label>
      ))}
    </span>
  );
  return (
    <fieldset
      className={classes(shown ? 'field' : 'switch', full && 'switch-full', error && 'field-wrong', className)}
      aria-describedby={described(id, hint, error)['aria-describedby']}
    >
      <legend className={shown ? 'field-label' : 'sr-only'}>{legend}</legend>
      {shown ? <span className="flex">{frame}</span> : frame}
      <FieldNotes id={id} hint={hint} error={error} />
    </fieldset>
  );
}

function ignored() {
  // A controlled radio without a listener is read-only on purpose; React asks for a listener all the same.
}
