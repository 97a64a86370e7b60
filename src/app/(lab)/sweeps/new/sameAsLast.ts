import type { SweepFileView } from '@/schemas/sweepFile';
import type { Draft, TraceDraft } from './draftTypes';
import type { UploadLists } from './uploadLists';

/** A file with what has been said of it. */
export interface Said {
  draft: Draft;
  file: SweepFileView;
}

function traceAs(trace: TraceDraft, stated: SweepFileView, last: Draft): TraceDraft {
  const from = last.traces.find(({ index }) => index === trace.index);
  const own = stated.recognition.traces.find(({ index }) => index === trace.index);
  if (!from || !own) return trace;
  return {
    ...trace,
    use: from.use && !own.blank,
    unit: own.unit ?? (from.unit || trace.unit),
    // An unknown detector is what the file itself says where it names no single one.
    detector: own.detector ?? (from.detector || trace.detector),
    rbwKhz: stated.recognition.settings.rbwHz === null ? from.rbwKhz || trace.rbwKhz : trace.rbwKhz,
  };
}

/** The last one's state, unless the name speaks of a state of its own or of another sample. */
function stateAs(draft: Draft, named: boolean, from: Draft, samples: UploadLists['samples']): string {
  if (draft.stateId === '' || from.stateId === '') return draft.stateId || from.stateId;
  const sampleOf = (id: string) => samples.find(({ states }) => states.some((state) => state.id === id))?.id;
  return named || sampleOf(draft.stateId) !== sampleOf(from.stateId) ? draft.stateId : from.stateId;
}

/**
 * What was said of the last file, for this one: path, limit set, operating mode, trial, and units, detector and RBW
 * where this file states none. Polarisation, conductor and height stay as its name proposes them, so do state and
 * purpose where the name speaks of them. What this file states of itself is never overridden.
 */
export function sameAsLast({ draft, file }: Said, last: Said, samples: UploadLists['samples']): Draft {
  const { recognition, proposals } = file;
  const from = last.draft;
  const next: Draft = {
    ...draft,
    stateId: stateAs(draft, proposals.state !== null, from, samples),
    purpose: proposals.purpose ?? from.purpose,
    operatingMode: from.operatingMode,
    trial: from.trial,
    azimuthDeg: draft.azimuthDeg || from.azimuthDeg,
    frequencyUnit: recognition.frequency.unit ?? (from.frequencyUnit || draft.frequencyUnit),
    traces: draft.traces.map((trace) => traceAs(trace, file, from)),
    // Saying "as the last one" settles what was only proposed.
    asBefore: draft.asBefore && { ...draft.asBefore, holds: true },
  };
  // A sweep of another range is of another port; its path and limits are not those of the last one.
  if (from.port !== draft.port) return next;
  next.pathId = from.pathId;
  next.limitSetId = from.limitSetId;
  next.distanceM = from.distanceM;
  next.heightSwept = from.heightSwept;
  const unitsOpen = recognition.traces.every(({ unit, blank }) => blank || unit === null);
  next.valuesHold = unitsOpen ? from.valuesHold : draft.valuesHold;
  const says = (one: SweepFileView) => one.recognition.correctedFor.map(({ what }) => what).join();
  if (next.valuesHold === 'field') next.alreadyCorrected = [];
  else if (says(file) === says(last.file)) next.alreadyCorrected = from.alreadyCorrected;
  return next;
}
