'use client';

import { useEffect, useState } from 'react';
import { problemOf, UNREACHABLE, type Problem } from '@/components/forms/problem';
import type { PreviewView, SweepChoice } from '@/schemas/sweep';

const WAIT_MS = 350;

export interface PreviewState {
  preview: PreviewView | null;
  problem: Problem | null;
  busy: boolean;
}

/** Asks how a file would be judged as chosen, a moment after the last change; only the newest answer counts. */
export function usePreview(fileId: string, choice: SweepChoice | null, stateId: string): PreviewState {
  const asked = choice === null ? null : JSON.stringify({ ...choice, stateId: stateId || null });
  const [answer, setAnswer] = useState<{ asked: string; preview: PreviewView | null; problem: Problem | null } | null>(
    null,
  );

  useEffect(() => {
    if (asked === null) return;
    const stop = new AbortController();
    const timer = setTimeout(async () => {
      try {
        const response = await fetch(`/api/sweep-files/${fileId}/preview`, {
          method: 'POST',
          headers: { 'content-type': 'application/json' },
          body: asked,
          signal: stop.signal,
        });
        const text = await response.text();
        if (response.ok) setAnswer({ asked, preview: JSON.parse(text) as PreviewView, problem: null });
        else
          setAnswer({
            asked,
            preview: null,
            problem: problemOf(response.status, response.headers.get('content-type'), text),
          });
      } catch (error) {
        if ((error as Error).name !== 'AbortError') setAnswer({ asked, preview: null, problem: UNREACHABLE });
      }
    }, WAIT_MS);
    return () => {
      clearTimeout(timer);
      stop.abort();
    };
  }, [fileId, asked]);

  const current = asked !== null && answer?.asked === asked ? answer : null;
  return {
    preview: current?.preview ?? null,
    problem: current?.problem ?? null,
    busy: asked !== null && current === null,
  };
}
