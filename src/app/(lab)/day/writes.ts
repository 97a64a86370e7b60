import type { Submittable } from '@/components/forms/send';

/** What the forms of the day sheet send; the schemas stay on the server, a test holds the two together. */
export const DAY_WRITES = {
  createBooking: { method: 'POST', path: '/api/bookings' },
  changeBooking: { method: 'PATCH', path: '/api/bookings/{id}' },
  cancelBooking: { method: 'POST', path: '/api/bookings/{id}/cancel' },
} as const satisfies Record<string, Submittable>;
