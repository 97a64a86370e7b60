import { useEffect, useState } from 'react';
import { send } from '@/components/forms/send';
import type { Problem } from '@/components/forms/problem';
import type { SourcesView } from '@/schemas/sources';

export type Sources = { view: SourcesView } | { problem: Problem } | 'looking';

/** Asks for the likely sources after the sheet is there: the search for families takes a moment. */
export function useSources(sweepId: string, evaluationId: string): Sources {
  const [found, setFound] = useState<{ of: string; sources: Sources } | null>(null);
  useEffect(() => {
    const left = new AbortController();
    const operation = { method: 'GET', path: `/api/sweeps/${sweepId}/sources` } as const;
    void send<SourcesView>(operation, undefined, { signal: left.signal, patience: left.signal }).then((answer) => {
      if (left.signal.aborted) return;
      setFound({ of: evaluationId, sources: answer.ok ? { view: answer.reply } : { problem: answer.problem } });
    });
    return () => left.abort();
  }, [sweepId, evaluationId]);
  return found?.of === evaluationId ? found.sources : 'looking';
}
