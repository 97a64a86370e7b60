'use client';

import { useRouter } from 'next/navigation';
import { useState } from 'react';
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
  const [file, setFile] = useState(held);
  const router = useRouter();
  const query = stateId ? `&state=${stateId}` : '';

  function take(next: SweepFileView) {
    setFile(next);
    // The address names the held file, so that reloading or coming back finds it again.
    window.history.pushState(null, '', `/sweeps/new?file=${next.id}${query}`);
  }
  function discard() {
    setFile(null);
    router.replace(stateId ? `/sweeps/new?state=${stateId}` : '/sweeps/new');
  }

  if (!file) return <DropSheet onFile={take} />;
  if (file.recognition.kind === 'refused') return <RefusedSheet file={file} onDiscard={discard} />;
  return <RecogniseSheet key={file.id} file={file} stateId={stateId} onDiscard={discard} {...lists} />;
}
