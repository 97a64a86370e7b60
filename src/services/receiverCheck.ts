import { authorise, type Actor } from '@/auth/actor';
import { stepCollector } from '@/emc/bandSteps';
import { bandParts, type BandPart } from '@/emc/cisprBands';
import { SWEEP_POINTS } from '@/emc/axis';
import { intersected, type Interval } from '@/emc/intervals';
import { readAxis, highestReadings } from '@/models/traceStore';
import { readLayers } from '@/models/layerStore';
import { unitOfWork } from '@/models/unitOfWork';
import type { LimitLineView } from '@/schemas/sweep';
import type { ReceiverCheckView, ReceiverFindingView } from '@/schemas/receiver';
import { inTurns } from './inTurns';
import { inputFinding, noiseFloor, settingsFindings, timesOf } from './receiverFindings';
import { contextOf, findRun, type Run, type RunContext } from './runs';

/**
 * How a kept run was read, against what its limits and CISPR ask of a receiver: each trace, cut at the CISPR bands. It
 * is computed from what is kept and changes no verdict; what the file does not state is unknown, never assumed.
 */
export async function readReceiverCheck(actor: Actor | null, publicId: string): Promise<ReceiverCheckView> {
  authorise(actor, 'sweep.read');
  return unitOfWork(async () => {
    const run = await findRun(actor, publicId);
    const context = await contextOf(run);
    const parts = partsOf(run, context.lines);
    const steps = await largestSteps(run, context, parts);
    const layers = await readLayers(run.evaluation.id);
    const traces = await inTurns(
      tracesChecked(run, context, { parts, steps, layers, highest: await highestReadings(run.id) }),
    );
    return { counts: countsOf(traces), traces };
  });
}

interface Kept {
  parts: readonly BandPart[];
  /** The largest step in each part. */
  steps: readonly (number | null)[];
  layers: Awaited<ReturnType<typeof readLayers>>;
  highest: ReadonlyMap<number, number>;
}

/** One trace per turn: each floor is a thousand medians. */
function* tracesChecked(
  run: Run,
  context: RunContext,
  { parts, steps, layers, highest }: Kept,
): Generator<void, ReceiverCheckView['traces']> {
  const times = timesOf(run);
  const stepAt = (hz: number) => steps[parts.findIndex(({ fromHz, toHz }) => hz >= fromHz && hz <= toHz)] ?? null;
  const traces: ReceiverCheckView['traces'] = [];
  for (const head of context.heads) {
    const judgedBy = run.evaluation.pairs.filter(({ traceIndex }) => traceIndex === head.index);
    const lines = context.lines.filter(({ id }) => judgedBy.some(({ lineId }) => lineId === id));
    const layer = layers.find(({ index }) => index === head.index)?.layer;
    traces.push({
      index: head.index,
      name: head.name,
      detector: head.detector,
      parts: parts.map((part, i) => ({
        band: part.band?.band ?? null,
        fromHz: part.fromHz,
        toHz: part.toHz,
        findings: settingsFindings(head, part, lines, { stepHz: steps[i] ?? null, ...times.of(part) }),
      })),
      whole: [
        ...(layer ? noiseFloor(run, layer, lines, stepAt) : []),
        inputFinding(run, head, highest.get(head.index) ?? null),
      ],
    });
    yield;
  }
  return traces;
}

/** The bands the run goes through where one of its lines has a limit: beside the limits nothing is judged. */
function partsOf({ firstHz, lastHz }: Run, lines: readonly LimitLineView[]): BandPart[] {
  if (!(lastHz > firstHz)) return [];
  const limited: Interval[] = lines.flatMap(({ segments }) =>
    segments.map(({ startHz, stopHz }) => ({ fromHz: startHz, toHz: stopHz })),
  );
  return bandParts(firstHz, lastHz).filter((part) => intersected([part], limited).length > 0);
}

/** Of an even axis it is its step; an uneven one is gone through, one stored piece per turn. */
async function largestSteps(run: Run, { heads }: RunContext, parts: readonly BandPart[]): Promise<(number | null)[]> {
  const known = heads.flatMap(({ rbwHz }) => rbwHz ?? []);
  const narrowestHz = known.length > 0 ? Math.min(...known) : 0;
  if (run.stepHz !== null) {
    const stepHz = Math.abs(run.stepHz);
    const spots = run.points < SWEEP_POINTS && stepHz > narrowestHz;
    return parts.map(() => (spots || stepHz === 0 ? null : stepHz));
  }
  const pieces = await readAxis(run.id);
  return inTurns(
    (function* () {
      const collector = stepCollector(parts, narrowestHz);
      for (const piece of pieces) {
        collector.add(piece());
        yield;
      }
      return collector.finish();
    })(),
  );
}

function countsOf(traces: ReceiverCheckView['traces']): ReceiverCheckView['counts'] {
  const all: ReceiverFindingView[] = traces.flatMap(({ parts, whole }) => [
    ...parts.flatMap(({ findings }) => findings),
    ...whole,
  ]);
  const many = (outcome: ReceiverFindingView['outcome']) => all.filter((one) => one.outcome === outcome).length;
  return { ok: many('ok'), fails: many('fails'), unknown: many('unknown') };
}
