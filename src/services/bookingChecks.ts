import { Invalid, type Issue } from '@/errors';
import { Job } from '@/models/job';
import { ModificationState } from '@/models/modificationState';
import { Sample } from '@/models/sample';
import { TestPosition } from '@/models/testPosition';
import { currentTransaction } from '@/models/unitOfWork';
import { User } from '@/models/user';
import { QUARTER_MS, wallMs, wallOf } from '@/schemas/labTime';
import { LONGEST_DAYS, type Slot } from './bookingSlots';

/** What a booking names, by public id. */
export interface Wanted {
  positionId: string;
  technicianId: string;
  sampleId: string;
  stateId: string | null;
  startsAt: Date;
  endsAt: Date;
}

export interface Booked extends Slot {
  sampleId: number;
  stateId: number | null;
  /** Public id, for the audit chain. */
  jobId: string;
}

/**
 * The records a booking names, held against change until the unit commits: the job first, then person and position.
 * @throws {Invalid} with every reason at once: what is unknown, ended, disabled, retired or at an impossible time
 */
export async function bookable(wanted: Wanted, zone: string, at: Date): Promise<Booked> {
  const issues: Issue[] = spanIssues(wanted, zone, at);
  const say = (pointer: string, message: string) => void issues.push({ pointer, message });
  const lock = currentTransaction().LOCK;
  const sample = await Sample.findOne({ where: { publicId: wanted.sampleId } });
  const job = sample && (await Job.findByPk(sample.jobId, { lock: lock.UPDATE, rejectOnEmpty: true }));
  const states = sample ? await ModificationState.findAll({ where: { sampleId: sample.id } }) : [];
  const state = wanted.stateId === null ? null : states.find(({ publicId }) => publicId === wanted.stateId);
  const person = await User.findOne({ where: { publicId: wanted.technicianId }, lock: lock.SHARE });
  const position = await TestPosition.findOne({ where: { publicId: wanted.positionId }, lock: lock.SHARE });

  if (!sample) say('/sampleId', 'is not a sample of this lab');
  else if (job!.state !== 'open') say('/sampleId', `belongs to job ${job!.number}, which is ${job!.state}`);
  else if (states.every(({ planned }) => planned))
    say('/sampleId', 'has only planned states: nothing of it is here yet');
  if (sample && state === undefined) say('/stateId', 'is not a state of this sample');
  if (!person || person.role === 'designer') say('/technicianId', 'is not one of the lab’s people');
  else if (person.disabledAt !== null) say('/technicianId', 'is disabled and can no longer be booked');
  if (!position) say('/positionId', 'is not a test position of this lab');
  else if (position.state === 'retired') say('/positionId', `is retired: position ${position.code} takes no bookings`);
  if (issues.length) throw new Invalid(issues);
  return {
    positionId: position!.id,
    technicianId: person!.id,
    sampleId: sample!.id,
    stateId: state?.id ?? null,
    startsAt: wanted.startsAt,
    endsAt: wanted.endsAt,
    jobId: job!.publicId,
  };
}

/** Quarters of an hour, forward, at most ten days of the lab's wall, and not over already. */
export function spanIssues({ startsAt, endsAt }: Pick<Wanted, 'startsAt' | 'endsAt'>, zone: string, at: Date): Issue[] {
  const issues: Issue[] = [];
  const uneven = 'lies on a quarter of an hour, such as 13:00 or 13:15';
  if (startsAt.getTime() % QUARTER_MS !== 0) issues.push({ pointer: '/startsAt', message: uneven });
  if (endsAt.getTime() % QUARTER_MS !== 0) issues.push({ pointer: '/endsAt', message: uneven });
  const longestMs = LONGEST_DAYS * 86_400_000;
  if (endsAt <= startsAt) issues.push({ pointer: '/endsAt', message: 'comes after the start' });
  else if (wallMs(wallOf(endsAt, zone)) - wallMs(wallOf(startsAt, zone)) > longestMs) {
    issues.push({ pointer: '/endsAt', message: `is at most ${LONGEST_DAYS} days after the start` });
  } else if (endsAt <= at) issues.push({ pointer: '/endsAt', message: 'is over already' });
  return issues;
}
