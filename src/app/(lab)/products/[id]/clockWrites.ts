import type { Submittable } from '@/components/forms/send';

/** What the forms of declared clocks send; the schemas stay on the server, a test holds the two together. */
export const CLOCK_WRITES = {
  addProductClock: { method: 'POST', path: '/api/products/{id}/clocks' },
  changeProductClock: { method: 'PATCH', path: '/api/clocks/{id}' },
  withdrawProductClock: { method: 'POST', path: '/api/clocks/{id}/withdraw' },
} as const satisfies Record<string, Submittable>;
