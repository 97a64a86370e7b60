'use client';

import { useRouter } from 'next/navigation';
import { carry } from './droppedFiles';
import { DropVeil } from './DropVeil';
import { useFileDrop } from './useFileDrop';

/** Files dropped on a sheet go to the one that takes them in; `state` is where they would be kept. */
export function DropOnList({ state }: { state?: string }) {
  const router = useRouter();
  const over = useFileDrop((files) => {
    carry(files);
    router.push(state ? `/sweeps/new?state=${state}` : '/sweeps/new');
  });
  return <DropVeil over={over} />;
}
