'use client';

import { useState } from 'react';
import { formatFrequency } from '@/format/frequencies';
import { parseFrequency } from './parseFrequency';

/** `harmonics of 12.000 MHz`: the clock is typed in place; Enter or leaving the field draws it, Esc takes it back. */
export function ClockField({
  clockHz,
  onClock,
}: {
  clockHz: number | null;
  onClock: (clockHz: number | null) => void;
}) {
  const shown = clockHz === null ? '' : formatFrequency(clockHz);
  const [typed, setTyped] = useState<string | null>(null);
  const text = typed ?? shown;
  const wrong = typed !== null && typed.trim() !== '' && parseFrequency(typed) === null;

  function keep() {
    if (typed === null || wrong) return;
    const next = typed.trim() === '' ? null : parseFrequency(typed);
    setTyped(null);
    if (next !== clockHz) onClock(next);
  }

  return (
    <label className="inline-flex items-baseline gap-1.5 whitespace-nowrap text-ink2">
      <svg width="16" height="12" viewBox="0 0 16 12" aria-hidden className="self-center">
        <path d="M1.5 1v10M5.5 1v6M9.5 1v10M13.5 1v6" className="stroke-pen" strokeWidth="1.3" fill="none" />
      </svg>
      harmonics of
      <input
        type="text"
        inputMode="decimal"
        size={Math.max(9, text.length)}
        value={text}
        placeholder="name a clock"
        aria-label="Harmonics of this clock frequency, MHz unless another unit is given"
        aria-invalid={wrong}
        onFocus={(event) => event.currentTarget.select()}
        onChange={(event) => setTyped(event.currentTarget.value)}
        onBlur={keep}
        onKeyDown={(event) => {
          if (event.key === 'Enter') keep();
          if (event.key === 'Escape' && typed !== null) {
            event.stopPropagation();
            setTyped(null);
          }
        }}
        className={`t-figure w-auto border-b border-dotted bg-transparent [field-sizing:content] placeholder:font-sans placeholder:tracking-normal placeholder:text-pen placeholder:[word-spacing:normal] ${
          wrong ? 'border-madder text-madder' : 'border-rule2 text-pen'
        }`}
      />
    </label>
  );
}
