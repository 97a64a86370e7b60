import { z } from 'zod';
import { pageQuery, publicId } from './common';
import { operation } from './operation';

export const FOUND_KINDS = ['job', 'sample', 'run', 'product', 'equipment', 'path'] as const;
export const foundKind = z.enum(FOUND_KINDS);
export type FoundKind = z.infer<typeof foundKind>;

export const foundItem = z.strictObject({
  id: publicId,
  /** The number or code people say: HL-2611, S-047, R-26-032, LD-40, ANT-02, P-3. */
  name: z.string(),
  /** What it is, in a few words. */
  says: z.string(),
});
export type FoundItem = z.infer<typeof foundItem>;

export const findQuery = z.strictObject({
  ...pageQuery.shape,
  q: z.string().trim().min(1, 'is empty').max(120),
  /** One kind, paged; left out, the first few of every kind. */
  kind: foundKind.optional(),
});
export const findReply = z.strictObject({
  kinds: z.array(z.strictObject({ kind: foundKind, items: z.array(foundItem), next: z.string().nullable() })),
});
export type Found = z.infer<typeof findReply>;

export const findEverywhere = operation({
  id: 'findEverywhere',
  method: 'GET',
  path: '/api/find',
  summary: 'Jobs, samples, runs, products, equipment and signal paths by number or words, newest first',
  permission: 'find.everywhere',
  status: 200,
  query: findQuery,
  reply: findReply,
});
