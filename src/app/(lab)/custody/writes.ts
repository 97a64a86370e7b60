import type { Submittable } from '@/components/forms/send';

/** What the form sends; a test holds it to the schema. */
export const CUSTODY_WRITES = {
  moveSample: { method: 'POST', path: '/api/samples/{id}/custody' },
} as const satisfies Record<string, Submittable>;
