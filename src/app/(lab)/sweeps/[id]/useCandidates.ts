'use client';

import { useCallback, useRef, useState } from 'react';
import type { CandidateView } from '@/schemas/sweep';

export interface CandidatePage {
  total: number;
  items: CandidateView[];
  next: string | null;
}

/** Candidates in pages of 50, worst first; `more` fetches the next page once at a time. */
export function useCandidates(sweepId: string, first: CandidatePage) {
  const [candidates, setCandidates] = useState(first.items);
  const [next, setNext] = useState(first.next);
  const [busy, setBusy] = useState(false);
  const flying = useRef(false);

  const more = useCallback(async () => {
    if (flying.current || next === null) return;
    flying.current = true;
    setBusy(true);
    const response = await fetch(`/api/sweeps/${sweepId}/candidates?after=${next}`).catch(() => null);
    if (response?.ok) {
      const page = (await response.json()) as CandidatePage;
      setCandidates((before) => [...before, ...page.items]);
      setNext(page.next);
    }
    flying.current = false;
    setBusy(false);
  }, [sweepId, next]);

  return { candidates, total: first.total, busy, more: next === null ? undefined : more };
}
