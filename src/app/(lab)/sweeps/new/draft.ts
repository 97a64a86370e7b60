import type { Detector, LevelUnit, Port } from '@/schemas/common';
import type { KeepSweep, SweepChoice } from '@/schemas/sweep';
import type { SweepFileView } from '@/schemas/sweepFile';
import { asBefore } from './asBefore';
import type { Draft, FrequencyUnit, TraceDraft } from './draftTypes';
import { proposedCorrected, proposedLimitSet, proposedPath, proposedState } from './proposed';
import { typedNumber } from './typedNumber';
import type { UploadLists } from './uploadLists';

const UNIT_HZ: Record<FrequencyUnit, number> = { Hz: 1, kHz: 1e3, MHz: 1e6, GHz: 1e9 };

/** What the sheet opens with: what the file states, and proposals that can all be seen and changed. */
export function draftFrom(file: SweepFileView, lists: UploadLists, stateId: string | null): Draft {
  const { samples, paths, limitSets } = lists;
  const { recognition, proposals } = file;
  const { frequency, traces } = recognition;
  const port: Port = frequency.lastHz <= 31e6 && !frequency.offset ? 'ac-mains' : 'enclosure';
  const { firstHz, lastHz } = frequency;
  const pathId = proposedPath(paths, port, firstHz, lastHz);
  const path = paths.find(({ id }) => id === pathId);
  const limitSetId = proposedLimitSet(limitSets, port, [firstHz, lastHz], path);
  const field = traces.some((trace) => trace.unit === 'dBuV/m' || trace.unit === 'dBuA/m');
  const draft: Draft = {
    stateId: proposedState(file, samples, stateId),
    port,
    purpose: proposals.purpose ?? 'prescan',
    operatingMode: '',
    line: proposals.line ?? '',
    polarisation: proposals.polarisation ?? '',
    heightM: proposals.heightM === null ? '' : String(proposals.heightM),
    heightSwept: false,
    azimuthDeg: '',
    distanceM: String(limitSets.find(({ id }) => id === limitSetId)?.distanceM ?? ''),
    pathId,
    limitSetId,
    valuesHold: field ? 'field' : 'receiver-input',
    alreadyCorrected: field ? [] : proposedCorrected(file, path),
    frequencyUnit: frequency.unit ?? '',
    centreMhz: '',
    sweepIndex: recognition.sweeps.length > 1 ? '' : 0,
    traces: statedTraces(file),
    trial: '',
    keepPartial: false,
    asBefore: null,
  };
  return asBefore(draft, file, lists);
}

/** The traces as far as the file states them; filler is not used. */
export function statedTraces({ recognition: { traces, settings } }: SweepFileView): TraceDraft[] {
  return traces.map((trace) => ({
    index: trace.index,
    use: !trace.blank,
    name: trace.name,
    unit: trace.unit ?? '',
    detector: trace.detector ?? '',
    rbwKhz: settings.rbwHz === null ? '' : String(settings.rbwHz / 1e3),
  }));
}

/** What one of several sweeps states by its own preamble, where a person has not said otherwise. */
export function withSweep(draft: Draft, sweepIndex: number, file: SweepFileView): Draft {
  const stated = statedTraces(file);
  const traces = draft.traces.map((trace) => {
    const own = stated.find(({ index }) => index === trace.index);
    if (!own) return trace;
    return {
      ...trace,
      unit: own.unit || trace.unit,
      detector: own.detector || trace.detector,
      rbwKhz: own.rbwKhz || trace.rbwKhz,
    };
  });
  return { ...draft, sweepIndex, traces };
}

/** What is still to be said before the file can be kept; empty when nothing is. */
export function stillToSay(draft: Draft, file: SweepFileView): string[] {
  const { asBefore: taken } = draft;
  return [
    ...(draft.stateId === '' ? ['the sample and state'] : []),
    ...unsaid(draft, file),
    ...(taken && !taken.holds ? [`whether it is as in ${taken.number}`] : []),
    ...(draft.operatingMode.trim() === '' ? ['the operating mode'] : []),
  ];
}

/** What is still to be said before the file can be judged, in the order of the form; empty when nothing is. */
export function unsaid(draft: Draft, file: SweepFileView): string[] {
  const used = draft.traces.filter((trace) => trace.use);
  const list: [boolean, string][] = [
    [draft.frequencyUnit === '', 'the unit of the frequencies'],
    [file.recognition.frequency.offset && typedNumber(draft.centreMhz) === null, 'the centre frequency'],
    [draft.sweepIndex === '', 'which sweep it is'],
    [used.length === 0, 'a trace to use'],
    [used.some((trace) => trace.unit === ''), 'the unit of the levels'],
    [used.some((trace) => trace.detector === ''), 'the detector'],
    [draft.limitSetId === '', 'the limit set'],
    [draft.port === 'enclosure' && draft.polarisation === '', 'the polarisation'],
    [draft.port === 'enclosure' && typedNumber(draft.distanceM) === null, 'the distance'],
    [draft.port === 'ac-mains' && draft.line === '', 'the line'],
  ];
  return list.filter(([missing]) => missing).map(([, word]) => word);
}

/** The choice as the API takes it, or null while something is unsaid. */
export function choiceOf(draft: Draft, file: SweepFileView): SweepChoice | null {
  const { frequencyUnit } = draft;
  if (frequencyUnit === '' || unsaid(draft, file).length > 0) return null;
  const centreMhz = typedNumber(draft.centreMhz);
  const radiated = draft.port === 'enclosure';
  return {
    purpose: draft.purpose,
    port: draft.port,
    line: draft.port === 'ac-mains' && draft.line !== '' ? draft.line : null,
    polarisation: radiated && draft.polarisation !== '' ? draft.polarisation : null,
    distanceM: radiated ? typedNumber(draft.distanceM) : null,
    pathId: draft.pathId === '' ? null : draft.pathId,
    limitSetId: draft.limitSetId,
    valuesHold: draft.valuesHold,
    alreadyCorrected: draft.valuesHold === 'field' ? [] : draft.alreadyCorrected,
    frequencyUnit,
    centreHz: file.recognition.frequency.offset && centreMhz !== null ? centreMhz * 1e6 : null,
    sweepIndex: draft.sweepIndex === '' ? null : draft.sweepIndex,
    keepPartial: draft.keepPartial,
    traces: draft.traces
      .filter((trace) => trace.use)
      .map(({ index, name, unit, detector, rbwKhz }) => ({
        index,
        name,
        unit: unit as LevelUnit,
        detector: detector as Detector,
        rbwHz: typedNumber(rbwKhz) === null ? null : typedNumber(rbwKhz)! * 1e3,
      })),
  };
}

/** What is sent to keep it, or null while something is unsaid. */
export function keepBody(draft: Draft, file: SweepFileView): Partial<KeepSweep> | null {
  const choice = choiceOf(draft, file);
  if (!choice || stillToSay(draft, file).length > 0) return null;
  const radiated = draft.port === 'enclosure';
  return {
    ...choice,
    fileId: file.id,
    stateId: draft.stateId,
    operatingMode: draft.operatingMode,
    heightM: typedNumber(draft.heightM),
    heightSwept: radiated && draft.heightSwept,
    azimuthDeg: typedNumber(draft.azimuthDeg),
    trial: draft.trial.trim() || null,
  };
}

/** First and last frequency in Hz as the draft reads them. */
export function rangeOf(draft: Draft, file: SweepFileView): { firstHz: number; lastHz: number } {
  const { frequency } = file.recognition;
  const read = UNIT_HZ[frequency.unit ?? frequency.proposedUnit];
  const scale = UNIT_HZ[draft.frequencyUnit === '' ? frequency.proposedUnit : draft.frequencyUnit] / read;
  const centreHz = (typedNumber(draft.centreMhz) ?? 0) * 1e6;
  return { firstHz: frequency.firstHz * scale + centreHz, lastHz: frequency.lastHz * scale + centreHz };
}
