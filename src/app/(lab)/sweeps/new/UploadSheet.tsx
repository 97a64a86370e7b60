'use client';

import { useRouter, useSearchParams } from 'next/navigation';
import { useEffect, useState } from 'react';
import type { SweepFileView } from '@/schemas/sweepFile';
import { DropSheet } from './DropSheet';
import { RecogniseSheet } from './RecogniseSheet';
import { RefusedSheet } from './RefusedSheet';
import type { UploadLists } from './uploadLists';

interface Props extends UploadLists {
  held: SweepFileView | null;
  stateId: string | null;
}

/** A file on its way in: dropped, then either refused with its line or recognised and kept. */
export function UploadSheet({ held, stateId, ...lists }: Props) {
  const [known, setKnown] = useState(held);
  const router = useRouter();
  const named = useSearchParams().get('file');
  // The address decides, so that back, forward and reload show what it names.
  const file = known?.id === named ? known : null;

  useEffect(() => {
    if (named === null || known?.id === named) return;
    const stop = new AbortController();
    fetch(`/api/sweep-files/${encodeURIComponent(named)}`, { signal: stop.signal })
      .then(async (answer) => answer.ok && setKnown((await answer.json()) as SweepFileView))
      // A file that is held no longer, or no network: the sheet to drop it again is what is shown.
      .catch(() => undefined);
    return () => stop.abort();
  }, [named, known]);

  const query = stateId ? `&state=${stateId}` : '';

  function take(next: SweepFileView) {
    setKnown(next);
    window.history.pushState(null, '', `/sweeps/new?file=${next.id}${query}`);
  }
  function discard() {
    router.replace(stateId ? `/sweeps/new?state=${stateId}` : '/sweeps/new');
  }

  if (!file) return <DropSheet onFile={take} />;
  if (file.recognition.kind === 'refused') return <RefusedSheet file={file} onDiscard={discard} />;
  return <RecogniseSheet key={file.id} file={file} stateId={stateId} onDiscard={discard} {...lists} />;
}
