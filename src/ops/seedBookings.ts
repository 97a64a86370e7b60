import { bookings as demoBookings, positions as demoPositions, resultMails } from '@fixtures/demo/bookings';
import type { Moment } from '@fixtures/demo/types';
import { ModificationState } from '@/models/modificationState';
import { OutboxMessage } from '@/models/outboxMessage';
import { ResultMail } from '@/models/resultMail';
import type { Sample } from '@/models/sample';
import { createBooking } from '@/services/bookings';
import { moveSample } from '@/services/custody';
import { enterPosition } from '@/services/positions';
import { previewResultMail, sendResultMail } from '@/services/resultMails';
import type { SeededPeople } from './seedPeople';

type At = (day: number, time?: string) => Date;

/** Test positions by their codes. */
export async function seedPositions(people: SeededPeople, at: At): Promise<Map<string, string>> {
  const seeded = new Map<string, string>();
  for (const { capabilities, ...position } of demoPositions) {
    const entry = { ...position, capabilities: [...capabilities] };
    seeded.set(position.code, (await enterPosition(people.actor('anselm'), entry, at(-398))).id);
  }
  return seeded;
}

/** The story’s bookings, all made two days ago. Answers how many. */
export async function seedBookings(
  people: SeededPeople,
  positions: Map<string, string>,
  states: Map<string, string>,
  at: At,
): Promise<number> {
  const instant = ({ day, time }: Moment) => at(day, time).toISOString();
  for (const { position, state, by, work, from, to } of demoBookings) {
    const stateId = states.get(state)!;
    const row = await ModificationState.findOne({ where: { publicId: stateId }, include: ['sample'] });
    const { sample } = row as ModificationState & { sample: Sample };
    await createBooking(
      people.actor('anselm'),
      {
        positionId: positions.get(position)!,
        technicianId: people.actor(by).publicId,
        sampleId: sample.publicId,
        stateId,
        work,
        startsAt: instant(from),
        endsAt: instant(to),
      },
      at(-2),
    );
  }
  return demoBookings.length;
}

/** Every sample that is booked lies on its shelf since it came. */
export async function seedCustody(people: SeededPeople, states: Map<string, string>, at: At): Promise<void> {
  const ids = [...new Set(demoBookings.map(({ state }) => states.get(state)!))];
  const rows = await ModificationState.findAll({
    where: { publicId: ids },
    include: ['sample'],
    order: [['id', 'ASC']],
  });
  const samples = new Set(rows.map((row) => (row as ModificationState & { sample: Sample }).sample.publicId));
  for (const id of samples) {
    await moveSample(people.actor('mira'), id, { place: 'shelf 2, sample store', note: '' }, at(-2));
  }
}

/** The story's result e-mails, composed and stored as every other; no mail server ever saw them, so their end is told. */
export async function seedResultMails(people: SeededPeople, states: Map<string, string>, at: At): Promise<void> {
  const manager = people.actor('anselm');
  for (const { state, to, note, at: sent, ended } of resultMails) {
    const asked = { stateId: states.get(state)!, recipientIds: [people.actor(to).publicId], note };
    const { digest } = await previewResultMail(manager, asked);
    const when = at(sent.day, sent.time);
    const { sendingId } = await sendResultMail(manager, { ...asked, digest }, when);
    await tellEnd(sendingId, ended.state, ended.words, when);
  }
}

async function tellEnd(sendingId: string, state: 'sent' | 'refused', words: string | null, when: Date): Promise<void> {
  const mails = await ResultMail.findAll({ where: { sendingId } });
  const doneAt = new Date(when.getTime() + 4000);
  const ended = { state, lastError: words, attempts: 1, doneAt };
  await OutboxMessage.update(ended, { where: { id: mails.map((mail) => mail.outboxId) } });
}
