import { QueryTypes } from 'sequelize';
import type { z } from 'zod';
import type { Actor } from '@/auth/actor';
import type { Recognition } from '@/ingest/types';
import { database } from '@/models/database';
import { FileShape } from '@/models/fileShape';
import type { StoredShapeAnswers } from '@/models/stored';
import type { Sweep } from '@/models/sweep';
import type { Upload } from '@/models/upload';
import type { keepSweep } from '@/schemas/sweep';
import type { SweepFileView } from '@/schemas/sweepFile';

function answersOf(body: z.infer<typeof keepSweep>): StoredShapeAnswers {
  const { port, pathId, limitSetId, distanceM, heightSwept, valuesHold, frequencyUnit } = body;
  return {
    port,
    pathId,
    limitSetId,
    distanceM,
    heightSwept,
    valuesHold,
    alreadyCorrected: body.alreadyCorrected ?? [],
    frequencyUnit,
    traces: body.traces.map(({ index, unit, detector, rbwHz }) => ({ index, unit, detector, rbwHz })),
  };
}

/**
 * Remembers how a file of this shape was read, to propose it for the next one; the last one kept counts. Call inside
 * the unit that keeps it. One statement, so that two benches that keep one shape at once do not wait for each other
 * twice.
 */
export async function rememberShape(
  actor: Actor,
  upload: Upload,
  run: Sweep,
  body: z.infer<typeof keepSweep>,
  at: Date,
): Promise<void> {
  const { shape } = upload.recognition as unknown as Recognition;
  if (!shape) return;
  await database().query(
    `INSERT INTO file_shapes (shape, answers, sweep_id, kept, user_id, created_at, updated_at)
     VALUES (?, ?, ?, 1, ?, ?, ?)
     ON DUPLICATE KEY UPDATE answers = VALUES(answers), sweep_id = VALUES(sweep_id), kept = kept + 1,
       user_id = VALUES(user_id), updated_at = VALUES(updated_at)`,
    {
      replacements: [shape, JSON.stringify(answersOf(body)), run.id, actor.userId, at, at],
      type: QueryTypes.INSERT,
    },
  );
}

/** How the last file of a shape was read, and as which run. A run that was voided was perhaps misread: none then. */
export async function proposedByShape(shape: string): Promise<SweepFileView['asBefore']> {
  const row = (await FileShape.findOne({ where: { shape }, include: ['sweep'] })) as
    (FileShape & { sweep: Sweep }) | null;
  if (!row || row.sweep.voidedAt !== null) return null;
  return { run: { id: row.sweep.publicId, number: row.sweep.number }, ...row.answers };
}
