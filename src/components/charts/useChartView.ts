'use client';

import { useCallback, useEffect, useEffectEvent, useRef, useState } from 'react';
import { createStore, type Store } from './chartStore';
import type { Frame, Span } from './scale';
import { padded, sameSpan } from './viewport';

const ASK_AFTER_MS = 160;

/**
 * The visible span of a chart. `view.set` moves it at once, `changeView` with the next drawn frame: many pointer events
 * fall into one frame, and the last of them counts. When it rests, a finer window is asked for.
 */
export function useChartView(
  whole: Span,
  frame: Frame,
  onWindow?: (fromHz: number, toHz: number, columns: number) => void,
): { view: Store<Span>; changeView: (span: Span) => void } {
  const [view] = useState(() => createStore<Span>(whole));

  const ask = useEffectEvent(() => {
    const span = view.get();
    if (!onWindow || sameSpan(span, whole)) return;
    const wanted = padded(span, whole);
    const pixels = (frame.width - frame.left - frame.right) * Math.min(globalThis.devicePixelRatio || 1, 2);
    const share = Math.log(wanted.toHz / wanted.fromHz) / Math.log(span.toHz / span.fromHz);
    onWindow(wanted.fromHz, wanted.toHz, Math.max(16, Math.min(4096, Math.round(pixels * share))));
  });
  useEffect(() => {
    let waiting: ReturnType<typeof setTimeout> | undefined;
    const stop = view.subscribe(() => {
      clearTimeout(waiting);
      waiting = setTimeout(ask, ASK_AFTER_MS);
    });
    return () => {
      clearTimeout(waiting);
      stop();
    };
  }, [view]);

  const queued = useRef<{ frame: number; span: Span } | null>(null);
  const changeView = useCallback(
    (span: Span) => {
      if (queued.current) {
        queued.current.span = span;
        return;
      }
      const drawn = requestAnimationFrame(() => {
        const next = queued.current;
        queued.current = null;
        if (next && !sameSpan(next.span, view.get())) view.set(next.span);
      });
      queued.current = { frame: drawn, span };
    },
    [view],
  );
  useEffect(
    () => () => {
      if (queued.current) cancelAnimationFrame(queued.current.frame);
      queued.current = null;
    },
    [],
  );
  return { view, changeView };
}
