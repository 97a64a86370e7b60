import { authorise, type Actor } from '@/auth/actor';
import { StaleVersion } from '@/errors';
import { SetupRecord } from '@/models/setupRecord';
import { Sweep } from '@/models/sweep';
import { currentTransaction, unitOfWork } from '@/models/unitOfWork';
import type { User } from '@/models/user';
import type { SetupBody, SetupRecordView, SetupView } from '@/schemas/setup';
import { recordChange } from './audit';
import { olderThan, pageFrom, type Page, type PageRequest } from './paging';
import { findRun, type Run } from './runs';
import { lockOpenJob } from './samples';
import { setupBriefs } from './setupBriefs';

type WithUser = SetupRecord & { user: User };

function view(row: SetupRecord): SetupRecordView {
  const {
    id: _,
    sweepId: __,
    userId: ___,
    createdAt,
    user,
    ...said
  } = (row as WithUser).get({
    plain: true,
  }) as SetupRecord & { user: User };
  return { ...said, by: { id: user.publicId, name: user.name }, at: createdAt.toISOString() };
}

/** How a run was set up, what nobody has said of it, and what was last said of another run of the same sample. */
export async function readSetup(actor: Actor | null, runId: string): Promise<SetupView> {
  authorise(actor, 'setup.read');
  return unitOfWork(async () => setupOf(await findRun(actor, runId)));
}

async function setupOf(run: Run): Promise<SetupView> {
  const record = await newest({ sweepId: run.id });
  return {
    runId: run.publicId,
    brief: (await setupBriefs([run])).get(run.id)!,
    record: record && view(record),
    last: await lastOfSample(run),
  };
}

const newest = (where: Record<string, unknown>) =>
  SetupRecord.findOne({ where, include: ['user'], order: [['id', 'DESC']] });

/** Of the same port when there is one: a table at the antenna and one at the AMN are laid out differently. */
async function lastOfSample(run: Run): Promise<SetupView['last']> {
  const { sampleId } = run.state;
  const others = await Sweep.findAll({
    attributes: ['id', 'port', 'publicId', 'number'],
    where: { voidedAt: null },
    include: [{ association: 'state', required: true, attributes: [], where: { sampleId } }],
    order: [['id', 'DESC']],
    limit: 200,
  });
  for (const some of [others.filter(({ port }) => port === run.port), others]) {
    const from = new Map(some.filter(({ id }) => id !== run.id).map((row) => [row.id, row]));
    const record = await newest({ sweepId: [...from.keys()] });
    if (!record) continue;
    const { publicId, number } = from.get(record.sweepId)!;
    return { run: { id: publicId, number }, record: view(record) };
  }
  return null;
}

/** Every record of a run's set-up, newest first: a correction leaves the earlier ones readable. */
export async function listSetupRevisions(
  actor: Actor | null,
  runId: string,
  page: PageRequest,
): Promise<Page<SetupRecordView>> {
  authorise(actor, 'setup.read');
  return unitOfWork(async () => {
    const run = await findRun(actor, runId);
    const rows = await SetupRecord.findAll({
      where: { sweepId: run.id, ...olderThan(page) },
      include: ['user'],
      order: [['id', 'DESC']],
      limit: page.limit + 1,
    });
    return pageFrom(rows, page, view);
  });
}

/**
 * Writes the next revision of a run's set-up. `body.corrects` names the revision it was written on.
 * @throws {StaleVersion} when somebody else has recorded one since
 */
export async function writeSetup(
  actor: Actor | null,
  runId: string,
  body: SetupBody,
  at = new Date(),
): Promise<SetupView> {
  authorise(actor, 'setup.write');
  return unitOfWork(async () => {
    const run = await findRun(actor, runId);
    const { job } = run.state.sample;
    await lockOpenJob(job.id);
    // Locked, so that two who write at once get different revisions.
    await Sweep.findByPk(run.id, { attributes: ['id'], lock: currentTransaction().LOCK.UPDATE });
    const before = await SetupRecord.findOne({
      where: { sweepId: run.id },
      order: [['revision', 'DESC']],
      lock: currentTransaction().LOCK.SHARE,
    });
    const { corrects, ...said } = body;
    if ((before?.revision ?? null) !== corrects) throw new StaleVersion(before?.revision ?? 0, 'record of the set-up');
    const revision = (corrects ?? 0) + 1;
    await SetupRecord.create({ ...said, sweepId: run.id, revision, userId: actor.userId, createdAt: at });
    recordChange(actor, {
      scope: `job-${job.publicId}`,
      action: revision === 1 ? 'set-up recorded' : `set-up corrected, revision ${revision}`,
      subjectType: 'sweep',
      subjectId: run.publicId,
      before: before && saidIn(before),
      after: { ...said, revision },
      at,
    });
    return setupOf(run);
  });
}

function saidIn(row: SetupRecord): Record<string, unknown> {
  const { id: _, sweepId: __, userId: ___, createdAt: ____, ...said } = row.get({ plain: true });
  return said;
}
