'use client';

import { useEffect, useState, type RefObject } from 'react';

/** The inner size of an element in CSS pixels; `initial` until the browser has laid it out. */
export function useBoxSize(
  box: RefObject<HTMLElement | null>,
  initial: { width: number; height: number },
): { width: number; height: number } {
  const [size, setSize] = useState(initial);
  useEffect(() => {
    if (!box.current) return;
    const watcher = new ResizeObserver(([entry]) => {
      if (!entry) return;
      const { width, height } = entry.contentRect;
      if (width > 0 && height > 0)
        setSize((before) => (before.width === width && before.height === height ? before : { width, height }));
    });
    watcher.observe(box.current);
    return () => watcher.disconnect();
  }, [box]);
  return size;
}
