'use client';

import { useId, useState, type ReactNode } from 'react';
import { Button, type ButtonKind } from '@/components/ui/Button';

export interface InPlaceAct {
  id: string;
  word: string;
  kind?: ButtonKind;
  /** A single key that opens it. */
  keyName?: string;
  form: (close: () => void) => ReactNode;
}

/** Buttons that each open their form below themselves; one at a time, and the focus comes back to the button. */
export function InPlace({ acts, size = 'page' }: { acts: readonly InPlaceAct[]; size?: 'page' | 'table' }) {
  const [open, setOpen] = useState<string | null>(null);
  const base = useId();
  const chosen = acts.find(({ id }) => id === open);
  const close = (id: string) => {
    setOpen(null);
    // After the form is gone; its button may be gone with it.
    setTimeout(() => document.getElementById(`${base}-${id}`)?.focus(), 0);
  };
  return (
    <div>
      <div className="flex flex-wrap items-center gap-2">
        {acts.map(({ id, word, kind = 'plain', keyName }) => (
          <Button
            key={id}
            id={`${base}-${id}`}
            kind={kind}
            size={size}
            keyName={keyName}
            aria-expanded={id === open}
            onClick={() => setOpen(id === open ? null : id)}
          >
            {word}
          </Button>
        ))}
      </div>
      {chosen && <div key={chosen.id}>{chosen.form(() => close(chosen.id))}</div>}
    </div>
  );
}
