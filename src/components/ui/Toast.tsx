'use client';

import { useEffect, useState, useSyncExternalStore } from 'react';
import { VerdictGlyph } from './VerdictGlyph';

export interface ToastText {
  /** What was done: `3 finals added to R-07`. Never an error. */
  text: string;
  undo?: () => void;
}

interface Shown extends ToastText {
  id: number;
}

const SHOWN_MS = 8000;
let shown: Shown | null = null;
let count = 0;
const watchers = new Set<() => void>();

/** Says what was done, for 8 s at the sheet's bottom left; a newer one takes its place. */
export function showToast(toast: ToastText): void {
  count += 1;
  change({ ...toast, id: count });
}

function change(next: Shown | null): void {
  shown = next;
  for (const watcher of watchers) watcher();
}

function watch(changed: () => void): () => void {
  watchers.add(changed);
  return () => watchers.delete(changed);
}

/** Where they appear; the sheet holds one. The live region is always there, so that its change is read out. */
export function Toasts() {
  const toast = useSyncExternalStore(
    watch,
    () => shown,
    () => null,
  );
  const [held, setHeld] = useState(false);

  useEffect(() => {
    if (!toast || held) return;
    const timer = setTimeout(() => change(null), SHOWN_MS);
    return () => clearTimeout(timer);
  }, [toast, held]);

  return (
    <div className="toasts" role="status">
      {toast && (
        <div
          key={toast.id}
          className="toast"
          onPointerEnter={() => setHeld(true)}
          onPointerLeave={() => setHeld(false)}
          onFocus={() => setHeld(true)}
          onBlur={() => setHeld(false)}
        >
          <VerdictGlyph verdict="under" plain />
          <span>{toast.text}</span>
          {toast.undo && (
            <button
              type="button"
              onClick={() => {
                const { undo } = toast;
                setHeld(false);
                change(null);
                undo?.();
              }}
            >
              Undo
            </button>
          )}
        </div>
      )}
    </div>
  );
}
