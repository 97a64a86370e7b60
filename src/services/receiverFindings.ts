import { bandwidthFinding } from '@/emc/bandwidthCheck';
import { BANDWIDTH_TOLERANCE } from '@/emc/detectors';
import type { BandPart } from '@/emc/cisprBands';
import { LAYER_COLUMNS } from '@/emc/columns';
import { detectorFinding } from '@/emc/detectorCheck';
import { floorFinding } from '@/emc/floorCheck';
import { floorPieces } from '@/emc/floorPieces';
import { intersected, type Interval } from '@/emc/intervals';
import { overloadFinding, receiverFindings } from '@/emc/receiverSettings';
import type { ReceiverFinding } from '@/emc/receiverFinding';
import type { TraceHead } from '@/emc/segment';
import type { Columns } from '@/emc/types';
import { isReceiverInput, toReceiverLevel } from '@/emc/units';
import type { Recognition } from '@/ingest/types';
import type { LimitLineView } from '@/schemas/sweep';
import type { ReceiverFindingView } from '@/schemas/receiver';
import { toCoreLine } from './limitSets';
import type { Run } from './runs';

export interface Times {
  dwellS: number | null;
  scanTimeS: number | null;
  /** Why no time is known, where the reason is another than that the file does not state it. */
  because: string | null;
  /** The file says that the video filter is off. */
  noVideoFilter: boolean;
}

/** Times as the file states them; a scan time is shared out over the bands where the step is even. */
export function timesOf(run: Run): { of: (part: Interval) => Times } {
  const { settings, sweeps } = run.file.recognition as unknown as Recognition;
  const noVideoFilter = settings.vbwEnabled === false;
  const nothing = { dwellS: null, scanTimeS: null, noVideoFilter };
  if (sweeps.length > 1) {
    return {
      of: () => ({ ...nothing, because: 'The file holds several sweeps; whose times it states is not known.' }),
    };
  }
  const { dwellTimeS, sweepTimeS } = settings;
  const spanHz = run.lastHz - run.firstHz;
  const even = run.stepHz !== null;
  return {
    of: ({ fromHz, toHz }) => ({
      noVideoFilter,
      dwellS: positiveOrNull(dwellTimeS),
      scanTimeS: even && positiveOrNull(sweepTimeS) ? (sweepTimeS! * (toHz - fromHz)) / spanHz : null,
      because: !even && sweepTimeS ? 'The step changes, so the scan time of one band is not known.' : null,
    }),
  };
}

const positiveOrNull = (value: number | null) => (value !== null && value > 0 && Number.isFinite(value) ? value : null);

/** The settings of one trace in one band, against the lines it was judged by there. */
export function settingsFindings(
  { detector, rbwHz, vbwHz = null, rbwShape = null }: TraceHead,
  part: BandPart,
  lines: readonly LimitLineView[],
  { stepHz, dwellS, scanTimeS, because, noVideoFilter }: Times & { stepHz: number | null },
): ReceiverFindingView[] {
  const filter = { rbwHz, rbwShape, shape: null };
  const here = lines.filter(({ segments }) => intersected([part], segments.map(rangeOf)).length > 0);
  const asked = [...new Set(here.map((line) => line.detector))];
  const segment = {
    ...filter,
    startHz: part.fromHz,
    stopHz: part.toHz,
    detector,
    averageKind: null,
    vbwHz,
    stepHz,
    dwellS,
    scanTimeS,
    pulsePeriodS: null,
    highestInputDbuv: null,
    greatestInputDbuv: null,
  };
  const found = receiverFindings(segment, asked[0] ?? 'peak').flatMap((finding): ReceiverFinding[] => {
    // The input is looked at once per trace, and nobody states a period of pulses.
    if (finding.what === 'overload' || finding.what === 'pulse-period' || finding.what === 'detector') return [];
    // Where no source asks for a time there is nothing to compare.
    if ((finding.what === 'dwell' || finding.what === 'scan-time') && finding.figures.leastS === null) return [];
    if (finding.what === 'bandwidth') return [bandwidthAsked(finding, part, here, filter)];
    if (finding.what === 'step' && stepHz === null) return [{ ...finding, because: SPOTS }];
    if (finding.what === 'video-bandwidth' && noVideoFilter)
      return [{ ...finding, outcome: 'ok' as const, because: null }];
    if (finding.outcome === 'unknown' && because && finding.what === 'scan-time') return [{ ...finding, because }];
    return [finding];
  });
  const detectors = asked.map((line) => detectorFinding(part, detector, null, line));
  return [...found, ...detectors].map(viewOf);
}

const SPOTS = 'Single frequencies were read; nothing was swept between them.';
const rangeOf = ({ startHz, stopHz }: { startHz: number; stopHz: number }) => ({ fromHz: startHz, toHz: stopHz });

/** A line may ask for another bandwidth than the CISPR band does; then it is the line's that counts. */
function bandwidthAsked(
  finding: ReceiverFinding & { what: 'bandwidth' },
  part: BandPart,
  lines: readonly LimitLineView[],
  filter: Parameters<typeof bandwidthFinding>[1],
): ReceiverFinding {
  const [line] = lines;
  const bandHz = part.band?.bandwidthHz;
  if (!line || !bandHz || !lines.every(({ bandwidthHz }) => bandwidthHz === line.bandwidthHz)) return finding;
  if (Math.abs(line.bandwidthHz - bandHz) <= bandHz * BANDWIDTH_TOLERANCE) return finding;
  const own = { ...part, band: { ...part.band!, bandwidthHz: line.bandwidthHz } };
  return { ...bandwidthFinding(own, filter), source: `${line.document}, ${line.source}` };
}

/** The kept layer against each line the trace was judged by, within the range of the run. */
export function noiseFloor(
  { firstHz: fromHz, lastHz: toHz }: Run,
  layer: Columns,
  lines: readonly LimitLineView[],
  stepAt: (hz: number) => number | null,
): ReceiverFindingView[] {
  if (!(toHz > fromHz)) return [];
  const pieces = floorPieces(layer, { fromHz, toHz, columns: LAYER_COLUMNS }, stepAt);
  return lines.map((line) => {
    const { figures, ...finding } = floorFinding(toCoreLine(line), pieces);
    const notKnown = intersected(figures.notKnown, [{ fromHz, toHz }]);
    const known = figures.leastDistanceDb !== null && notKnown.length === 0;
    const outcome = finding.outcome === 'fails' ? 'fails' : known ? 'ok' : 'unknown';
    return {
      ...finding,
      fromHz: Math.max(finding.fromHz, fromHz),
      toHz: Math.min(finding.toHz, toHz),
      figures: { ...figures, notKnown },
      outcome,
      because: outcome === 'unknown' ? 'Too little was swept there to tell the floor from emissions.' : null,
      lineName: line.name,
    };
  });
}

/** The highest reading against what the input takes, which no file states so far. */
export function inputFinding(run: Run, { unit }: TraceHead, highest: number | null): ReceiverFindingView {
  const atInput =
    run.valuesHold === 'receiver-input' && isReceiverInput(unit) && run.reading.alreadyCorrected.length === 0;
  const highestDbuv = atInput && highest !== null ? toReceiverLevel(highest, unit) : null;
  return viewOf(overloadFinding({ fromHz: run.firstHz, toHz: run.lastHz }, highestDbuv, null));
}

/** What the API answers of a finding; those it has no words for never come here. */
function viewOf(finding: ReceiverFinding): ReceiverFindingView {
  if (finding.what === 'pulse-period' || finding.what === 'noise-floor') {
    throw new Error(`${finding.what} is not answered by itself`);
  }
  return finding;
}
