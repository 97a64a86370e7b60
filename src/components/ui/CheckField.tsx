import { useId, type ComponentProps, type ReactNode } from 'react';
import { FieldNotes, described } from './Field';

export interface CheckFieldProps extends Omit<ComponentProps<'input'>, 'type' | 'className'> {
  label: ReactNode;
  hint?: ReactNode;
  error?: string | null;
}

/** One thing that is so or is not. */
export function CheckField({ label, hint, error, id, ...input }: CheckFieldProps) {
  const own = useId();
  const inputId = id ?? own;
  return (
    <div className="field">
      <label className="check" htmlFor={inputId}>
        <span className="check-box">
          <input {...input} {...described(inputId, hint, error)} id={inputId} type="checkbox" />
          <svg viewBox="0 0 16 16" aria-hidden>
            <path d="m3.5 8.25 3 3 6-6.5" fill="none" stroke="currentColor" strokeWidth="1.75" />
          </svg>
        </span>
        <span>{label}</span>
      </label>
      <FieldNotes id={inputId} hint={hint} error={error} />
    </div>
  );
}
