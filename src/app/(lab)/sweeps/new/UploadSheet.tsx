'use client';

import { useRouter } from 'next/navigation';
import { useRef } from 'react';
import { showToast } from '@/components/ui/Toast';
import { formatCount } from '@/format/quantities';
import type { SweepFileView } from '@/schemas/sweepFile';
import { DropVeil } from '../DropVeil';
import { useFileDrop } from '../useFileDrop';
import { DropList } from './DropList';
import { DropSheet } from './DropSheet';
import { isUnkept } from './dropEntry';
import { LeaveGuard } from './LeaveGuard';
import { OpenFile } from './OpenFile';
import type { UploadLists } from './uploadLists';
import { MOST_FILES, useDrop } from './useDrop';

interface Props extends UploadLists {
  held: readonly SweepFileView[];
  stateId: string | null;
}

/** Files on their way in: dropped, recognised each on its own, answered and kept. */
export function UploadSheet({ held, stateId, ...lists }: Props) {
  const router = useRouter();
  const input = useRef<HTMLInputElement>(null);
  const drop = useDrop(held, lists, stateId);
  const over = useFileDrop(drop.take);
  const choose = () => input.current?.click();
  const { shown, open } = drop;

  /** A single file goes to its run; of several the others are still to be kept. */
  async function keep(keys: readonly string[]) {
    const kept = await drop.keep(keys);
    const [only] = kept;
    if (shown.length === 1 && only) return router.push(`/sweeps/${only.id}`);
    if (only && open) drop.closeEntry();
    if (only) {
      const runs = kept.map(({ number }) => number).join(', ');
      showToast({ text: kept.length === 1 ? `Kept as ${runs}` : `${formatCount(kept.length)} files kept: ${runs}` });
    }
  }

  const notes = [
    ...(drop.gone > 0
      ? [`${drop.gone === 1 ? 'One file is' : `${drop.gone} files are`} held no longer. Drop again what is missing.`]
      : []),
    ...(drop.left > 0
      ? [`One drop takes ${MOST_FILES} files; ${formatCount(drop.left)} were left out. Drop them after these.`]
      : []),
  ];
  return (
    <>
      {shown.length === 0 ? (
        <DropSheet notes={notes} onChoose={choose} />
      ) : open?.file && open.draft ? (
        <OpenFile key={open.key} drop={drop} entry={open} lists={lists} onKeep={keep} onChoose={choose} />
      ) : (
        <DropList drop={drop} notes={notes} lists={lists} onKeep={keep} onChoose={choose} />
      )}
      <input
        ref={input}
        type="file"
        multiple
        hidden
        aria-label="Sweep files"
        accept=".csv,.txt,.dat,.tsv,.asc,.s2p,text/*"
        onChange={(event) => {
          const files = [...(event.target.files ?? [])];
          event.target.value = '';
          if (files.length > 0) drop.take(files);
        }}
      />
      <DropVeil over={over} />
      <LeaveGuard entries={shown.filter(isUnkept)} />
    </>
  );
}
