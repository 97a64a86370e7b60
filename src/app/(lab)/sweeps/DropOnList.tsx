'use client';

import { useRouter } from 'next/navigation';
import { carry } from './droppedFiles';
import { DropVeil } from './DropVeil';
import { useFileDrop } from './useFileDrop';

/** Files dropped on the list of runs go to the sheet that takes them in. */
export function DropOnList() {
  const router = useRouter();
  const over = useFileDrop((files) => {
    carry(files);
    router.push('/sweeps/new');
  });
  return <DropVeil over={over} />;
}
