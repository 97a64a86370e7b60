import { visibleOrganisation, type Actor } from '@/auth/actor';
import type { Detector } from '@/emc/kinds';
import { Conflict, Invalid, type Issue } from '@/errors';
import { Retest } from '@/models/retest';
import { ModificationState } from '@/models/modificationState';
import type { FinalsBody } from '@/schemas/finals';
import type { SweepChoice } from '@/schemas/sweep';
import { finalsFile, groupFinals, type FinalsGroup } from './finalsFile';
import { positionWords } from './retestSentences';
import type { WholeState } from './runs';
import { findSample, stateLabel } from './samples';

/** One file of typed finals with how it is read. */
export interface ComposedFinals {
  group: FinalsGroup;
  file: { name: string; bytes: Uint8Array };
  choice: SweepChoice;
}

export interface Composed {
  state: WholeState;
  files: ComposedFinals[];
}

/**
 * The typed finals of one position as files, each with how it is read; queries only. Throws Invalid with the place of
 * what cannot be kept: a frequency typed twice, a retest of another state or port.
 */
export async function composeFinals(actor: Actor, body: FinalsBody, at: Date): Promise<Composed> {
  const state = await findOpenState(actor, body.stateId);
  const retests = await retestsOf(body, state);
  const groups = groupFinals(body.finals);
  refuseTwice(body, groups);
  const { sample } = state;
  const position = body.port === 'enclosure' ? body.polarisation : body.port === 'ac-mains' ? body.line : null;
  const facts = {
    by: actor.name,
    at,
    job: sample.job.number,
    sample: sample.code,
    state: stateLabel(state.position),
    place: position === null ? body.port : positionWords(position),
    retests,
  };
  const files = groups.map((group) => ({
    group,
    file: finalsFile(group, body, facts),
    choice: choiceOf(body, group),
  }));
  return { state, files };
}

async function findOpenState(actor: Actor, publicId: string): Promise<WholeState> {
  const own = visibleOrganisation(actor);
  const job = { association: 'job', required: true, ...(own !== null && { where: { organisationId: own } }) };
  const include = [{ association: 'sample', required: true, include: [job] }];
  const state = (await ModificationState.findOne({ where: { publicId }, include })) as WholeState | null;
  if (!state) throw new Invalid([{ pointer: '/stateId', message: 'is not a modification state of this lab' }]);
  await findSample(actor, state.sample.publicId);
  const { number, state: jobState } = state.sample.job;
  if (jobState !== 'open') throw new Conflict(`Job ${number} is ${jobState}. Reopen it first.`);
  return state;
}

/** Their numbers by id; each has to be one of this state and port. */
async function retestsOf({ finals, port }: FinalsBody, state: ModificationState): Promise<Map<string, string>> {
  const ids = [...new Set(finals.flatMap(({ retestIds }) => retestIds))];
  const rows = await Retest.findAll({ where: { publicId: ids, stateId: state.id, port } });
  const numbers = new Map(rows.map(({ publicId, number }) => [publicId, number]));
  const issues = finals.flatMap(({ retestIds }, i) =>
    retestIds.flatMap((id, j): Issue[] =>
      numbers.has(id)
        ? []
        : [{ pointer: `/finals/${i}/retestIds/${j}`, message: 'is not a retest of this state and port' }],
    ),
  );
  if (issues.length > 0) throw new Invalid(issues);
  return numbers;
}

/** Two rows at one frequency are a sweep over time to whoever reads the file again. */
function refuseTwice({ finals }: FinalsBody, groups: readonly FinalsGroup[]): void {
  const issues: Issue[] = [];
  for (const [i, { readings }] of finals.entries()) {
    const twice = readings.findIndex(({ detector }, j) => readings.findIndex((one) => one.detector === detector) < j);
    if (twice >= 0) issues.push({ pointer: `/finals/${i}/readings/${twice}/detector`, message: 'was read already' });
  }
  for (const { finals: rows } of groups) {
    for (const [i, { final, index }] of rows.entries()) {
      const before = rows[i - 1];
      if (before?.final.frequencyHz !== final.frequencyHz) continue;
      const message = `is that of final ${before.index + 1} too; keep the higher of the two`;
      issues.push({ pointer: `/finals/${index}/frequencyHz`, message });
    }
  }
  if (issues.length > 0) throw new Invalid(issues);
}

const NAMES: Partial<Record<Detector, string>> = { peak: 'Peak', 'quasi-peak': 'Quasi-peak', average: 'Average' };

function choiceOf(body: FinalsBody, { detectors, rbwHz }: FinalsGroup): SweepChoice {
  const { port, line, polarisation, distanceM, pathId, limitSetId, valuesHold, unit, alreadyCorrected } = body;
  return {
    purpose: 'final',
    ...{ port, line, polarisation, distanceM, pathId, limitSetId, valuesHold, alreadyCorrected },
    frequencyUnit: 'MHz',
    centreHz: null,
    sweepIndex: null,
    keepPartial: false,
    traces: detectors.map((detector, index) => ({ index, name: NAMES[detector]!, unit, detector, rbwHz })),
  };
}
