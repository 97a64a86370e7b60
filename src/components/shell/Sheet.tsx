'use client';

import { useCallback, useMemo, useRef, useState, type ReactNode } from 'react';
import { classes } from '@/components/ui/classes';
import { Toasts } from '@/components/ui/Toast';
import { useKey } from './keys';
import { MarginColumn } from './MarginColumn';
import type { MarginKey, MarginSection } from './marginSection';
import { SheetContext, type ColumnReach, type SheetState } from './sheetState';
import { TieLine } from './TieLine';
import { useLayout } from './useLayout';

export interface SheetProps {
  /** A SheetHeader. */
  header?: ReactNode;
  children?: ReactNode;
  /** The parts of the column: Working, Notes, Custody, History, or a sheet's own. Without them there is no column. */
  margin?: readonly MarginSection[];
  /** One line on the current figure, for the closed drawer of a phone: `Margin at 36.006 MHz`. */
  marginLine?: ReactNode;
  /** Key hints at the foot of the column. */
  keys?: readonly MarginKey[];
  className?: string;
}

/**
 * One sheet on the desk: a main part and a column beside it that scroll apart from each other. Under 1024 px the column
 * lies over the sheet, under 760 px it is a drawer at the bottom.
 */
export function Sheet({ header, children, margin, marginLine, keys, className }: SheetProps) {
  const root = useRef<HTMLDivElement>(null);
  const layout = useLayout();
  const [reach, setReach] = useState<ColumnReach>('closed');
  const [folds, setFolds] = useState<Readonly<Record<string, boolean>>>({});
  const [tab, setTab] = useState<string | null>(null);

  const open = useCallback((id: string, { focus = false }: { focus?: boolean } = {}) => {
    setFolds((before) => ({ ...before, [id]: true }));
    setTab(id);
    setReach((before) => (before === 'closed' ? 'half' : before));
    if (!focus) return;
    // After the section has been shown; focus() on a hidden element does nothing.
    setTimeout(() => root.current?.querySelector<HTMLElement>(`[data-section="${CSS.escape(id)}"] h2`)?.focus(), 0);
  }, []);

  const close = useCallback(() => {
    setReach('closed');
    const figure = root.current?.querySelector<HTMLElement>('[data-tie="figure"]');
    if (root.current?.querySelector('.column')?.contains(document.activeElement)) figure?.focus();
  }, []);

  const state = useMemo<SheetState>(
    () => ({
      layout,
      reach,
      setReach,
      tab,
      setTab,
      isOpen: (id, initially) => folds[id] ?? initially,
      fold: (id, opened) => setFolds((before) => ({ ...before, [id]: opened })),
      open,
      close,
    }),
    [layout, reach, tab, folds, open, close],
  );

  const over = layout !== 'column' && reach !== 'closed';
  useKey('Escape', close, { when: margin !== undefined && over });
  useKey('W', () => (over ? close() : open(margin?.[0]?.id ?? '', { focus: true })), {
    when: margin !== undefined && layout !== 'column',
    weak: true,
    says: margin?.[0]?.title.toLowerCase(),
  });
  useKey('PageDown', () => turn(root.current, 0.9), { weak: true });
  useKey('PageUp', () => turn(root.current, -0.9), { weak: true });
  useKey(' ', (event) => turn(root.current, event.shiftKey ? -0.9 : 0.9), { weak: true });

  return (
    <SheetContext value={state}>
      <div ref={root} className={classes('sheet', margin && 'sheet-with-column', className)}>
        <main id="sheet" className="sheet-main" tabIndex={-1}>
          {header}
          {children}
        </main>
        {margin && <MarginColumn sections={margin} line={marginLine} keys={keys} />}
        {margin && layout === 'column' && <TieLine sheet={root} />}
        <Toasts />
      </div>
    </SheetContext>
  );
}

/** The page itself does not scroll, so the keys that scroll a page reach the main part while nothing has the focus. */
function turn(sheet: HTMLElement | null, pages: number): boolean | void {
  if (document.activeElement && document.activeElement !== document.body) return false;
  const main = sheet?.querySelector('.sheet-main');
  main?.scrollBy({ top: main.clientHeight * pages });
}
