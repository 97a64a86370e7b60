'use client';

import { useId, type KeyboardEvent } from 'react';
import { VerdictGlyph } from '@/components/ui/VerdictGlyph';

interface Props {
  /** Which column, so that ↑ and ↓ stay in it. */
  cell: string;
  label: string;
  /** Tells the cell from the same one of other rows, when it is read out: `at 144.018 MHz, in dBµV`. */
  of: string;
  unit?: string;
  value: string;
  /** What Esc leaves; nothing, but for the frequency. */
  cleared?: string;
  /** What it was last, in grey. */
  last?: string;
  wrong?: string;
  text?: boolean;
  onChange: (value: string) => void;
}

/** One cell of a row: focused it is chosen whole, so that typing goes into it; Esc empties it. */
export function FinalCell(props: Props) {
  const { cell, label, of, unit, value, cleared = '', last, wrong, text = false, onChange } = props;
  const id = useId();
  function clear(event: KeyboardEvent) {
    if (event.key !== 'Escape' || value === cleared) return;
    event.preventDefault();
    onChange(cleared);
  }
  return (
    <div className={`final-cell final-${cell}${wrong ? ' field-wrong' : ''}`}>
      <label className="final-label" htmlFor={id}>
        {label}
        <span className="sr-only"> {of}</span>
      </label>
      <div className="field-box">
        <input
          id={id}
          className={text ? 'field-input' : 'field-input field-input-figure'}
          data-cell={cell}
          value={value}
          placeholder={last}
          inputMode={text ? undefined : 'decimal'}
          enterKeyHint="next"
          autoComplete="off"
          maxLength={text ? 160 : 24}
          {...(wrong && { 'aria-invalid': true, 'aria-describedby': `${id}-wrong` })}
          onFocus={(event) => event.target.select()}
          onKeyDown={clear}
          onChange={(event) => onChange(event.target.value)}
        />
        {unit && (
          <span className="field-end" aria-hidden>
            {unit}
          </span>
        )}
      </div>
      {wrong && (
        <p className="field-error" id={`${id}-wrong`}>
          <VerdictGlyph verdict="over" />
          <span>{wrong}</span>
        </p>
      )}
    </div>
  );
}
