'use client';

import { useEffect, useEffectEvent, type RefObject } from 'react';
import type { CombTick } from './combTicks';
import type { Store } from './chartStore';
import { panBy, pinch, zoomAt } from './viewport';
import type { PlotScale, Span } from './scale';

export interface GestureTargets {
  view: Store<Span>;
  whole: Span;
  scale: () => PlotScale;
  changeView: (next: Span) => void;
  /** The pointer rests here, in px of the frame; null when it left. */
  hover: (point: { x: number; y: number } | null) => void;
  /** A click or tap that was not a drag; `reachPx` is wider for a finger. */
  pick: (point: { x: number; y: number }, reachPx: number) => void;
  /** Numbered harmonics can be taken hold of and dragged. */
  combTicks: () => CombTick[];
  tuneClock: ((clockHz: number) => void) | null;
}

const CLICK_PX = 4;
const FINGER_PX = 22;
const POINTER_PX = 9;

/** Pointer, wheel and touch on the chart: drag pans, the wheel zooms (in a focused chart, or with Ctrl), pinch zooms. */
export function useChartGestures(box: RefObject<HTMLElement | null>, targets: GestureTargets | null): void {
  const current = useEffectEvent(() => targets);
  const active = targets !== null;
  useEffect(() => {
    const element = box.current;
    if (!element || !active) return;
    const pointers = new Map<number, { x: number; y: number }>();
    let held: { start: { x: number; y: number }; span: Span; moved: boolean; tick: CombTick | null } | null = null;
    let fingers: [number, number] | null = null;

    const place = (event: { clientX: number; clientY: number }) => {
      const frame = element.getBoundingClientRect();
      return { x: event.clientX - frame.left, y: event.clientY - frame.top };
    };
    const share = (x: number, scale: PlotScale) => (x - scale.left) / (scale.right - scale.left);

    const wheel = (event: WheelEvent) => {
      const to = current();
      if (!to || !(event.ctrlKey || element.contains(document.activeElement))) return;
      event.preventDefault();
      const scale = to.scale();
      const unit = event.deltaMode === WheelEvent.DOM_DELTA_LINE ? 16 : 1;
      if (event.shiftKey || Math.abs(event.deltaX) > Math.abs(event.deltaY)) {
        const by = (event.deltaX || event.deltaY) * unit;
        to.changeView(panBy(to.view.get(), to.whole, by / (scale.right - scale.left)));
      } else {
        const factor = Math.exp(-event.deltaY * unit * (event.ctrlKey ? 0.008 : 0.002));
        to.changeView(zoomAt(to.view.get(), to.whole, scale.hz(place(event).x), factor));
      }
    };

    const down = (event: PointerEvent) => {
      const to = current();
      if (!to || event.button !== 0) return;
      const at = place(event);
      pointers.set(event.pointerId, at);
      if (pointers.size === 2) {
        const scale = to.scale();
        const [a, b] = [...pointers.values()];
        fingers = [scale.hz(a!.x), scale.hz(b!.x)];
        held = null;
        return;
      }
      const scale = to.scale();
      const onComb = to.tuneClock && at.y > scale.bottom && at.y < scale.bottom + 26;
      const tick = onComb ? to.combTicks().find((one) => one.near && Math.abs(one.x - at.x) <= 6) : undefined;
      held = { start: at, span: to.view.get(), moved: false, tick: tick ?? null };
    };

    const move = (event: PointerEvent) => {
      const to = current();
      if (!to) return;
      const at = place(event);
      const scale = to.scale();
      if (!pointers.has(event.pointerId)) {
        to.hover(event.pointerType === 'touch' ? null : at);
        return;
      }
      pointers.set(event.pointerId, at);
      if (fingers && pointers.size === 2) {
        const [a, b] = [...pointers.values()];
        to.changeView(pinch(to.whole, fingers, [share(a!.x, scale), share(b!.x, scale)]));
        return;
      }
      if (!held) return;
      if (!held.moved && Math.hypot(at.x - held.start.x, at.y - held.start.y) > CLICK_PX) {
        held.moved = true;
        element.setPointerCapture(event.pointerId);
        to.hover(null);
      }
      if (!held.moved) return;
      if (held.tick && to.tuneClock) to.tuneClock(scale.hz(at.x) / held.tick.n);
      else to.changeView(panBy(held.span, to.whole, (held.start.x - at.x) / (scale.right - scale.left)));
    };

    const up = (event: PointerEvent) => {
      const to = current();
      const clicked = held !== null && !held.moved && pointers.size === 1;
      pointers.delete(event.pointerId);
      if (pointers.size < 2) fingers = null;
      held = null;
      if (to && clicked && event.type === 'pointerup')
        to.pick(place(event), event.pointerType === 'touch' ? FINGER_PX : POINTER_PX);
    };

    const leave = () => {
      if (pointers.size === 0) current()?.hover(null);
    };

    element.addEventListener('wheel', wheel, { passive: false });
    element.addEventListener('pointerdown', down);
    element.addEventListener('pointermove', move);
    element.addEventListener('pointerup', up);
    element.addEventListener('pointercancel', up);
    element.addEventListener('pointerleave', leave);
    return () => {
      element.removeEventListener('wheel', wheel);
      element.removeEventListener('pointerdown', down);
      element.removeEventListener('pointermove', move);
      element.removeEventListener('pointerup', up);
      element.removeEventListener('pointercancel', up);
      element.removeEventListener('pointerleave', leave);
    };
  }, [box, active]);
}
