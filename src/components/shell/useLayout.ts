'use client';

import { useSyncExternalStore } from 'react';

/** Where the column is: beside the sheet, over its right side, or a drawer at the bottom of a phone. */
export type Layout = 'column' | 'overlay' | 'drawer';

const BESIDE = '(width >= 64rem)';
const OVER = '(width >= 47.5rem)';

/** The server draws the column; the style sheet has already placed it when the browser's answer comes. */
export function useLayout(): Layout {
  return useSyncExternalStore(watch, read, () => 'column');
}

function read(): Layout {
  return matchMedia(BESIDE).matches ? 'column' : matchMedia(OVER).matches ? 'overlay' : 'drawer';
}

function watch(changed: () => void): () => void {
  const queries = [BESIDE, OVER].map((query) => matchMedia(query));
  for (const query of queries) query.addEventListener('change', changed);
  return () => {
    for (const query of queries) query.removeEventListener('change', changed);
  };
}
