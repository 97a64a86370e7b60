'use client';

import { useEffect, useId, useRef, useState, type ReactNode } from 'react';
import { usePathname } from 'next/navigation';
import { useKey } from './keys';

/** A word in the top line that lets something hang under it: the person's menu, the menu of a phone. */
export function Hanging({
  label,
  className,
  panelClassName,
  children,
}: {
  label: string;
  className?: string;
  panelClassName?: string;
  children?: ReactNode;
}) {
  const pathname = usePathname();
  const [openAt, setOpenAt] = useState<string | null>(null);
  const open = openAt === pathname;
  const root = useRef<HTMLDivElement>(null);
  const button = useRef<HTMLButtonElement>(null);
  const id = useId();

  useKey(
    'Escape',
    () => {
      setOpenAt(null);
      button.current?.focus();
    },
    { when: open },
  );

  useEffect(() => {
    if (!open) return;
    const away = (event: Event) => {
      if (event.target instanceof Node && !root.current?.contains(event.target)) setOpenAt(null);
    };
    document.addEventListener('pointerdown', away);
    document.addEventListener('focusin', away);
    return () => {
      document.removeEventListener('pointerdown', away);
      document.removeEventListener('focusin', away);
    };
  }, [open]);

  if (!children) return <span className={className}>{label}</span>;
  return (
    <div className="hanging" ref={root}>
      <button
        ref={button}
        type="button"
        className={className}
        aria-expanded={open}
        aria-controls={id}
        onClick={() => setOpenAt(open ? null : pathname)}
      >
        {label}
      </button>
      <div id={id} className={panelClassName} hidden={!open}>
        {open && children}
      </div>
    </div>
  );
}
