import type { Submittable } from '@/components/forms/send';

/** What the forms of a set-up send; a test holds them to the schemas. */
export const SETUP_WRITES = {
  writeSetup: { method: 'POST', path: '/api/sweeps/{id}/setup' },
  addPhoto: { method: 'POST', path: '/api/sweeps/{id}/photos' },
  changePhoto: { method: 'PATCH', path: '/api/photos/{id}' },
  withdrawPhoto: { method: 'POST', path: '/api/photos/{id}/withdraw' },
} as const satisfies Record<string, Submittable>;
