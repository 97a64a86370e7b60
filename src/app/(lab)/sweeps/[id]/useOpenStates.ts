'use client';

import { useEffect, useState } from 'react';
import type { JobView, SampleView } from '@/schemas/job';

export interface OpenState {
  id: string;
  /** `S-050 TP-9, M0, as received` */
  words: string;
  organisation: { id: string; name: string };
}

interface Listed {
  states: OpenState[];
  /** Whether all is here, or the lists could not be read. */
  settled: 'reading' | 'read' | 'unreachable';
}

/** Fitted states of samples in open jobs, newest sample first: where a run can stand. */
export function useOpenStates(): Listed {
  const [listed, setListed] = useState<Listed>({ states: [], settled: 'reading' });
  useEffect(() => {
    const stop = new AbortController();
    Promise.all([everything<JobView>('/api/jobs', stop.signal), everything<SampleView>('/api/samples', stop.signal)])
      .then(([jobs, samples]) => {
        const open = new Set(jobs.filter(({ state }) => state === 'open').map(({ id }) => id));
        const states = samples.filter(({ job }) => open.has(job.id)).flatMap(statesOf);
        setListed({ states, settled: 'read' });
      })
      .catch(() => {
        if (!stop.signal.aborted) setListed({ states: [], settled: 'unreachable' });
      });
    return () => stop.abort();
  }, []);
  return listed;
}

function statesOf({ code, product, organisation, states }: SampleView): OpenState[] {
  return states
    .filter(({ planned }) => !planned)
    .map(({ id, label, description }) => ({
      id,
      words: `${code} ${product.code}, ${label}, ${description}`,
      organisation,
    }));
}

/** Beyond this many pages of 200 the older ones are left out. */
const PAGES = 10;

async function everything<T>(path: string, signal: AbortSignal): Promise<T[]> {
  const items: T[] = [];
  let after = '';
  for (let page = 0; page < PAGES; page++) {
    const response = await fetch(`${path}?limit=200${after}`, { signal });
    if (!response.ok) throw new Error(`${path}: ${response.status}`);
    const { items: more, next } = (await response.json()) as { items: T[]; next: string | null };
    items.push(...more);
    if (next === null) break;
    after = `&after=${encodeURIComponent(next)}`;
  }
  return items;
}
