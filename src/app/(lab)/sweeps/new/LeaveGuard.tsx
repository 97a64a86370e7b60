'use client';

import { useEffect, useRef, useState } from 'react';
import { Button } from '@/components/ui/Button';
import { Dialog } from '@/components/ui/Dialog';
import { files, type DropEntry } from './dropEntry';

/** Asks before the sheet is left with files that are not kept: by a link of the page, or by closing or reloading it. */
export function LeaveGuard({ entries }: { entries: readonly DropEntry[] }) {
  const [way, setWay] = useState<HTMLAnchorElement | null>(null);
  const agreed = useRef(false);
  const unkept = entries.length;
  const sending = entries.filter(({ file }) => !file).length;

  useEffect(() => {
    if (unkept === 0) return;
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
  }, [unkept]);

  function leave() {
    agreed.current = true;
    setWay(null);
    way?.click();
  }

  return (
    <Dialog
      open={way !== null}
      title={`Leave with ${files(unkept)} not kept?`}
      safe="Stay"
      onClose={() => setWay(null)}
      act={
        <Button kind="primary" onClick={leave}>
          Leave {files(unkept)}
        </Button>
      }
    >
      {sending > 0
        ? `${files(sending)} ${sending === 1 ? 'is' : 'are'} still being sent and would have to be dropped again. `
        : ''}
      What is recognised is held for a day; the back button brings it back.
    </Dialog>
  );
}
