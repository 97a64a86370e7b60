'use client';

import { useSyncExternalStore } from 'react';

const PHONE = '(width < 47.5rem)';

/** Below 760 px tables become lists. false on the server. */
export function usePhone(): boolean {
  return useSyncExternalStore(
    (changed) => {
      const query = window.matchMedia(PHONE);
      query.addEventListener('change', changed);
      return () => query.removeEventListener('change', changed);
    },
    () => window.matchMedia(PHONE).matches,
    () => false,
  );
}
