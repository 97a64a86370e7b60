import { formatBandwidth } from '@/format/frequencies';
import { unitLabel } from '@/format/quantities';
import { DETECTOR_WORDS } from '@/format/words';
import type { SweepFileView } from '@/schemas/sweepFile';
import type { Draft, TraceDraft } from './draftTypes';
import { proposedCorrected } from './proposed';
import { typedNumber } from './typedNumber';
import type { UploadLists } from './uploadLists';

type Before = NonNullable<SweepFileView['asBefore']>;

/** A trace with what the file does not state taken from before; what was taken goes to `took`. */
function traceAsBefore(trace: TraceDraft, before: Before['traces'][number], took: Set<string>): TraceDraft {
  const next = { ...trace };
  if (trace.unit === '') {
    next.unit = before.unit;
    took.add(unitLabel(before.unit));
  }
  if (trace.detector === '') {
    next.detector = before.detector;
    took.add(DETECTOR_WORDS[before.detector]);
  }
  if (typedNumber(trace.rbwKhz) === null && before.rbwHz !== null) {
    next.rbwKhz = String(before.rbwHz / 1e3);
    took.add(`RBW ${formatBandwidth(before.rbwHz)}`);
  }
  return next;
}

/**
 * Fills what the file leaves open with what was said of the last file of its shape. What the file states stays as it
 * is; path, limit set and what the reading holds are taken only where the range is one of the same port.
 */
export function asBefore(draft: Draft, file: SweepFileView, { paths, limitSets }: UploadLists): Draft {
  const before = file.asBefore;
  if (!before) return draft;
  const took = new Set<string>();
  const next: Draft = { ...draft };
  if (draft.frequencyUnit === '') {
    next.frequencyUnit = before.frequencyUnit;
    took.add(`frequencies in ${before.frequencyUnit}`);
  }
  // Of several sweeps each may state its own; that is read once one is chosen.
  const several = file.recognition.sweeps.length > 1;
  next.traces = draft.traces.map((trace) => {
    const its = before.traces.find(({ index }) => index === trace.index);
    return its && trace.use && !several ? traceAsBefore(trace, its, took) : trace;
  });
  const unitsOpen = file.recognition.traces.every(({ unit, blank }) => blank || unit === null);
  if (unitsOpen && before.valuesHold !== draft.valuesHold) {
    next.valuesHold = before.valuesHold;
    took.add(before.valuesHold === 'field' ? 'values are field strength' : 'values are receiver input');
  }
  if (before.port === draft.port) {
    const limitSet = limitSets.find(({ id, port }) => id === before.limitSetId && port === before.port);
    const path = paths.find(({ id, port }) => id === before.pathId && port === before.port);
    if (limitSet) Object.assign(next, { limitSetId: limitSet.id, distanceM: String(limitSet.distanceM ?? '') });
    if (path) next.pathId = path.id;
    if (before.port === 'enclosure') next.heightSwept = before.heightSwept;
    const stated = file.recognition.correctedFor.length > 0;
    const used = paths.find(({ id }) => id === next.pathId);
    if (next.valuesHold === 'field') next.alreadyCorrected = [];
    else if (stated || !path) next.alreadyCorrected = proposedCorrected(file, used);
    else {
      const terms = path.terms.filter(({ id }) => before.alreadyCorrected.includes(id));
      next.alreadyCorrected = terms.map(({ id }) => id);
      for (const { identifier } of terms) took.add(`${identifier} already in the reading`);
    }
  }
  next.asBefore = took.size === 0 ? null : { number: before.run.number, took: [...took], holds: false };
  return next;
}
