import type { z } from 'zod';
import { authorise, type Actor } from '@/auth/actor';
import { columnAccumulator, LAYER_COLUMNS } from '@/emc/columns';
import { hangTrace, judgeSegment, type TraceHead } from '@/emc/segment';
import type { Columns, EvaluationInput } from '@/emc/types';
import { Invalid } from '@/errors';
import { readLayers } from '@/models/layerStore';
import { readPieces, type StoredPiece } from '@/models/traceStore';
import { unitOfWork } from '@/models/unitOfWork';
import type { windowQuery, WindowView } from '@/schemas/sweep';
import { inTurns } from './inTurns';
import { contextOf, findRun, type Run } from './runs';
import { columnsView } from './sweepViews';

/**
 * Extremes per log-frequency column of a range. The whole run at the layer's own width comes from the kept layer;
 * anything else is computed from the points, by the code that made the evaluation.
 */
export async function readWindow(
  actor: Actor | null,
  publicId: string,
  { fromHz, toHz, columns }: z.infer<typeof windowQuery>,
): Promise<WindowView> {
  authorise(actor, 'sweep.read');
  if (!(toHz > fromHz)) throw new Invalid([{ pointer: '/query/toHz', message: 'lies above fromHz' }]);
  return unitOfWork(async () => {
    const run = await findRun(actor, publicId);
    if (fromHz <= run.firstHz && toHz >= run.lastHz && columns === LAYER_COLUMNS) return overviewOf(run);
    const { heads, judged } = await contextOf(run);
    const pieces = await readPieces(run.id, { fromHz, toHz });
    const window = { fromHz, toHz, columns };
    const traces = [];
    for (const head of heads) {
      traces.push(columnsView(head.index, await inTurns(columnsOfPieces(head, judged, pieces, window))));
    }
    return { ...window, traces };
  });
}

/** Judges a trace and collects its columns, one stored piece per step. */
export function* columnsOfPieces(
  head: TraceHead,
  { terms, lines }: Pick<EvaluationInput, 'terms' | 'lines'>,
  pieces: readonly StoredPiece[],
  { fromHz, toHz, columns }: { fromHz: number; toHz: number; columns: number },
): Generator<void, Columns> {
  const hung = hangTrace(head, terms, lines);
  const accumulator = columnAccumulator(fromHz, toHz, columns);
  for (const { frequencyHz, levels } of pieces) {
    accumulator.add(judgeSegment(hung, frequencyHz, levels.get(head.index)!));
    yield;
  }
  return accumulator.finish();
}

/** The whole run at the width of its kept layer, which no request has to compute. */
export async function readOverview(actor: Actor | null, publicId: string): Promise<WindowView> {
  authorise(actor, 'sweep.read');
  return unitOfWork(async () => overviewOf(await findRun(actor, publicId)));
}

async function overviewOf(run: Run): Promise<WindowView> {
  const layers = await readLayers(run.evaluation.id);
  const traces = layers.map(({ index, layer }) => columnsView(index, layer));
  return { fromHz: run.firstHz, toHz: run.lastHz, columns: LAYER_COLUMNS, traces };
}
