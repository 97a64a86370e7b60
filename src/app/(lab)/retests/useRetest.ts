'use client';

import { useEffect, useState } from 'react';
import { problemOf, UNREACHABLE, type Problem } from '@/components/forms/problem';
import type { RetestView } from '@/schemas/retest';

export interface RetestState {
  retest: RetestView | null;
  problem: Problem | null;
}

/** The chosen retest with its changes; read anew when its version on the page is another. */
export function useRetest(id: string | null, version: number | null): RetestState {
  const [state, setState] = useState<RetestState & { id: string | null }>({ id: null, retest: null, problem: null });
  useEffect(() => {
    if (id === null) return;
    const stop = new AbortController();
    void read(id, stop.signal).then((read) => {
      if (!stop.signal.aborted) setState({ id, ...read });
    });
    return () => stop.abort();
  }, [id, version]);
  return state.id === id ? state : { retest: null, problem: null };
}

async function read(id: string, signal: AbortSignal): Promise<RetestState> {
  try {
    const answer = await fetch(`/api/retests/${id}`, { signal });
    if (answer.ok) return { retest: (await answer.json()) as RetestView, problem: null };
    const problem = problemOf(answer.status, answer.headers.get('content-type'), await answer.text());
    return { retest: null, problem };
  } catch {
    return { retest: null, problem: UNREACHABLE };
  }
}
