import type { ReactNode } from 'react';

export interface MarginSection {
  /** `working`, `notes`, `custody`, `history`, or a sheet's own. */
  id: string;
  title: string;
  /** After the title while open: `level at 36.006 MHz`. */
  subject?: ReactNode;
  /** The one line it folds to: `on shelf 4 since 09:12`. A section without one does not fold. */
  summary?: ReactNode;
  /** At the right of the title while open: `2 of 5`. */
  remark?: ReactNode;
  /** After the title on a phone's tab: `Notes 2`. */
  count?: number;
  /** At first; a section without a summary always is. */
  open?: boolean;
  /** Shows Esc at the right of the title and closes what the section shows. */
  onClose?: () => void;
  children?: ReactNode;
}

export interface MarginKey {
  /** As `KeyboardEvent.key` names them: `['ArrowUp', 'ArrowDown']`. */
  keys: readonly string[];
  does: string;
}
