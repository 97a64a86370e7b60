'use client';

import { useEffect, useRef, useState, type ReactNode } from 'react';

/** Scrolls what is wider than its place; only then is it a stop of the Tab key, with a name, so that arrows move it. */
export function ScrollFrame({ name, className, children }: { name: string; className: string; children: ReactNode }) {
  const frame = useRef<HTMLDivElement>(null);
  const [wider, setWider] = useState(false);
  useEffect(() => {
    const element = frame.current!;
    const measure = () => setWider(element.scrollWidth > element.clientWidth);
    const sizes = new ResizeObserver(measure);
    sizes.observe(element);
    for (const child of element.children) sizes.observe(child);
    return () => sizes.disconnect();
  }, []);
  return (
    <div ref={frame} className={className} {...(wider && { tabIndex: 0, role: 'group', 'aria-label': name })}>
      {children}
    </div>
  );
}
