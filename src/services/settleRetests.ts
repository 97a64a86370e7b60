import { Op } from 'sequelize';
import type { Actor } from '@/auth/actor';
import type { Port } from '@/emc/kinds';
import type { Job } from '@/models/job';
import { ModificationState } from '@/models/modificationState';
import { Retest } from '@/models/retest';
import type { Sample } from '@/models/sample';
import { currentTransaction, unitOfWork } from '@/models/unitOfWork';
import { recordChange } from './audit';
import { inTurns } from './inTurns';
import { writeWanted, type Tally } from './retestChanges';
import { retestRows } from './retestRows';
import { speakingRuns } from './retestRuns';
import { wantedItems } from './retestWants';

export interface Settling {
  /** Row id of the modification state whose runs changed. */
  stateId: number;
  port: Port;
  /** Why, for the changes it writes: `run R-26-032 kept`. */
  because: string;
  at: Date;
}

/**
 * Brings the retest queue of one state and port in line with its runs, and then that of the state fitted after it,
 * which takes over whatever is still open here. Done twice it changes nothing the second time. Call inside the unit
 * that changed the runs: it holds the rows of this state and the later ones, in their order, so that two at once wait
 * for each other and an emission is never entered twice.
 */
export async function settleRetests(actor: Actor, settling: Settling): Promise<void> {
  await unitOfWork(async () => {
    const states = await lockFrom(settling.stateId);
    let at = states.findIndex(({ id }) => id === settling.stateId);
    while (at >= 0) {
      const next = states.findIndex(({ planned }, i) => i > at && !planned);
      await settleOne(actor, settling, states[at]!, states[next] ?? null);
      at = next;
    }
  });
}

type Held = ModificationState & { sample: Sample & { job: Job } };
const labelOf = ({ position }: ModificationState): string => `M${position}`;

/** The state and the later ones of its sample, held until the unit commits. */
async function lockFrom(stateId: number): Promise<Held[]> {
  const state = await ModificationState.findByPk(stateId, { rejectOnEmpty: true });
  const rows = await ModificationState.findAll({
    where: { sampleId: state.sampleId, position: { [Op.gte]: state.position } },
    order: [['position', 'ASC']],
    lock: currentTransaction().LOCK.UPDATE,
  });
  return rows as Held[];
}

async function settleOne(
  actor: Actor,
  { port, because, at }: Settling,
  state: ModificationState,
  next: ModificationState | null,
): Promise<void> {
  const before = await ModificationState.findAll({
    where: { sampleId: state.sampleId, position: { [Op.lt]: state.position }, planned: false },
    order: [['position', 'ASC']],
  });
  const { planned } = state;
  const carried = planned ? [] : await retestRows({ carriedTo: state.id }, port);
  const earlier = carried.length > 0 ? before.map(({ id }) => id) : [];
  const from = before.at(-1);
  const queue = {
    port,
    label: labelOf(state),
    runs: planned ? [] : await speakingRuns([state.id], port),
    earlier: earlier.length > 0 ? await speakingRuns(earlier, port) : [],
    carried,
    from: from ? labelOf(from) : null,
    rows: await retestRows({ stateId: state.id }, port),
  };
  const wanted = await inTurns(wantedItems(queue));
  const happening = { stateId: state.id, port, because, at, next: next && { id: next.id, label: labelOf(next) } };
  const tally = await writeWanted(actor, wanted, happening);
  if (Object.keys(tally).length > 0) await record(actor, state, { port, because, at }, tally);
}

async function record(
  actor: Actor,
  state: ModificationState,
  { port, because, at }: Omit<Settling, 'stateId'>,
  tally: Tally,
): Promise<void> {
  const include = [{ association: 'sample', include: ['job'] }];
  const { sample } = (await ModificationState.findByPk(state.id, { include, rejectOnEmpty: true })) as Held;
  const counts = Object.entries(tally).map(([action, numbers]) => `${numbers.length} ${action}`);
  recordChange(actor, {
    scope: `job-${sample.job.publicId}`,
    action: `retests of ${labelOf(state)}: ${counts.join(', ')}`,
    subjectType: 'state',
    subjectId: state.publicId,
    before: null,
    after: { port, because, ...tally },
    at,
  });
}

/**
 * A state was fitted, or is planned again: what is open on the state before goes on to it, or comes back. After a
 * modification a single frequency clears nothing, so the new state asks for the prescan of each position again.
 */
export async function settleFitting(actor: Actor, state: ModificationState, at = new Date()): Promise<void> {
  await unitOfWork(async () => {
    const states = await ModificationState.findAll({
      where: { sampleId: state.sampleId },
      order: [['position', 'ASC']],
    });
    const rows = await Retest.findAll({
      attributes: ['port'],
      where: { stateId: states.map(({ id }) => id) },
      group: ['port'],
    });
    const before = states.filter(({ planned, position }) => !planned && position < state.position).at(-1);
    const { planned } = states.find(({ id }) => id === state.id)!;
    const because = `${labelOf(state)} ${planned ? 'is planned again' : 'fitted'}`;
    for (const { port } of rows) {
      if (before) await settleRetests(actor, { stateId: before.id, port, because, at });
      if (planned) await settleRetests(actor, { stateId: state.id, port, because, at });
    }
  });
}
