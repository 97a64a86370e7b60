import type { z } from 'zod';
import { authorise, type Actor } from '@/auth/actor';
import { LAYER_COLUMNS } from '@/emc/columns';
import { differenceOf, pairTraces, type TracePair } from '@/emc/difference';
import type { Columns } from '@/emc/types';
import { Invalid } from '@/errors';
import { readLayers } from '@/models/layerStore';
import { readPieces } from '@/models/traceStore';
import { unitOfWork } from '@/models/unitOfWork';
import { comparedRun, type comparisonQuery, type ComparisonView, type DifferenceView } from '@/schemas/comparison';
import { coarserStepHz, overlapOf, sameUnit, type Side } from './comparedRuns';
import { cautionsOf } from './comparisonCautions';
import { emissionsOf } from './comparisonEmissions';
import { inTurns } from './inTurns';
import { contextOf, findRun, type Run } from './runs';
import { readSweep } from './sweeps';
import { columnsView } from './sweepViews';
import { columnsOfPieces } from './sweepWindow';

interface Window {
  fromHz: number;
  toHz: number;
  columns: number;
}

/**
 * Two runs of one sample over each other: both runs' columns over one frame, their difference per stretch, and what
 * became of each emission. Throws Invalid when they are of different samples, NotFound for a run the actor may not see.
 */
export async function compareSweeps(
  actor: Actor | null,
  { a: idA, b: idB, fromHz, toHz, columns, only }: z.infer<typeof comparisonQuery>,
): Promise<ComparisonView> {
  authorise(actor, 'sweep.compare');
  if ((fromHz === undefined) !== (toHz === undefined)) {
    throw new Invalid([{ pointer: '/query/toHz', message: 'is named together with fromHz, or neither is' }]);
  }
  return unitOfWork(async () => {
    const [runA, runB] = [await findRun(actor, idA), await findRun(actor, idB)];
    if (runA.state.sampleId !== runB.state.sampleId) {
      throw new Invalid([{ pointer: '/query/b', message: 'is a run of another sample' }]);
    }
    const window = {
      fromHz: fromHz ?? Math.min(runA.firstHz, runB.firstHz),
      toHz: toHz ?? Math.max(runA.lastHz, runB.lastHz),
      columns,
    };
    if (!(window.toHz > window.fromHz)) {
      throw new Invalid([{ pointer: '/query/toHz', message: 'lies above fromHz' }]);
    }
    const a: Side = { run: runA, context: await contextOf(runA) };
    const b: Side = { run: runB, context: await contextOf(runB) };
    const pairs = sameUnit(a, b) ? pairTraces(a.context.heads, b.context.heads) : [];
    const [columnsA, columnsB] = [await columnsOf(a, window), await columnsOf(b, window)];
    const differences = pairs.map((pair) => difference(a.run, b.run, pair, columnsA, columnsB, window));
    const view = (columns: Map<number, Columns>) => [...columns].map(([index, one]) => columnsView(index, one));
    return {
      ...window,
      a: view(columnsA),
      b: view(columnsB),
      differences,
      about:
        only === 'columns'
          ? null
          : {
              a: await compared(actor, idA),
              b: await compared(actor, idB),
              emissions: await emissionsOf(a, b, pairs),
              cautions: cautionsOf(a, b, pairs),
            },
    };
  });
}

async function compared(actor: Actor, id: string) {
  return comparedRun.strip().parse(await readSweep(actor, id));
}

export interface TrialMove {
  /** The state's own run that the trial is laid beside. */
  own: string;
  /** At the trial's worst emission that both read: how much higher it is than in the own run, dB. */
  move: { frequencyHz: number; movedDb: number } | null;
}

/** What each trial moved against a run of its own state, by the trial's id. */
export async function movesOfTrials(
  actor: Actor | null,
  pairs: readonly { trial: string; own: string }[],
): Promise<Map<string, TrialMove>> {
  authorise(actor, 'sweep.compare');
  return unitOfWork(async () => {
    const moves = new Map<string, TrialMove>();
    for (const { trial, own } of pairs) {
      const [runA, runB] = [await findRun(actor, own), await findRun(actor, trial)];
      if (runA.state.sampleId !== runB.state.sampleId) continue;
      const a: Side = { run: runA, context: await contextOf(runA) };
      const b: Side = { run: runB, context: await contextOf(runB) };
      const laid = sameUnit(a, b) ? pairTraces(a.context.heads, b.context.heads) : [];
      const worst = (await emissionsOf(a, b, laid)).find(({ movedDb }) => movedDb !== null);
      const move = worst ? { frequencyHz: worst.frequencyHz, movedDb: worst.movedDb! } : null;
      moves.set(trial, { own, move });
    }
    return moves;
  });
}

/** Columns by trace index; of a whole run at the width of its kept layer nothing is computed. */
async function columnsOf({ run, context }: Side, window: Window): Promise<Map<number, Columns>> {
  if (window.fromHz === run.firstHz && window.toHz === run.lastHz && window.columns === LAYER_COLUMNS) {
    return new Map((await readLayers(run.evaluation.id)).map(({ index, layer }) => [index, layer]));
  }
  const pieces = await readPieces(run.id, window);
  const columns = new Map<number, Columns>();
  for (const head of context.heads) {
    columns.set(head.index, await inTurns(columnsOfPieces(head, context.judged, pieces, window)));
  }
  return columns;
}

function difference(
  a: Run,
  b: Run,
  pair: TracePair,
  columnsA: Map<number, Columns>,
  columnsB: Map<number, Columns>,
  window: Window,
): DifferenceView {
  const [one, other, overlap] = [columnsA.get(pair.a), columnsB.get(pair.b), overlapOf(a, b)];
  const found = one && other && overlap ? differenceOf(one, other, window, overlap, coarserStepHz(a, b)) : [];
  return {
    ...pair,
    fromHz: found.map(({ fromHz }) => fromHz),
    toHz: found.map(({ toHz }) => toHz),
    differenceDb: found.map(({ differenceDb }) => differenceDb),
  };
}
