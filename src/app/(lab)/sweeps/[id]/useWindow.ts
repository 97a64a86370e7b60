'use client';

import { useCallback, useRef, useState } from 'react';
import type { WindowView } from '@/schemas/sweep';

/** The window that is drawn; `ask` fetches a finer one and an older answer never replaces a newer. */
export function useWindow(sweepId: string, overview: WindowView) {
  const [window, setWindow] = useState(overview);
  const latest = useRef(0);

  const ask = useCallback(
    async (fromHz: number, toHz: number, columns: number) => {
      const turn = ++latest.current;
      const query = new URLSearchParams({ fromHz: String(fromHz), toHz: String(toHz), columns: String(columns) });
      const response = await fetch(`/api/sweeps/${sweepId}/window?${query}`).catch(() => null);
      if (!response?.ok) return;
      const finer = (await response.json()) as WindowView;
      if (turn === latest.current) setWindow(finer);
    },
    [sweepId],
  );

  return { window, ask };
}
