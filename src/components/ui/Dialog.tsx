'use client';

import { useId, useLayoutEffect, useRef, type ReactNode } from 'react';
import { Button } from './Button';

export interface DialogProps {
  open: boolean;
  title: ReactNode;
  children?: ReactNode;
  /** The word of the safe choice; it holds the focus first and Esc presses it. */
  safe?: string;
  onClose: () => void;
  /** The act itself, a primary button. */
  act?: ReactNode;
}

/** A sheet hanging on two threads from the top line, over the desk: only for acts that cannot be undone. */
export function Dialog({ open, title, children, safe = 'Not yet', onClose, act }: DialogProps) {
  const dialog = useRef<HTMLDialogElement>(null);
  const safeButton = useRef<HTMLButtonElement>(null);
  const id = useId();

  useLayoutEffect(() => {
    const element = dialog.current;
    if (!element || element.open === open) return;
    if (!open) return element.close();
    element.showModal();
    safeButton.current?.focus();
  }, [open]);

  return (
    <dialog
      ref={dialog}
      className="dialog"
      aria-labelledby={id}
      onCancel={(event) => {
        event.preventDefault();
        onClose();
      }}
      onClose={() => {
        if (open) onClose();
      }}
    >
      {open && (
        <div className="dialog-slip">
          <h2 className="dialog-title" id={id}>
            {title}
          </h2>
          {children && <div className="dialog-body">{children}</div>}
          <div className="dialog-acts">
            <Button ref={safeButton} keyName="Escape" onClick={onClose}>
              {safe}
            </Button>
            {act}
          </div>
        </div>
      )}
    </dialog>
  );
}
