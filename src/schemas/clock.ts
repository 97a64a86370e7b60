import { z } from 'zod';
import { instant, pageOf, pageQuery, person, publicId, version } from './common';
import { operation } from './operation';

/* Declared clocks and switching converters of a product: what its emissions may come from. */

/** `clock`: its harmonics are looked for. `converter`: its harmonics, and its sidebands around others. */
export const clockKind = z.enum(['clock', 'converter']);
export type ClockKind = z.infer<typeof clockKind>;

/** A spread-spectrum clock: the whole width of its sweep in percent, below the frequency or to both sides of it. */
export const clockSpread = z.strictObject({
  kind: z.enum(['down', 'centre']),
  pct: z.number().positive('is above 0 %').max(20, 'is at most 20 %'),
});

const fields = {
  name: z.string().trim().min(1, 'is needed').max(80, 'takes at most 80 characters'),
  kind: clockKind,
  frequencyHz: z.number().positive('is above 0 Hz').max(40e9, 'is at most 40 GHz'),
  tolerancePpm: z.number().min(0, 'is not below 0 ppm').max(300_000, 'is at most 300 000 ppm'),
  spread: clockSpread.nullable(),
  note: z.string().trim().max(300, 'takes at most 300 characters'),
};

export const addClockBody = z.strictObject({
  ...fields,
  spread: fields.spread.default(null),
  note: fields.note.default(''),
});
export const changeClockBody = z.strictObject(fields).partial();

export const clockView = z.strictObject({
  id: publicId,
  version,
  productId: publicId,
  name: z.string(),
  kind: clockKind,
  frequencyHz: z.number(),
  tolerancePpm: z.number(),
  spread: clockSpread.nullable(),
  note: z.string(),
  by: person,
  at: instant,
  withdrawn: z.strictObject({ at: instant, by: person, reason: z.string() }).nullable(),
});
export type ClockView = z.infer<typeof clockView>;

const idParams = z.strictObject({ id: publicId });

export const listProductClocks = operation({
  id: 'listProductClocks',
  method: 'GET',
  path: '/api/products/{id}/clocks',
  summary: 'Declared clocks and converters of a product, newest first, withdrawn ones among them',
  permission: 'clock.list',
  status: 200,
  params: idParams,
  query: pageQuery,
  reply: pageOf(clockView),
});
export const addProductClock = operation({
  id: 'addProductClock',
  method: 'POST',
  path: '/api/products/{id}/clocks',
  summary: 'Declare a clock or a switching converter of a product',
  permission: 'clock.write',
  status: 201,
  params: idParams,
  body: addClockBody,
  reply: clockView,
  idempotent: true,
});
export const readProductClock = operation({
  id: 'readProductClock',
  method: 'GET',
  path: '/api/clocks/{id}',
  summary: 'One declared clock',
  permission: 'clock.list',
  status: 200,
  params: idParams,
  reply: clockView,
});
export const changeProductClock = operation({
  id: 'changeProductClock',
  method: 'PATCH',
  path: '/api/clocks/{id}',
  summary: 'Correct a declared clock',
  permission: 'clock.write',
  status: 200,
  params: idParams,
  body: changeClockBody,
  reply: clockView,
  ifMatch: true,
});
export const withdrawProductClock = operation({
  id: 'withdrawProductClock',
  method: 'POST',
  path: '/api/clocks/{id}/withdraw',
  summary: 'Withdraw a declared clock with a reason; it stays on record and explains nothing any more',
  permission: 'clock.write',
  status: 200,
  params: idParams,
  body: z.strictObject({ reason: z.string().trim().min(1, 'is needed').max(300, 'takes at most 300 characters') }),
  reply: clockView,
  ifMatch: true,
});
