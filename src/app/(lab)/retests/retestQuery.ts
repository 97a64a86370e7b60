import type { RetestFilters } from '@/schemas/retest';

/** The filters as the address holds them. `status` is `open` unless it says otherwise; `all` is every status. */
export interface RetestSearch {
  status: NonNullable<RetestFilters['status']> | 'all';
  reason?: RetestFilters['reason'];
  port?: RetestFilters['port'];
  sample?: string;
  /** A modification state. */
  state?: string;
  product?: string;
  run?: string;
}

const STATUSES = ['open', 'waiting', 'scheduled', 'measured', 'cleared', 'withdrawn', 'all'] as const;
const REASONS = ['over', 'needs-final', 'repeat-prescan'] as const;
const PORTS = ['enclosure', 'ac-mains', 'wired-network'] as const;

function among<T extends string>(known: readonly T[], value: string | undefined): T | undefined {
  return known.find((one) => one === value);
}

/** What an address asks for; a word it does not know counts as not said. */
export function readSearch(said: Record<string, string | undefined>): RetestSearch {
  return {
    status: among(STATUSES, said.status) ?? (said.run ? 'all' : 'open'),
    reason: among(REASONS, said.reason),
    port: among(PORTS, said.port),
    sample: said.sample,
    state: said.state,
    product: said.product,
    run: said.run,
  };
}

export function filtersOf({ status, reason, port, sample, state, product, run }: RetestSearch): RetestFilters {
  return {
    ...(status !== 'all' && { status }),
    ...(reason && { reason }),
    ...(port && { port }),
    ...(sample && { sampleId: sample }),
    ...(state && { stateId: state }),
    ...(product && { productId: product }),
    ...(run && { runId: run }),
  };
}

/** The address of a queue; what is as usual is left out. */
export function addressOf(search: RetestSearch, more: Record<string, string> = {}): string {
  const usual = search.run ? 'all' : 'open';
  const said = { ...search, status: search.status === usual ? undefined : search.status, ...more };
  const query = new URLSearchParams(Object.entries(said).filter((pair): pair is [string, string] => Boolean(pair[1])));
  return `/retests${query.size > 0 ? `?${query}` : ''}`;
}

/** The same rows as a file. Of the open ones the list holds what is to be measured: waiting and scheduled. */
export function listAddress(search: RetestSearch, format: 'csv' | 'txt'): string {
  const { status, ...filters } = filtersOf(search);
  const named = status && status !== 'open' ? { status } : {};
  const query = new URLSearchParams({ format, ...named, ...filters } as Record<string, string>);
  return `/api/retests/frequency-list?${query}`;
}
