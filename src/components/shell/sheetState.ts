'use client';

import { createContext, use } from 'react';
import type { Layout } from './useLayout';

/** How far the column has been drawn over the sheet where it is not beside it; an overlay knows only closed and half. */
export type ColumnReach = 'closed' | 'half' | 'full';

export interface SheetState {
  layout: Layout;
  reach: ColumnReach;
  setReach: (reach: ColumnReach) => void;
  /** The section a phone shows; null is the first. */
  tab: string | null;
  setTab: (id: string) => void;
  isOpen: (id: string, initially: boolean) => boolean;
  fold: (id: string, open: boolean) => void;
  /** Shows a section, drawing the column out where it is not beside the sheet. `focus` only when a key asked for it. */
  open: (id: string, options?: { focus?: boolean }) => void;
  /** Puts the overlay or drawer away. */
  close: () => void;
}

const idle = () => {};

export const SheetContext = createContext<SheetState>({
  layout: 'column',
  reach: 'closed',
  setReach: idle,
  tab: null,
  setTab: idle,
  isOpen: (_id, initially) => initially,
  fold: idle,
  open: idle,
  close: idle,
});

/** For a figure or a table row: `const { open } = useSheet(); open('working', { focus: fromKeyboard })`. */
export function useSheet(): SheetState {
  return use(SheetContext);
}
