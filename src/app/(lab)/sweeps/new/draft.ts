import type { Detector, LevelUnit, MainsLine, Polarisation, Port, Purpose } from '@/schemas/common';
import type { LimitSetView, PathView } from '@/schemas/bench';
import type { SampleView } from '@/schemas/job';
import type { SweepChoice } from '@/schemas/sweep';
import type { SweepFileView } from '@/schemas/sweepFile';
import { typedNumber } from './typedNumber';

type FrequencyUnit = SweepChoice['frequencyUnit'];

export interface TraceDraft {
  index: number;
  use: boolean;
  name: string;
  /** Empty until a person says it, where the file does not. */
  unit: LevelUnit | '';
  detector: Detector | '';
  rbwKhz: string;
}

/** The form as it stands: text where a person types, empty where nothing has been said yet. */
export interface Draft {
  stateId: string;
  port: Port;
  purpose: Purpose;
  operatingMode: string;
  line: MainsLine | '';
  polarisation: Polarisation | '';
  heightM: string;
  heightSwept: boolean;
  azimuthDeg: string;
  distanceM: string;
  pathId: string;
  limitSetId: string;
  valuesHold: SweepChoice['valuesHold'];
  alreadyCorrected: string[];
  frequencyUnit: FrequencyUnit | '';
  centreMhz: string;
  /** Empty until chosen, where the file holds several. */
  sweepIndex: number | '';
  traces: TraceDraft[];
}

const UNIT_HZ: Record<FrequencyUnit, number> = { Hz: 1, kHz: 1e3, MHz: 1e6, GHz: 1e9 };

/** How much of a range a set's lines cover, in decades. */
function overlap(set: LimitSetView, firstHz: number, lastHz: number): number {
  const low = Math.min(...set.lines.flatMap((line) => line.segments.map((segment) => segment.startHz)));
  const high = Math.max(...set.lines.flatMap((line) => line.segments.map((segment) => segment.stopHz)));
  return Math.log10(Math.min(high, lastHz) / Math.max(low, firstHz, 1));
}

/** The set of a port that covers most of a range; of equals the one the lab entered first (the list is newest first). */
export function proposedLimitSet(sets: readonly LimitSetView[], port: Port, firstHz: number, lastHz: number): string {
  const fit = [...sets]
    .reverse()
    .filter((set) => set.port === port)
    .map((set) => ({ set, covers: overlap(set, firstHz, lastHz) }))
    .sort((a, b) => b.covers - a.covers);
  return fit[0]?.set.id ?? '';
}

/** The path of a port whose tables reach furthest over a range; a path with lapsed equipment comes last. */
export function proposedPath(paths: readonly PathView[], port: Port, firstHz: number, lastHz: number): string {
  const fit = paths
    .filter((path) => path.port === port)
    .map((path) => ({
      path,
      lapsed: path.items.some((item) => item.due === 'lapsed') ? 1 : 0,
      covers: Math.log10(Math.min(path.highHz ?? lastHz, lastHz) / Math.max(path.lowHz ?? firstHz, firstHz, 1)),
    }))
    .sort((a, b) => a.lapsed - b.lapsed || b.covers - a.covers || a.path.code.localeCompare(b.path.code));
  return fit[0]?.path.id ?? '';
}

const TERM_WORDS: [RegExp, RegExp][] = [
  [/antenna|transducer/i, /antenna/i],
  [/limiter/i, /limiter/i],
  [/cable/i, /cable/i],
  [/amplifier|preamp/i, /preamplifier/i],
  [/network|voltage division|AMN|LISN/i, /voltage division|AMN/i],
  [/attenuator|external attenuation/i, /attenuat/i],
];

/** Terms of a path that the file says are in its values; a proposal to be looked at. */
export function proposedCorrected(file: SweepFileView, path: PathView | undefined): string[] {
  const said = file.recognition.correctedFor.map(({ what }) => what).join('; ');
  return (path?.terms ?? [])
    .filter((term) => TERM_WORDS.some(([file, name]) => file.test(said) && name.test(term.name)))
    .map((term) => term.id);
}

interface Lists {
  samples: readonly SampleView[];
  paths: readonly PathView[];
  limitSets: readonly LimitSetView[];
}

/** The state a file's name speaks of (`m2`), in the sample of the named state or in the only sample there is. */
function proposedState(file: SweepFileView, samples: readonly SampleView[], stateId: string | null): string {
  const named = samples.find((sample) => sample.states.some((state) => state.id === stateId));
  if (stateId && named) return stateId;
  const code = file.name.toLowerCase().replace(/[^a-z0-9]/g, '');
  const spoken = samples.filter((sample) => code.includes(sample.product.code.toLowerCase().replace(/[^a-z0-9]/g, '')));
  const sample = spoken.length === 1 ? spoken[0]! : null;
  const measured = sample?.states.filter((state) => !state.planned) ?? [];
  const label = file.proposals.state?.toUpperCase();
  return (measured.find((state) => state.label === label) ?? (label ? undefined : measured.at(-1)))?.id ?? '';
}

/** What the sheet opens with: what the file states, and proposals that can all be seen and changed. */
export function draftFrom(file: SweepFileView, { samples, paths, limitSets }: Lists, stateId: string | null): Draft {
  const { recognition, proposals } = file;
  const { frequency, settings, traces } = recognition;
  const port: Port = frequency.lastHz <= 31e6 && !frequency.offset ? 'ac-mains' : 'enclosure';
  const limitSetId = proposedLimitSet(limitSets, port, frequency.firstHz, frequency.lastHz);
  const pathId = proposedPath(paths, port, frequency.firstHz, frequency.lastHz);
  const field = traces.some((trace) => trace.unit === 'dBuV/m' || trace.unit === 'dBuA/m');
  const path = paths.find(({ id }) => id === pathId);
  return {
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
    traces: traces.map((trace) => ({
      index: trace.index,
      use: !trace.blank,
      name: trace.name,
      unit: trace.unit ?? '',
      detector: trace.detector ?? '',
      rbwKhz: settings.rbwHz === null ? '' : String(settings.rbwHz / 1e3),
    })),
  };
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
    keepPartial: false,
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

/** First and last frequency in Hz as the draft reads them. */
export function rangeOf(draft: Draft, file: SweepFileView): { firstHz: number; lastHz: number } {
  const { frequency } = file.recognition;
  const read = UNIT_HZ[frequency.unit ?? frequency.proposedUnit];
  const scale = UNIT_HZ[draft.frequencyUnit === '' ? frequency.proposedUnit : draft.frequencyUnit] / read;
  const centreHz = (typedNumber(draft.centreMhz) ?? 0) * 1e6;
  return { firstHz: frequency.firstHz * scale + centreHz, lastHz: frequency.lastHz * scale + centreHz };
}
