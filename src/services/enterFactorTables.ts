import type { z } from 'zod';
import { authorise, type Actor } from '@/auth/actor';
import { Conflict, Invalid, Unreadable, type Issue } from '@/errors';
import { settleFactor } from '@/ingest/factorTable';
import { IngestError } from '@/ingest/ingestError';
import { contradiction } from '@/ingest/lossOrGain';
import { Calibration } from '@/models/calibration';
import { Equipment } from '@/models/equipment';
import { FactorTableRevision } from '@/models/factorTableRevision';
import { newPublicId } from '@/models/publicId';
import { currentTransaction, unitOfWork } from '@/models/unitOfWork';
import type { EnteredFactorTables, enterFactorTableBody } from '@/schemas/tables';
import { recordChange } from './audit';
import { followTables } from './enterSignalPath';
import { readTableFile, type TableFile } from './factorTableFile';
import { findEquipment, TABLE_INCLUDE, tableSummary } from './factorTables';
import { dayIn, labSettings } from './lab';
import { outdatedSince } from './tableUse';

type Body = z.infer<typeof enterFactorTableBody>;

/**
 * Enters tables of a held file as the next revisions of their names, with their calibration; every path that uses an
 * older revision gets its next revision in the same transaction, so that runs measured from now on use the new ones
 * and earlier runs keep theirs.
 * @throws {Conflict} when a name has got another revision since the preview
 */
export async function enterFactorTables(
  actor: Actor | null,
  body: Body,
  at = new Date(),
): Promise<EnteredFactorTables> {
  authorise(actor, 'equipment.enter');
  return unitOfWork(async () => {
    const { id } = await findEquipment(body.equipmentId);
    // One person at a time enters tables of an item, so that two never make the same revision.
    const lock = currentTransaction().LOCK.UPDATE;
    const equipment = await Equipment.findByPk(id, { lock, rejectOnEmpty: true });
    const file = await readAsChosen(body);
    const { zone } = await labSettings();
    const calibration = await calibrationFor(body, equipment, dayIn(zone, at), at);
    const named = await FactorTableRevision.findAll({ where: { equipmentId: id }, order: [['revision', 'DESC']] });
    refuseChoice(body, file, named);
    const entered: FactorTableRevision[] = [];
    const replaced = new Map<string, string>();
    const older: FactorTableRevision[] = [];
    for (const table of body.tables) {
      const { name, polarisation, distanceM } = table;
      const column = file.columns[table.index]!;
      const settled = settleFactor(column, table.quantity ? { quantity: table.quantity } : {})!;
      const before = named.filter((row) => row.name === name);
      const row = await FactorTableRevision.create({
        publicId: newPublicId(),
        equipmentId: id,
        calibrationId: calibration.id,
        name,
        revision: (before[0]?.revision ?? 0) + 1,
        quantity: settled.quantity,
        polarisation,
        distanceM,
        frequenciesHz: column.frequencyHz,
        // Without a negative zero, which JSON would not keep.
        valuesDb: settled.valueDb.map((db) => db + 0),
        source: body.source,
        reason: body.reason,
        fileName: file.upload.name,
        fileSha256: file.upload.sha256,
        userId: actor.userId,
        createdAt: at,
      });
      entered.push(row);
      older.push(...before);
      for (const { publicId } of before) replaced.set(publicId, row.publicId);
    }
    const names = entered.map(({ name, revision }) => `${name} revision ${revision}`).join(' and ');
    recordChange(actor, {
      scope: 'lab',
      action: `${names} entered`.slice(0, 240),
      subjectType: 'equipment',
      subjectId: equipment.publicId,
      before: { tables: body.tables.map(({ revises }) => revises) },
      after: {
        tables: entered.map(({ publicId }) => publicId),
        calibration: calibration.publicId,
        sha256: file.upload.sha256,
        source: body.source,
        reason: body.reason,
      },
      at,
    });
    const followed = await followTables(actor, replaced, `${names} entered`, at);
    const rows = await FactorTableRevision.findAll({ where: { id: entered.map((row) => row.id) }, include: TABLE_INCLUDE, order: [['id', 'ASC']] }); // prettier-ignore
    return {
      tables: rows.map((row) => tableSummary(row, true)),
      paths: followed.map(({ path, revision }) => {
        return { id: path.publicId, code: path.code, name: path.name, revision: revision.revision };
      }),
      outdated: await outdatedSince(older, calibration.calibratedOn, zone),
    };
  });
}

async function readAsChosen({ fileId, frequencyUnit }: Body): Promise<TableFile> {
  try {
    return await readTableFile(fileId, { frequencyUnit });
  } catch (error) {
    if (error instanceof IngestError) throw new Unreadable(error.message, error.line, error.found, error.expected);
    throw error;
  }
}

/** What the choice leaves open or contradicts; every issue at once. */
function refuseChoice(body: Body, { columns }: TableFile, named: readonly FactorTableRevision[]): void {
  const issues: Issue[] = [];
  body.tables.forEach((table, i) => {
    const say = (field: string, message: string) => issues.push({ pointer: `/tables/${i}/${field}`, message });
    const column = columns[table.index];
    if (!column) return say('index', 'is no table of this file');
    const settled = settleFactor(column, table.quantity ? { quantity: table.quantity } : {});
    if (!settled) {
      const open = column.said.among ? 'what its figures are' : 'whether its figures are lost or gained';
      say('quantity', `is needed: the table does not say ${open}`);
    }
    const otherwise = settled && contradiction(column, settled.quantity);
    if (otherwise) say('quantity', `is ${otherwise}: the table is in ${column.unit}`);
    if (body.tables.findIndex(({ name }) => name === table.name) !== i) say('name', 'is used for two tables');
    if (body.tables.findIndex(({ index }) => index === table.index) !== i) say('index', 'is chosen twice');
    const before = named.find(({ name }) => name === table.name) ?? null;
    if ((before?.publicId ?? null) !== table.revises) {
      const now = before ? `is at revision ${before.revision} now` : 'has no revision yet';
      throw new Conflict(`${table.name} ${now}, otherwise than in the preview. Look at the difference again.`);
    }
    if (!before) return;
    const words = (value: string | null) => value?.replaceAll('-', ' ') ?? 'either polarisation';
    if (settled && settled.quantity !== before.quantity) {
      say(
        'quantity',
        `is ${words(before.quantity)} in revision ${before.revision}; another quantity takes a name of its own`,
      );
    }
    if (table.polarisation !== before.polarisation) {
      say(
        'polarisation',
        `is ${words(before.polarisation)} in revision ${before.revision}; another takes a name of its own`,
      );
    }
  });
  if (issues.length > 0) throw new Invalid(issues);
}

async function calibrationFor(body: Body, equipment: Equipment, today: string, at: Date): Promise<Calibration> {
  const { calibration } = body;
  if ('id' in calibration) {
    const row = await Calibration.findOne({ where: { publicId: calibration.id, equipmentId: equipment.id } });
    if (!row)
      throw new Invalid([{ pointer: '/calibration/id', message: `is no calibration of ${equipment.identifier}` }]);
    return row;
  }
  const { calibratedOn, dueOn } = calibration;
  if (calibratedOn > today)
    throw new Invalid([{ pointer: '/calibration/calibratedOn', message: 'lies in the future' }]);
  if (dueOn !== null && dueOn <= calibratedOn) {
    throw new Invalid([{ pointer: '/calibration/dueOn', message: 'lies before the calibration' }]);
  }
  return Calibration.create({ publicId: newPublicId(), equipmentId: equipment.id, ...calibration, createdAt: at });
}
