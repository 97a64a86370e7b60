import { Op, QueryTypes } from 'sequelize';
import { authorise, type Actor } from '@/auth/actor';
import { VERDICTS } from '@/emc/kinds';
import { Booking } from '@/models/booking';
import { database } from '@/models/database';
import type { Evaluation } from '@/models/evaluation';
import { ModificationState } from '@/models/modificationState';
import { Sample } from '@/models/sample';
import { Sweep } from '@/models/sweep';
import { TestPosition } from '@/models/testPosition';
import { unitOfWork } from '@/models/unitOfWork';
import { User } from '@/models/user';
import type { CustodyView } from '@/schemas/custody';
import type { BookingChoices, DayBooking, DayView } from '@/schemas/day';
import { addDays, dayBounds } from '@/schemas/labTime';
import { overlapping } from './bookingSlots';
import { placesOf } from './custody';
import { BOOKING_INCLUDE, bookingView, type WholeBooking } from './bookingViews';
import { dayIn, labSettings } from './lab';
import { positionView } from './positions';
import { stateLabel } from './samples';

/** More would not be read on one sheet; a lab of ten positions in quarters of an hour stays below it. */
const MOST_BOOKINGS = 500;
/** Samples of open jobs that a form offers; older ones are booked by their address of the API. */
const MOST_CHOICES = 300;

/** One day in the lab's zone; today without a day. Positions with their bookings and what came of those that are over. */
export async function readDay(actor: Actor | null, asked: string | null, at = new Date()): Promise<DayView> {
  authorise(actor, 'booking.list');
  return unitOfWork(async () => {
    const { zone } = await labSettings();
    const today = dayIn(zone, at);
    const day = asked ?? today;
    const { from, to } = dayBounds(day, zone);
    const rows = await Booking.findAll({
      where: overlapping({ startsAt: from, endsAt: to }),
      include: BOOKING_INCLUDE,
      order: [
        ['startsAt', 'ASC'],
        ['id', 'ASC'],
      ],
      limit: MOST_BOOKINGS,
    });
    const booked = [...new Set(rows.map((row) => row.positionId))];
    const positions = await TestPosition.findAll({
      where: { [Op.or]: [{ state: 'in-use' }, { id: booked }] },
      order: [['code', 'ASC']],
    });
    return {
      day,
      zone,
      now: at.toISOString(),
      today,
      before: addDays(day, -1),
      after: addDays(day, 1),
      from: from.toISOString(),
      to: to.toISOString(),
      positions: positions.map(positionView),
      bookings: await withWhatCame(actor, rows, at),
    };
  });
}

async function withWhatCame(actor: Actor, rows: Booking[], at: Date): Promise<DayBooking[]> {
  const states = await ModificationState.findAll({
    where: { sampleId: [...new Set(rows.map((row) => row.sampleId))] },
  });
  const stateId = states.map(({ id }) => id);
  const runs = await runsBetween(stateId, rows);
  const retests = await openRetests(stateId);
  const places = await placesOf(rows.map((row) => row.sampleId));
  return rows.map((row) => {
    const own = states.filter((state) =>
      row.stateId === null ? state.sampleId === row.sampleId : state.id === row.stateId,
    );
    const speaksFor = (id: number) => own.some((state) => state.id === id);
    const within = runs.filter((run) => {
      const measured = run.measuredAt ?? run.createdAt;
      return speaksFor(run.stateId) && row.startsAt <= measured && measured < row.endsAt;
    });
    const verdicts = within.map(({ evaluation }) => evaluation.verdict);
    return {
      ...bookingView(row),
      own: row.technicianId === actor.userId,
      verdict: VERDICTS.find((verdict) => verdicts.includes(verdict)) ?? null,
      runs: within.length,
      openRetests: own.reduce((sum, { id }) => sum + (retests.get(id) ?? 0), 0),
      clashes: row.endsAt > at ? clashesOf(row as WholeBooking) : [],
      place: placeOf(places.get(row.sampleId)),
    };
  });
}

const placeOf = (move?: CustodyView) => (move ? { place: move.place, at: move.at } : null);

/** What of a booking does not hold any more. */
function clashesOf({ technician, position, sample }: WholeBooking): string[] {
  const { job } = sample;
  return [
    ...(technician.disabledAt ? [`${technician.name} is disabled and cannot come.`] : []),
    ...(position.state === 'retired' ? [`Position ${position.code} is retired.`] : []),
    ...(job.state === 'open' ? [] : [`Job ${job.number} is ${job.state}.`]),
  ];
}

/** Retests that wait or are scheduled, by the state (row id) they are of. */
async function openRetests(stateIds: number[]): Promise<Map<number, number>> {
  if (stateIds.length === 0) return new Map();
  const rows = await database().query<{ stateId: number; open: number }>(
    `SELECT state_id AS stateId, COUNT(*) AS open FROM retests
      WHERE state_id IN (:stateIds) AND status IN ('waiting', 'scheduled') GROUP BY state_id`,
    { replacements: { stateIds }, type: QueryTypes.SELECT },
  );
  return new Map(rows.map(({ stateId, open }) => [Number(stateId), Number(open)]));
}

type Run = Sweep & { evaluation: Evaluation };

/** Runs that speak for their state and were measured (kept, where the file did not say) while any of the bookings lasted. */
async function runsBetween(stateId: number[], rows: Booking[]): Promise<Run[]> {
  if (rows.length === 0) return [];
  const within = {
    [Op.gte]: new Date(Math.min(...rows.map((row) => row.startsAt.getTime()))),
    [Op.lt]: new Date(Math.max(...rows.map((row) => row.endsAt.getTime()))),
  };
  const when = [{ measuredAt: within }, { measuredAt: null, createdAt: within }];
  const speaking = { purpose: ['prescan', 'final'], trial: null, voidedAt: null, evaluationId: { [Op.not]: null } };
  return (await Sweep.findAll({
    where: { stateId, ...speaking, [Op.or]: when } as never,
    include: ['evaluation'],
  })) as Run[];
}

/** Positions in use, the lab's people who can sign in, and samples of open jobs with their states, newest first. */
export async function bookingChoices(actor: Actor | null): Promise<BookingChoices> {
  authorise(actor, 'booking.write');
  return unitOfWork(async () => {
    const positions = await TestPosition.findAll({ where: { state: 'in-use' }, order: [['code', 'ASC']] });
    const people = await User.findAll({
      where: { role: ['technician', 'manager'], disabledAt: null },
      order: [
        ['role', 'DESC'],
        ['name', 'ASC'],
      ],
    });
    const job = { association: 'job', required: true, where: { state: 'open' }, include: ['product'] };
    const samples = (await Sample.findAll({
      include: [job, 'states'],
      order: [['id', 'DESC']],
      limit: MOST_CHOICES,
    })) as (Sample & { job: { product: { code: string } }; states: ModificationState[] })[];
    return {
      positions: positions.map(({ publicId: id, code, name }) => ({ id, word: `${code}, ${name}` })),
      people: people.map(({ publicId: id, name }) => ({ id, name })),
      samples: samples
        .filter(({ states }) => states.some(({ planned }) => !planned))
        .map((sample) => ({
          id: sample.publicId,
          word: `${sample.job.product.code}, ${sample.code}`,
          states: [...sample.states]
            .sort((a, b) => b.position - a.position)
            .map(({ publicId: id, position, planned }) => ({
              id,
              word: `${stateLabel(position)}${planned ? ', planned' : ''}`,
            })),
        })),
    };
  });
}
