import type { Submittable } from '@/components/forms/send';

/** What the sheets of equipment and limits send; the schemas stay on the server, a test holds the two together. */
export const TABLE_WRITES = {
  previewFactorTable: { method: 'POST', path: '/api/factor-tables/preview' },
  enterFactorTables: { method: 'POST', path: '/api/factor-tables' },
  previewLimitLine: { method: 'POST', path: '/api/limit-lines/preview' },
  enterLimitLine: { method: 'POST', path: '/api/limit-lines' },
  createLimitSet: { method: 'POST', path: '/api/limit-sets' },
} as const satisfies Record<string, Submittable>;
