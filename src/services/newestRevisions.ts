import { Invalid } from '@/errors';
import { FactorTableRevision } from '@/models/factorTableRevision';
import { LimitSet } from '@/models/limitSet';
import { SignalPathRevision } from '@/models/signalPathRevision';
import { dayIn, labSettings } from './lab';
import { contextWith, type Run, type RunContext } from './runs';

/** What a run would be judged with today. */
export async function contextNow(run: Run): Promise<RunContext & { limitSet: LimitSet }> {
  const limitSet = await limitSetNow(run.limitSet);
  const { decisionRule } = run.state.sample.job;
  for (const revision of await pathRevisionsNow(run)) {
    try {
      return { ...(await contextWith(run, revision, limitSet, decisionRule)), limitSet };
    } catch (error) {
      // A revision made for another distance or polarisation cannot serve this run; the one before it may.
      if (!(error instanceof Invalid)) throw error;
    }
  }
  const used = run.pathRevisionId === null ? null : await SignalPathRevision.findByPk(run.pathRevisionId);
  return { ...(await contextWith(run, used, limitSet, decisionRule)), limitSet };
}

/** The newest revision of the same-named set that is not withdrawn; the set itself where there is none. */
async function limitSetNow(set: LimitSet): Promise<LimitSet> {
  const { name, port, distanceM } = set;
  const where = { name, port, distanceM, withdrawnAt: null };
  const newest = await LimitSet.findOne({ where, order: [['revision', 'DESC']] });
  return newest && newest.revision > set.revision ? newest : set;
}

/**
 * Revisions of the run's path that hold for when it was measured, newest first. A later revision holds when it names
 * the same items, each over the same range, in the same order as the one in force then (other items were not in the path that day), and when none
 * of its tables comes from a calibration made after that day.
 */
async function pathRevisionsNow(run: Run): Promise<SignalPathRevision[]> {
  const used = run.pathRevisionId === null ? null : await SignalPathRevision.findByPk(run.pathRevisionId);
  if (!used) return [];
  const all = await SignalPathRevision.findAll({
    where: { signalPathId: used.signalPathId },
    order: [['revision', 'DESC']],
  });
  const measured = run.measuredAt ?? run.createdAt;
  const then = all.find(({ createdAt }) => createdAt <= measured) ?? used;
  const day = dayIn((await labSettings()).zone, measured);
  const later = await tablesAfter(all, day);
  const own = new Set(tableIds(used));
  return all.filter(
    (revision) =>
      itemsOf(revision) === itemsOf(then) && tableIds(revision).every((id) => own.has(id) || !later.has(id)),
  );
}

/** Items with their ranges: where a path is split decides which of two antennas a frequency was measured with. */
const itemsOf = ({ items }: SignalPathRevision) =>
  items.map(({ equipmentId, fromHz, toHz }) => `${equipmentId} ${fromHz ?? ''} ${toHz ?? ''}`).join(' ');

const tableIds = ({ items }: SignalPathRevision): string[] =>
  items.flatMap(({ tables }) => Object.values(tables)).filter((id): id is string => id !== null);

/** Tables of calibrations that were made after a day. */
async function tablesAfter(revisions: SignalPathRevision[], day: string): Promise<Set<string>> {
  const rows = await FactorTableRevision.findAll({
    where: { publicId: [...new Set(revisions.flatMap(tableIds))] },
    attributes: ['publicId'],
    include: [{ association: 'calibration', attributes: ['calibratedOn'] }],
  });
  type Dated = FactorTableRevision & { calibration: { calibratedOn: string } | null };
  const after = rows.filter((row) => ((row as Dated).calibration?.calibratedOn ?? '') > day);
  return new Set(after.map((row) => row.publicId));
}
