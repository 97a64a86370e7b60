'use client';

import { useMemo, useRef, type HTMLAttributes, type PointerEvent } from 'react';
import type { ColumnReach } from './sheetState';

export interface DrawerDrag {
  /** Whether the press that ends now was a drag, so that it is not taken for a tap. */
  moved: () => boolean;
  handlers: Pick<HTMLAttributes<HTMLElement>, 'onPointerDown' | 'onPointerMove' | 'onPointerUp' | 'onPointerCancel'>;
}

const TAP_PX = 6;

/** The reach whose height is nearest to where the drawer was let go; a quick flick goes one further. */
export function reachNear(heightPx: number, upwardPxPerMs: number, heights: Record<ColumnReach, number>): ColumnReach {
  const thrown = heightPx + upwardPxPerMs * 160;
  const reaches: ColumnReach[] = ['closed', 'half', 'full'];
  return reaches.reduce((best, next) =>
    Math.abs(heights[next] - thrown) < Math.abs(heights[best] - thrown) ? next : best,
  );
}

/** The drawer's heights, section 2 of the design: 92 px, 358 px, and full to 64 px below the top. */
export function drawerHeights(viewportPx: number): Record<ColumnReach, number> {
  const full = Math.max(92, viewportPx - 64);
  return { closed: 92, half: Math.min(358, full), full };
}

interface Press {
  fromY: number;
  height: number;
  lastY: number;
  lastAt: number;
  speed: number;
}

/** The grip lies in the drawer it moves. */
function drawerOf(event: PointerEvent<HTMLElement>): HTMLElement | null {
  return event.currentTarget.parentElement;
}

/** Follows the pointer by setting the height on the element, and leaves it to the style sheet when let go. */
export function useDrawerDrag(setReach: (reach: ColumnReach) => void): DrawerDrag {
  const press = useRef<Press | null>(null);
  const wasDrag = useRef(false);

  return useMemo(() => {
    const end = (event: PointerEvent<HTMLElement>) => {
      const held = press.current;
      const drawer = drawerOf(event);
      press.current = null;
      if (!held || !drawer) return;
      delete drawer.dataset.dragged;
      drawer.style.removeProperty('height');
      if (!wasDrag.current || event.type === 'pointercancel') return;
      const height = held.height + held.fromY - event.clientY;
      setReach(reachNear(height, held.speed, drawerHeights(window.innerHeight)));
    };
    const start = (event: PointerEvent<HTMLElement>) => {
      const drawer = drawerOf(event);
      if (event.button !== 0 || !drawer) return;
      const at = { lastY: event.clientY, lastAt: event.timeStamp, speed: 0 };
      press.current = { fromY: event.clientY, height: drawer.offsetHeight, ...at };
      wasDrag.current = false;
      event.currentTarget.setPointerCapture(event.pointerId);
    };
    const move = (event: PointerEvent<HTMLElement>) => {
      const held = press.current;
      const drawer = drawerOf(event);
      if (!held || !drawer) return;
      if (!wasDrag.current && Math.abs(event.clientY - held.fromY) < TAP_PX) return;
      wasDrag.current = true;
      const heights = drawerHeights(window.innerHeight);
      const height = Math.min(heights.full, Math.max(heights.closed, held.height + held.fromY - event.clientY));
      drawer.dataset.dragged = '';
      drawer.style.height = `${height}px`;
      held.speed = (held.lastY - event.clientY) / Math.max(1, event.timeStamp - held.lastAt);
      held.lastY = event.clientY;
      held.lastAt = event.timeStamp;
    };
    return {
      moved: () => {
        const was = wasDrag.current;
        wasDrag.current = false;
        return was;
      },
      handlers: { onPointerDown: start, onPointerMove: move, onPointerUp: end, onPointerCancel: end },
    };
  }, [setReach]);
}
