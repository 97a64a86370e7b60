import type { Submittable } from '@/components/forms/send';

/** What the forms of these sheets send; the schemas stay on the server, a test holds the two together. */
export const WRITES = {
  createProduct: { method: 'POST', path: '/api/products' },
  changeProduct: { method: 'PATCH', path: '/api/products/{id}' },
  createJob: { method: 'POST', path: '/api/jobs' },
  changeJob: { method: 'PATCH', path: '/api/jobs/{id}' },
  createSample: { method: 'POST', path: '/api/jobs/{id}/samples' },
  changeSample: { method: 'PATCH', path: '/api/samples/{id}' },
  createState: { method: 'POST', path: '/api/samples/{id}/states' },
  changeState: { method: 'PATCH', path: '/api/states/{id}' },
  listProducts: { method: 'GET', path: '/api/products' },
} as const satisfies Record<string, Submittable>;
