import { z } from 'zod';
import { instant, organisationRef, pageOf, pageQuery, person, publicId, version } from './common';
import { operation } from './operation';

const idParams = z.strictObject({ id: publicId });
const text = (max: number) => z.string().trim().min(1, 'is needed').max(max, `takes at most ${max} characters`);
const optionalText = (max: number) => z.string().trim().max(max, `takes at most ${max} characters`);

/* Test positions: where a sample is measured. */

/** What a position is good for, and what can hurt there: the day sheet shows the caution that goes with a word. */
export const CAPABILITIES = [
  'radiated',
  'conducted',
  'magnetic-field',
  'common-mode-current',
  'mains-network',
  'shielded-room',
  'turntable-and-mast',
  'rf-field',
] as const;
export const capability = z.enum(CAPABILITIES);
export type Capability = z.infer<typeof capability>;
const capabilities = z.array(capability).max(CAPABILITIES.length);

export const positionView = z.strictObject({
  id: publicId,
  version,
  code: z.string(),
  name: z.string(),
  description: z.string(),
  capabilities: z.array(capability),
  state: z.enum(['in-use', 'retired']),
});
export type PositionView = z.infer<typeof positionView>;
const code = z
  .string()
  .trim()
  .regex(/^[A-Za-z0-9-]{1,8}$/, 'takes 1 to 8 letters, digits or hyphens, such as A');
export const enterPositionBody = z.strictObject({
  code,
  name: text(80),
  description: optionalText(500).default(''),
  capabilities: capabilities.default([]),
});
export const changePositionBody = z.strictObject({
  code: code.optional(),
  name: text(80).optional(),
  description: optionalText(500).optional(),
  capabilities: capabilities.optional(),
  state: z.enum(['in-use', 'retired']).optional(),
});
export const listPositions = operation({
  id: 'listPositions',
  method: 'GET',
  path: '/api/positions',
  summary: 'Test positions of the lab, newest first',
  permission: 'position.list',
  status: 200,
  query: pageQuery,
  reply: pageOf(positionView),
});
export const readPosition = operation({
  id: 'readPosition',
  method: 'GET',
  path: '/api/positions/{id}',
  summary: 'One test position',
  permission: 'position.list',
  status: 200,
  params: idParams,
  reply: positionView,
});
export const enterPosition = operation({
  id: 'enterPosition',
  method: 'POST',
  path: '/api/positions',
  summary: 'Enter a test position',
  permission: 'position.enter',
  status: 201,
  body: enterPositionBody,
  reply: positionView,
  idempotent: true,
});
export const changePosition = operation({
  id: 'changePosition',
  method: 'PATCH',
  path: '/api/positions/{id}',
  summary: 'Correct a test position, retire it or take it into use again',
  permission: 'position.enter',
  status: 200,
  params: idParams,
  body: changePositionBody,
  reply: positionView,
  ifMatch: true,
});

/* Bookings: a position and a person for a sample, from one quarter of an hour to another. */

export const bookingView = z.strictObject({
  id: publicId,
  version,
  position: z.strictObject({ id: publicId, code: z.string(), name: z.string() }),
  technician: person,
  sample: z.strictObject({ id: publicId, code: z.string(), serial: z.string() }),
  /** null: the booking is for the sample, whatever state it is in by then. */
  state: z.strictObject({ id: publicId, label: z.string(), description: z.string(), planned: z.boolean() }).nullable(),
  product: z.strictObject({ id: publicId, code: z.string(), name: z.string() }),
  organisation: organisationRef,
  job: z.strictObject({ id: publicId, number: z.string() }),
  work: z.string(),
  startsAt: instant,
  /** The first instant after it. */
  endsAt: instant,
  cancelled: z.strictObject({ reason: z.string() }).nullable(),
});
export type BookingView = z.infer<typeof bookingView>;
export const createBookingBody = z.strictObject({
  positionId: publicId,
  sampleId: publicId,
  stateId: publicId.nullable().default(null),
  technicianId: publicId,
  work: text(120),
  startsAt: instant,
  endsAt: instant,
});
export const changeBookingBody = z.strictObject({
  positionId: publicId.optional(),
  stateId: publicId.nullable().optional(),
  technicianId: publicId.optional(),
  work: text(120).optional(),
  startsAt: instant.optional(),
  endsAt: instant.optional(),
});
export const listBookings = operation({
  id: 'listBookings',
  method: 'GET',
  path: '/api/bookings',
  summary: 'Bookings that touch a span, in the order they begin; cancelled ones only when asked for',
  permission: 'booking.list',
  status: 200,
  query: z.strictObject({
    ...pageQuery.shape,
    from: instant.optional(),
    to: instant.optional(),
    positionId: publicId.optional(),
    technicianId: publicId.optional(),
    sampleId: publicId.optional(),
    cancelled: z.enum(['with']).optional(),
  }),
  reply: pageOf(bookingView),
});
export const readBooking = operation({
  id: 'readBooking',
  method: 'GET',
  path: '/api/bookings/{id}',
  summary: 'One booking',
  permission: 'booking.list',
  status: 200,
  params: idParams,
  reply: bookingView,
});
export const createBooking = operation({
  id: 'createBooking',
  method: 'POST',
  path: '/api/bookings',
  summary: 'Book a test position and a technician for a sample',
  permission: 'booking.write',
  status: 201,
  body: createBookingBody,
  reply: bookingView,
  idempotent: true,
});
export const changeBooking = operation({
  id: 'changeBooking',
  method: 'PATCH',
  path: '/api/bookings/{id}',
  summary: 'Move a booking to another time, position or technician',
  permission: 'booking.write',
  status: 200,
  params: idParams,
  body: changeBookingBody,
  reply: bookingView,
  ifMatch: true,
});
export const cancelBooking = operation({
  id: 'cancelBooking',
  method: 'POST',
  path: '/api/bookings/{id}/cancel',
  summary: 'Cancel a booking with a reason',
  permission: 'booking.write',
  status: 200,
  params: idParams,
  body: z.strictObject({ reason: text(300) }),
  reply: bookingView,
  ifMatch: true,
});
