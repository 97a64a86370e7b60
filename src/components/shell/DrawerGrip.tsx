'use client';

import type { ReactNode } from 'react';
import type { DrawerDrag } from './drawerDrag';
import type { MarginSection } from './marginSection';
import { useSheet } from './sheetState';

/** The head of a phone's drawer: drag it, press it, or move it with the arrow keys between 92 px, 358 px and full. */
export function DrawerGrip({
  section,
  line,
  drag,
}: {
  section: MarginSection | undefined;
  line?: ReactNode;
  drag: DrawerDrag;
}) {
  const { reach, setReach, open, close } = useSheet();
  const away = reach === 'closed';
  if (!section) return null;
  return (
    <button
      type="button"
      className="column-grip"
      aria-expanded={!away}
      onClick={() => (drag.moved() ? undefined : away ? open(section.id) : close())}
      onKeyDown={(event) => {
        const to = { ArrowUp: away ? 'half' : 'full', ArrowDown: reach === 'full' ? 'half' : 'closed' }[event.key];
        if (!to) return;
        event.preventDefault();
        setReach(to as typeof reach);
      }}
      {...drag.handlers}
    >
      <span className="column-grip-bar" aria-hidden />
      <span className="column-grip-line">
        {away ? (line ?? section.subject ?? section.summary ?? '') : section.title}
      </span>
      <span className="column-grip-act">{away ? `Open ${section.title.toLowerCase()}` : 'Close'}</span>
    </button>
  );
}
