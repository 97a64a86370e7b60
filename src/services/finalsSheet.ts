import { authorise, type Actor } from '@/auth/actor';
import { isOneEmission, type Place } from '@/emc/emissions';
import type { Port } from '@/emc/kinds';
import { limitAt } from '@/emc/limitLine';
import type { RetestPosition } from '@/emc/retests';
import { NotFound } from '@/errors';
import { LimitSet } from '@/models/limitSet';
import { ModificationState } from '@/models/modificationState';
import { SignalPath } from '@/models/signalPath';
import { SignalPathRevision } from '@/models/signalPathRevision';
import { unitOfWork } from '@/models/unitOfWork';
import { MOST_FINALS, type AskedFinal, type AskedRetest, type FinalsSheetView } from '@/schemas/finals';
import type { RetestItem, RetestFilters } from '@/schemas/retest';
import type { LimitLineView } from '@/schemas/sweep';
import { linesOf, toCoreLine } from './limitSets';
import { frequencyList } from './retests';
import { findRun, type Run } from './runs';
import { readSample } from './samples';
import { listPaths } from './signalPaths';

/** Of which run, or of which state and port. */
export type FinalsAsked = { runId: string } | { stateId: string; port: Port };

/** What waits for a final there, emission by emission at each position, and how it is measured by the run that asked. */
export async function readFinalsSheet(actor: Actor | null, asked: FinalsAsked): Promise<FinalsSheetView> {
  authorise(actor, 'sweep.keep');
  return unitOfWork(async () => {
    const run = 'runId' in asked ? await findRun(actor, asked.runId) : null;
    const place = run ? { stateId: run.state.publicId, port: run.port } : (asked as { stateId: string; port: Port });
    const filters: RetestFilters = run ? { ...place, runId: run.publicId } : place;
    const items = (await frequencyList(actor, filters)).sort(worseFirst);
    const source = run ?? (await sourceOf(actor, items));
    const state = await stateOf(actor, place.stateId);
    const set = source && (await standingSet(source.limitSet));
    const lines = set ? (await linesOf([set])).get(set.id)! : [];
    const all = positionsOf(items, lines);
    const { positions, leftOut } = atMost(all, MOST_FINALS);
    return {
      run: run && { id: run.publicId, number: run.number },
      ...state,
      port: place.port,
      positions,
      leftOut,
      proposed: source && set && (await proposedBy(source, set)),
      paths: await pathsOf(actor, place.port),
    };
  });
}

/** Over first, then the smallest margin, as the queue has it. */
function worseFirst(a: RetestItem, b: RetestItem): number {
  return (
    Number(a.reason !== 'over') - Number(b.reason !== 'over') ||
    a.marginDb! - b.marginDb! ||
    a.frequencyHz! - b.frequencyHz!
  );
}

async function sourceOf(actor: Actor, items: readonly RetestItem[]): Promise<Run | null> {
  const run = items.find((item) => item.run)?.run;
  return run ? findRun(actor, run.id) : null;
}

async function stateOf(actor: Actor, stateId: string) {
  const row = await ModificationState.findOne({ where: { publicId: stateId }, include: ['sample'] });
  if (!row) throw new NotFound('modification state');
  const { sample } = row as ModificationState & { sample: { publicId: string } };
  const { id, code, job, product, organisation, states } = await readSample(actor, sample.publicId);
  const state = states.find((one) => one.id === stateId)!;
  return {
    organisation: organisation.name,
    job: { id: job.id, number: job.number },
    sample: { id, code, product: `${product.name} ${product.code}` },
    state: { id: state.id, label: state.label },
  };
}

/** Every waiting position of every item, as rows: what two lines ask at one place is one emission to be read. */
function positionsOf(items: readonly RetestItem[], lines: readonly LimitLineView[]): FinalsSheetView['positions'] {
  const positions = new Map<RetestPosition, AskedFinal[]>();
  for (const item of items) {
    for (const position of item.waitsAt.length > 0 ? item.waitsAt : [item.position]) {
      const rows = positions.get(position) ?? [];
      positions.set(position, rows);
      const own = finalOf(item, position, lines);
      const same = rows.find((row) => isOneReading(row, own));
      if (same) same.retests.push(...own.retests);
      else rows.push(own);
    }
  }
  return [...positions].map(([position, finals]) => ({ position, finals }));
}

/** Whether one tuning of the receiver answers both. */
function isOneReading(row: AskedFinal, other: AskedFinal): boolean {
  const asked = new Set(row.retests.map(({ detector }) => detector));
  const free = other.retests.every(({ detector }) => !asked.has(detector));
  return free && row.rbwHz === other.rbwHz && isOneEmission(placeOf(row), placeOf(other));
}

const placeOf = ({ kind, fromHz, toHz, rbwHz }: AskedFinal): Place => ({ kind, fromHz, toHz, bandwidthHz: rbwHz });

const DETECTOR_ORDER = ['peak', 'quasi-peak', 'average'] as const;

function finalOf(item: RetestItem, position: RetestPosition, lines: readonly LimitLineView[]): AskedFinal {
  const { bandwidthHz: rbwHz, detector } = item.line!;
  const frequencyHz = item.frequencyHz!;
  const there = lines.filter((line) => line.bandwidthHz === rbwHz && limitAt(toCoreLine(line), frequencyHz) !== null);
  const named = new Set([detector, ...there.map((line) => line.detector)]);
  return {
    key: `${position ?? 'port'}-${item.id}`,
    kind: item.kind === 'floor' ? 'floor' : 'peak',
    frequencyHz,
    fromHz: item.fromHz!,
    toHz: item.toHz!,
    rbwHz,
    detectors: DETECTOR_ORDER.filter((one) => named.has(one)),
    retests: [retestOf(item)],
    heightM: item.heightM,
    azimuthDeg: item.azimuthDeg,
  };
}

function retestOf(item: RetestItem): AskedRetest {
  const { id, number, status, line, level, limit, marginDb, verdict } = item;
  return {
    ...{ id, number, status, reason: item.reason === 'over' ? 'over' : 'needs-final' },
    ...{ detector: line!.detector, lineName: line!.name, unit: line!.unit },
    ...{ level: level!, limit: limit!, marginDb: marginDb!, verdict: verdict! },
  };
}

function atMost(positions: FinalsSheetView['positions'], most: number) {
  let left = most;
  let leftOut = 0;
  const shown = positions.map(({ position, finals }) => {
    const some = finals.slice(0, left);
    left -= some.length;
    leftOut += finals.length - some.length;
    return { position, finals: some };
  });
  return { positions: shown.filter(({ finals }) => finals.length > 0), leftOut };
}

/** A set that was withdrawn takes no new run; what stands in its place is proposed. */
async function standingSet(set: LimitSet): Promise<LimitSet> {
  if (!set.withdrawnAt) return set;
  const { name, port } = set;
  return (await LimitSet.findOne({ where: { name, port, withdrawnAt: null }, order: [['revision', 'DESC']] })) ?? set;
}

async function proposedBy(run: Run, { publicId: id, name }: LimitSet): Promise<FinalsSheetView['proposed']> {
  const { distanceM, operatingMode, valuesHold, heightSwept, reading } = run;
  const revision = run.pathRevisionId === null ? null : await SignalPathRevision.findByPk(run.pathRevisionId);
  const path = revision && (await SignalPath.findByPk(revision.signalPathId));
  const unit = valuesHold === 'field' ? reading.traces[0]!.unit : 'dBuV';
  return {
    from: { id: run.publicId, number: run.number },
    pathId: path?.publicId ?? null,
    limitSet: { id, name },
    ...{ distanceM, operatingMode, valuesHold, unit, heightSwept },
    alreadyCorrected: reading.alreadyCorrected,
  };
}

/** The lab's paths of a port, with what keeps one from being used. */
async function pathsOf(actor: Actor, port: Port): Promise<FinalsSheetView['paths']> {
  const { items } = await listPaths(actor, { limit: 200 });
  return items
    .filter((path) => path.port === port)
    .map(({ id, code, name, revision, items: along }) => {
      const lapsed = along.find(({ due }) => due === 'lapsed');
      return { id, code, name, revision, wrong: lapsed ? `calibration of ${lapsed.identifier} lapsed` : null };
    })
    .sort((a, b) => (a.code < b.code ? -1 : 1));
}
