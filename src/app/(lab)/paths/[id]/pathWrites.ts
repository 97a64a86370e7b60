import type { Submittable } from '@/components/forms/send';

/** What the sheet of a signal path sends; a test holds it to the schema. */
export const PATH_WRITES = {
  reviseUncertainty: { method: 'POST', path: '/api/signal-paths/{id}/uncertainty' },
} as const satisfies Record<string, Submittable>;
