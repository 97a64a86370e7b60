import { z } from 'zod';
import { instant, pageOf, pageQuery, publicId } from './common';
import { operation } from './operation';

export const custodyView = z.strictObject({
  id: publicId,
  /** Where the sample went: a shelf, a test position, a carrier, its client. */
  place: z.string(),
  note: z.string(),
  by: z.string(),
  at: instant,
});
export type CustodyView = z.infer<typeof custodyView>;

const params = z.strictObject({ id: publicId });
export const moveSampleBody = z.strictObject({
  place: z.string().trim().min(1, 'is needed').max(160, 'takes at most 160 characters'),
  note: z.string().trim().max(400, 'takes at most 400 characters').default(''),
});

export const listCustody = operation({
  id: 'listCustody',
  method: 'GET',
  path: '/api/samples/{id}/custody',
  summary: 'Where a sample has been, newest first',
  permission: 'custody.list',
  status: 200,
  params,
  query: pageQuery,
  reply: pageOf(custodyView),
});
export const moveSample = operation({
  id: 'moveSample',
  method: 'POST',
  path: '/api/samples/{id}/custody',
  summary: 'Say where a sample was taken; it is never changed',
  permission: 'custody.move',
  status: 201,
  params,
  body: moveSampleBody,
  reply: custodyView,
  idempotent: true,
});
