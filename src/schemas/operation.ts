import type { z } from 'zod';
import type { Permission } from '@/auth/permissions';

/**
 * One thing the API does, declared once: the route handler, the tests and the OpenAPI document all read it.
 * `permission: null` is for what needs no sign-in.
 */
export interface Operation<
  Params extends z.ZodType = z.ZodType,
  Query extends z.ZodType = z.ZodType,
  Body extends z.ZodType = z.ZodType,
  Reply extends z.ZodType = z.ZodType,
> {
  id: string;
  method: 'GET' | 'POST' | 'PATCH' | 'DELETE';
  /** OpenAPI form, e.g. `/api/jobs/{id}`. */
  path: string;
  summary: string;
  permission: Permission | null;
  status: 200 | 201 | 204;
  params?: Params;
  query?: Query;
  body?: Body;
  reply?: Reply;
  /** A creating POST accepts an Idempotency-Key and answers a repeat with the first reply. */
  idempotent?: boolean;
  /** The change names the version it was made on in If-Match. */
  ifMatch?: boolean;
  /** A repeat does no harm and needs no key, such as signing in. */
  repeatable?: boolean;
  /** Body is multipart/form-data with one `file`; reply is bytes. */
  upload?: boolean;
  download?: boolean;
}

export function operation<P extends z.ZodType, Q extends z.ZodType, B extends z.ZodType, R extends z.ZodType>(
  declared: Operation<P, Q, B, R>,
): Operation<P, Q, B, R> {
  return declared;
}
