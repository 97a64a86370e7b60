import type { Submittable } from '@/components/forms/send';

/** What the forms of a run send; the schemas stay on the server, a test holds the two together. */
export const RUN_WRITES = {
  refileSweep: { method: 'POST', path: '/api/sweeps/{id}/refile' },
  voidSweep: { method: 'POST', path: '/api/sweeps/{id}/void' },
  restoreSweep: { method: 'POST', path: '/api/sweeps/{id}/restore' },
  evaluateSweep: { method: 'POST', path: '/api/sweeps/{id}/evaluations' },
} as const satisfies Record<string, Submittable>;
