import { Op, UniqueConstraintError } from 'sequelize';
import type { z } from 'zod';
import { authorise, authoriseCommander, type Actor, type Commander, personOf } from '@/auth/actor';
import { Conflict, NotFound } from '@/errors';
import { Booking } from '@/models/booking';
import { newPublicId } from '@/models/publicId';
import { TestPosition } from '@/models/testPosition';
import { currentTransaction, unitOfWork } from '@/models/unitOfWork';
import {
  CAPABILITIES,
  type Capability,
  type changePositionBody,
  type enterPositionBody,
  type PositionView,
} from '@/schemas/booking';
import { recordChange } from './audit';
import { olderThan, pageFrom, type PageRequest } from './paging';
import { changeVersioned } from './versions';

export function positionView(row: TestPosition): PositionView {
  const { publicId: id, version, code, name, description, state } = row;
  return { id, version, code, name, description, capabilities: row.capabilities as Capability[], state };
}

export async function listPositions(actor: Actor | null, page: PageRequest) {
  authorise(actor, 'position.list');
  return unitOfWork(async () => {
    const rows = await TestPosition.findAll({ where: olderThan(page), order: [['id', 'DESC']], limit: page.limit + 1 });
    return pageFrom(rows, page, positionView);
  });
}

export async function readPosition(actor: Actor | null, publicId: string): Promise<PositionView> {
  authorise(actor, 'position.list');
  return unitOfWork(async () => {
    const row = await TestPosition.findOne({ where: { publicId } });
    if (!row) throw new NotFound('test position');
    return positionView(row);
  });
}

/** Enters a test position; a manager at a browser, or the lab's server. */
export async function enterPosition(
  by: Commander | null,
  body: z.infer<typeof enterPositionBody>,
  at = new Date(),
): Promise<PositionView> {
  authoriseCommander(by, 'position.enter');
  return unitOfWork(async () => {
    const entry = { ...body, capabilities: inOrder(body.capabilities) };
    const row = await codeIsFree(() => TestPosition.create({ publicId: newPublicId(), ...entry, createdAt: at }));
    recordChange(personOf(by), {
      scope: 'lab',
      action: `test position ${row.code} entered`,
      subjectType: 'position',
      subjectId: row.publicId,
      before: null,
      after: entry,
      at,
    });
    return positionView(row);
  });
}

/** Corrects a position. One with bookings to come is not retired: they would lie where nobody looks. */
export async function changePosition(
  actor: Actor | null,
  publicId: string,
  version: number,
  body: z.infer<typeof changePositionBody>,
  at = new Date(),
): Promise<PositionView> {
  authorise(actor, 'position.enter');
  return unitOfWork(async () => {
    // A booking holds its position's row shared, so none is made while this one is being retired.
    const row = await TestPosition.findOne({ where: { publicId }, lock: currentTransaction().LOCK.UPDATE });
    if (!row) throw new NotFound('test position');
    const { code, name, description, capabilities, state } = row;
    const before = { code, name, description, capabilities, state };
    const values = { ...body, ...(body.capabilities && { capabilities: inOrder(body.capabilities) }) };
    if (state === 'in-use' && body.state === 'retired') await nothingToCome(row, at);
    await codeIsFree(() => changeVersioned(TestPosition, row, version, values, 'test position'));
    recordChange(actor, {
      scope: 'lab',
      action: `test position ${code} ${body.state === 'retired' && state !== 'retired' ? 'retired' : 'changed'}`,
      subjectType: 'position',
      subjectId: publicId,
      before,
      after: { ...before, ...values },
      at,
    });
    return positionView(await TestPosition.findByPk(row.id, { rejectOnEmpty: true }));
  });
}

async function nothingToCome(row: TestPosition, at: Date): Promise<void> {
  const count = await Booking.count({ where: { positionId: row.id, state: 'booked', endsAt: { [Op.gt]: at } } });
  if (count === 0) return;
  const still = count === 1 ? 'a booking' : `${count} bookings`;
  throw new Conflict(`Position ${row.code} has ${still} to come. Move or cancel ${count === 1 ? 'it' : 'them'} first.`);
}

const inOrder = (words: readonly Capability[]) => CAPABILITIES.filter((word) => words.includes(word));

async function codeIsFree<T>(write: () => Promise<T>): Promise<T> {
  try {
    return await write();
  } catch (error) {
    if (error instanceof UniqueConstraintError) throw new Conflict('Another test position has that code.');
    throw error;
  }
}
