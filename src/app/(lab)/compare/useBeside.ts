'use client';

import { useCallback, useRef, useState } from 'react';
import type { ComparisonView } from '@/schemas/comparison';

/** The window that is drawn; `ask` fetches a finer one and an older answer never replaces a newer. */
export function useBeside(a: string, b: string, overview: ComparisonView) {
  const [beside, setBeside] = useState(overview);
  const latest = useRef(0);
  const ask = useCallback(
    async (fromHz: number, toHz: number, columns: number) => {
      const turn = ++latest.current;
      const range = { fromHz: String(fromHz), toHz: String(toHz), columns: String(columns) };
      const query = new URLSearchParams({ a, b, ...range, only: 'columns' });
      const response = await fetch(`/api/comparisons?${query}`).catch(() => null);
      if (!response?.ok) return;
      const finer = (await response.json()) as ComparisonView;
      if (turn === latest.current) setBeside(finer);
    },
    [a, b],
  );
  return { beside, ask };
}
