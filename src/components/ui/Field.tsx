import { useId, type ComponentProps, type ReactNode } from 'react';
import { classes } from './classes';
import { KeyHint } from './KeyHint';
import { VerdictGlyph } from './VerdictGlyph';

interface FieldParts {
  label: ReactNode;
  hint?: ReactNode;
  /** What is wrong and what would be right: `Limit set is for 3 m or 10 m`. */
  error?: string | null;
  className?: string;
}

export interface FieldProps extends FieldParts, Omit<ComponentProps<'input'>, 'className'> {
  /** Inside at the right: m, °, dB. */
  unit?: string;
  /** Set in mono; what has a unit is. */
  figure?: boolean;
  /** 38 px, for sign-in. */
  tall?: boolean;
  /** Inside at the right, such as a `Show` button of a password. */
  end?: ReactNode;
  /** The key that puts the cursor here. */
  keyName?: string;
}

export function Field({
  label,
  hint,
  error,
  className,
  unit,
  figure = unit !== undefined,
  tall,
  end,
  keyName,
  id,
  ...input
}: FieldProps) {
  const own = useId();
  const inputId = id ?? own;
  return (
    <div className={classes('field', tall && 'field-tall', error && 'field-wrong', className)}>
      <label className="field-label" htmlFor={inputId}>
        {label}
        {unit && <span className="sr-only">, in {unit}</span>}
      </label>
      <div className="field-box">
        <input
          {...input}
          {...described(inputId, hint, error)}
          {...(keyName && { 'data-key': keyName, 'aria-keyshortcuts': keyName })}
          id={inputId}
          className={classes('field-input', figure && 'field-input-figure')}
        />
        {(unit || end || keyName) && (
          <span className="field-end">
            {unit && <span aria-hidden>{unit}</span>}
            {end}
            {keyName && <KeyHint name={keyName} />}
          </span>
        )}
      </div>
      <FieldNotes id={inputId} hint={hint} error={error} />
    </div>
  );
}

export interface SelectFieldProps extends FieldParts, Omit<ComponentProps<'select'>, 'className'> {
  keyName?: string;
}

/** The browser's own list under our frame; `children` are its options. */
export function SelectField({ label, hint, error, className, keyName, id, children, ...select }: SelectFieldProps) {
  const own = useId();
  const selectId = id ?? own;
  return (
    <div className={classes('field', error && 'field-wrong', className)}>
      <label className="field-label" htmlFor={selectId}>
        {label}
      </label>
      <div className="field-box">
        <select
          {...select}
          {...described(selectId, hint, error)}
          {...(keyName && { 'data-key': keyName, 'aria-keyshortcuts': keyName })}
          id={selectId}
          className="field-input"
        >
          {children}
        </select>
        <span className="field-arrow" aria-hidden>
          {keyName ? (
            <KeyHint name={keyName} />
          ) : (
            <svg width="10" height="6" viewBox="0 0 10 6">
              <path d="M1 .75 5 4.75 9 .75" fill="none" stroke="currentColor" strokeWidth="1.25" />
            </svg>
          )}
        </span>
      </div>
      <FieldNotes id={selectId} hint={hint} error={error} />
    </div>
  );
}

export interface AreaFieldProps extends FieldParts, Omit<ComponentProps<'textarea'>, 'className'> {}

/** Several lines of text: a note, a reason. */
export function AreaField({ label, hint, error, className, id, ...area }: AreaFieldProps) {
  const own = useId();
  const areaId = id ?? own;
  return (
    <div className={classes('field', error && 'field-wrong', className)}>
      <label className="field-label" htmlFor={areaId}>
        {label}
      </label>
      <div className="field-box">
        <textarea {...area} {...described(areaId, hint, error)} id={areaId} className="field-input" />
      </div>
      <FieldNotes id={areaId} hint={hint} error={error} />
    </div>
  );
}

/** What stands under a control; the control points at it by `described`. */
export function FieldNotes({ id, hint, error }: { id: string; hint?: ReactNode; error?: string | null }) {
  return (
    <>
      {error && (
        <p className="field-error" id={`${id}-error`}>
          <VerdictGlyph verdict="over" />
          <span>{error}</span>
        </p>
      )}
      {hint && (
        <p className="field-hint" id={`${id}-hint`}>
          {hint}
        </p>
      )}
    </>
  );
}

export function described(id: string, hint: ReactNode, error: string | null | undefined) {
  const by = classes(error && `${id}-error`, Boolean(hint) && `${id}-hint`);
  return { ...(by && { 'aria-describedby': by }), ...(error && { 'aria-invalid': true }) };
}
