'use client';

import { useEffect, useRef, useState, type ReactNode } from 'react';
import { Button } from '@/components/ui/Button';
import { Dialog } from '@/components/ui/Dialog';

interface Props {
  /** Whether anything would be lost. */
  when: boolean;
  /** `Leave with 2 files not kept?` */
  title: string;
  /** The act of leaving and its extent: `Leave 2 files`. */
  act: string;
  /** What becomes of it. */
  children: ReactNode;
}

/** Asks before a sheet is left with something that is not kept: by a link of the page, or by closing or reloading it. */
export function LeaveGuard({ when, title, act, children }: Props) {
  const [way, setWay] = useState<HTMLAnchorElement | null>(null);
  const agreed = useRef(false);

  useEffect(() => {
    if (!when) return;
    const leaving = (event: BeforeUnloadEvent) => event.preventDefault();
    const clicked = (event: MouseEvent) => {
      if (agreed.current || event.button !== 0 || event.metaKey || event.ctrlKey || event.shiftKey) return;
      const link = (event.target as Element | null)?.closest<HTMLAnchorElement>('a[href]') ?? null;
      if (!link || link.target || link.hasAttribute('download')) return;
      const to = new URL(link.href, window.location.href);
      if (to.pathname === window.location.pathname) return;
      event.preventDefault();
      event.stopPropagation();
      setWay(link);
    };
    window.addEventListener('beforeunload', leaving);
    document.addEventListener('click', clicked, true);
    return () => {
      window.removeEventListener('beforeunload', leaving);
      document.removeEventListener('click', clicked, true);
    };
  }, [when]);

  function leave() {
    agreed.current = true;
    setWay(null);
    way?.click();
  }

  return (
    <Dialog
      open={way !== null}
      title={title}
      safe="Stay"
      onClose={() => setWay(null)}
      act={
        <Button kind="primary" onClick={leave}>
          {act}
        </Button>
      }
    >
      {children}
    </Dialog>
  );
}
