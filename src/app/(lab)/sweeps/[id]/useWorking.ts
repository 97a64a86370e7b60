'use client';

import { useCallback, useRef, useState } from 'react';
import { problemOf, UNREACHABLE, type Problem } from '@/components/forms/problem';
import type { WorkingView } from '@/schemas/sweep';

export interface WorkingState {
  working: WorkingView | null;
  busy: boolean;
  problem: Problem | null;
  load: (ask: { frequencyHz: number; trace: number; line: string | null }) => void;
  clear: () => void;
}

/** Fetches the working of a figure; a newer question makes an older answer count for nothing. */
export function useWorking(sweepId: string): WorkingState {
  const [working, setWorking] = useState<WorkingView | null>(null);
  const [problem, setProblem] = useState<Problem | null>(null);
  const [busy, setBusy] = useState(false);
  const latest = useRef(0);

  const load = useCallback<WorkingState['load']>(
    async ({ frequencyHz, trace, line }) => {
      const turn = ++latest.current;
      setBusy(true);
      const query = new URLSearchParams({ frequencyHz: String(frequencyHz), trace: String(trace) });
      if (line) query.set('line', line);
      let answer: WorkingView | null = null;
      let wrong: Problem | null = null;
      try {
        const response = await fetch(`/api/sweeps/${sweepId}/working?${query}`);
        if (response.ok) answer = (await response.json()) as WorkingView;
        else wrong = problemOf(response.status, response.headers.get('content-type'), await response.text());
      } catch {
        wrong = UNREACHABLE;
      }
      if (turn !== latest.current) return;
      setBusy(false);
      setWorking(answer);
      setProblem(wrong);
    },
    [sweepId],
  );

  const clear = useCallback(() => {
    latest.current++;
    setWorking(null);
    setProblem(null);
    setBusy(false);
  }, []);

  return { working, busy, problem, load, clear };
}
