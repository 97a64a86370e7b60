import type { z } from 'zod';
import { authorise, type Actor } from '@/auth/actor';
import { columnAccumulator, LAYER_COLUMNS } from '@/emc/columns';
import { hangTrace, judgeSegment } from '@/emc/segment';
import { Invalid } from '@/errors';
import { readLayers } from '@/models/layerStore';
import { readPieces } from '@/models/traceStore';
import { unitOfWork } from '@/models/unitOfWork';
import type { windowQuery, WindowView } from '@/schemas/sweep';
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
    const traces = heads.map((head) => {
      const hung = hangTrace(head, judged.terms, judged.lines);
      const accumulator = columnAccumulator(fromHz, toHz, columns);
      for (const piece of pieces) accumulator.add(judgeSegment(hung, piece.frequencyHz, piece.levels.get(head.index)!));
      return columnsView(head.index, accumulator.finish());
    });
    return { fromHz, toHz, columns, traces };
  });
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
