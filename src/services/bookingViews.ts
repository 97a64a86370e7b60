import { NotFound } from '@/errors';
import { Booking } from '@/models/booking';
import type { Job } from '@/models/job';
import type { ModificationState } from '@/models/modificationState';
import type { Organisation } from '@/models/organisation';
import type { Product } from '@/models/product';
import type { Sample } from '@/models/sample';
import type { TestPosition } from '@/models/testPosition';
import type { User } from '@/models/user';
import type { BookingView } from '@/schemas/booking';
import { stateLabel } from './samples';

export type WholeBooking = Booking & {
  position: TestPosition;
  technician: User;
  sample: Sample & { job: Job & { organisation: Organisation; product: Product } };
  modification: ModificationState | null;
};
const JOB = { association: 'job', include: ['organisation', 'product'] };
export const BOOKING_INCLUDE = [
  { association: 'position' },
  { association: 'technician' },
  { association: 'sample', include: [JOB] },
  { association: 'modification' },
];

export function bookingView(row: Booking): BookingView {
  const { position, technician, sample, modification } = row as WholeBooking;
  const { job } = sample;
  return {
    id: row.publicId,
    version: row.version,
    position: { id: position.publicId, code: position.code, name: position.name },
    technician: { id: technician.publicId, name: technician.name },
    sample: { id: sample.publicId, code: sample.code, serial: sample.serial },
    state: modification && {
      id: modification.publicId,
      label: stateLabel(modification.position),
      description: modification.description,
      planned: modification.planned,
    },
    product: { id: job.product.publicId, code: job.product.code, name: job.product.name },
    organisation: { id: job.organisation.publicId, name: job.organisation.name },
    job: { id: job.publicId, number: job.number },
    work: row.work,
    startsAt: row.startsAt.toISOString(),
    endsAt: row.endsAt.toISOString(),
    cancelled: row.state === 'cancelled' ? { reason: row.cancelReason ?? '' } : null,
  };
}

export async function findBooking(publicId: string): Promise<WholeBooking> {
  const row = await Booking.findOne({ where: { publicId }, include: BOOKING_INCLUDE });
  if (!row) throw new NotFound('booking');
  return row as WholeBooking;
}
