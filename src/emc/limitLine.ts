import type { LineDetector, LineUnit } from './kinds';
import { edgeBelow, membersAt, piecesOf, type Pieces } from './pieces';
import type { LimitLine, LimitSegment } from './types';
import { dbuvFromMicrovolts } from './units';

/** A line made ready for many points. */
export interface PreparedLine {
  line: LimitLine;
  pieces: Pieces;
  segments: PreparedSegment[];
}
type PreparedSegment = LimitSegment & { flat: boolean; log: boolean; startX: number; slope: number };

/** Throws RangeError when the line has no segment, or one that is no range or holds a limit that is not finite. */
export function prepareLine(line: LimitLine): PreparedLine {
  if (line.segments.length === 0) throw new RangeError(`${line.name} has no segments.`);
  const segments = line.segments.map((segment) => {
    if (!Number.isFinite(segment.startLimit) || !Number.isFinite(segment.stopLimit)) {
      throw new RangeError(`${line.name}: a limit from ${segment.startHz} Hz is not a figure.`);
    }
    const log = segment.over === 'log-frequency';
    const startX = log ? Math.log(segment.startHz) : segment.startHz;
    const stopX = log ? Math.log(segment.stopHz) : segment.stopHz;
    const slope = (segment.stopLimit - segment.startLimit) / (stopX - startX);
    return { ...segment, flat: segment.startLimit === segment.stopLimit, log, startX, slope };
  });
  return { line, pieces: piecesOf(line.segments, line.name), segments };
}

/**
 * The limit at a frequency in the line's unit, null outside its segments. Where two segments of the line share a
 * frequency the lower limit governs (47 CFR 15.107, 15.109(c), 15.209(b); the CISPR product standards say the same).
 * A sloping segment is straight in dB over log f or over f, as the segment says.
 */
export function limitAt(line: LimitLine, frequencyHz: number): number | null {
  return limitOf(prepareLine(line), frequencyHz);
}

/** `limitAt` for a line that is asked often. */
export function limitOf(prepared: PreparedLine, frequencyHz: number): number | null {
  const limit = new Float64Array(1);
  const has = new Uint8Array(1);
  limitsInto(prepared, Float64Array.of(frequencyHz), Float64Array.of(Math.log(frequencyHz)), limit, has);
  return has[0] ? limit[0]! : null;
}

/** `limitAt` for many points: writes the limit and 1 into `has`, or 0 where there is none. `logHz` is ln of `frequencyHz`. */
export function limitsInto(
  prepared: PreparedLine,
  frequencyHz: Float64Array,
  logHz: Float64Array,
  limit: Float64Array,
  has: Uint8Array,
): void {
  const { pieces, segments } = prepared;
  let edge = -1;
  // Between two edges the same segments hold: they are looked up when a point leaves that stretch.
  let aboveHz = Infinity;
  let belowHz = 0;
  let members: number[] = [];
  for (let i = 0; i < frequencyHz.length; i++) {
    const f = frequencyHz[i]!;
    if (!(f > aboveHz && f < belowHz)) {
      edge = edgeBelow(pieces.edgesHz, f, edge);
      members = membersAt(pieces, edge, f);
      aboveHz = pieces.edgesHz[edge] ?? 0;
      belowHz = pieces.edgesHz[edge + 1] ?? Infinity;
      if (f === aboveHz) aboveHz = belowHz;
    }
    has[i] = members.length > 0 ? 1 : 0;
    if (members.length === 0) continue;
    let lowest = segmentLimit(segments[members[0]!]!, f, logHz[i]!);
    for (let m = 1; m < members.length; m++) {
      lowest = Math.min(lowest, segmentLimit(segments[members[m]!]!, f, logHz[i]!));
    }
    limit[i] = lowest;
  }
}

function segmentLimit(segment: PreparedSegment, frequencyHz: number, logHz: number): number {
  if (segment.flat || frequencyHz === segment.startHz) return segment.startLimit;
  if (frequencyHz === segment.stopHz) return segment.stopLimit;
  return segment.startLimit + segment.slope * ((segment.log ? logHz : frequencyHz) - segment.startX);
}

/** A line as `fixtures/published/limits.json` holds it. */
export interface LimitRecord {
  id: string;
  document: string;
  class: string;
  portText: string;
  detector: string;
  bandwidthHz: number;
  limitUnit: string;
  distanceM: number | null;
  segments: { startMHz: number; stopMHz: number; startLimit: number; stopLimit: number; shape: string }[];
}

const SHAPES: Record<string, LimitSegment['over']> = {
  flat: 'log-frequency',
  'linear in dB vs log frequency': 'log-frequency',
  'linear in dB vs linear frequency': 'linear-frequency',
};

/** A published record as a limit line. Throws RangeError on a shape that is not known: a guess would move the limit. */
export function toLimitLine(record: LimitRecord): LimitLine {
  const segments = record.segments.map(({ startMHz, stopMHz, startLimit, stopLimit, shape }) => {
    const over = SHAPES[shape];
    if (!over) throw new RangeError(`${record.id}: shape ${shape} is not known.`);
    return { startHz: hertz(startMHz), stopHz: hertz(stopMHz), startLimit, stopLimit, over };
  });
  return {
    id: record.id,
    name: lineName(record, record.detector),
    detector: record.detector as LineDetector,
    bandwidthHz: record.bandwidthHz,
    unit: record.limitUnit as LineUnit,
    distanceM: record.distanceM,
    segments,
  };
}

/** A line stated in µV/m, as 47 CFR 15.109 and 15.209 state theirs. An open row runs on without an end. */
export interface MicrovoltRecord {
  id: string;
  document: string;
  class: string;
  distanceM: number;
  rows: { startMHz: number; stopMHz: number | null; limitUvPerM: number }[];
}

/**
 * The quasi-peak part of a µV/m record in dBµV/m: up to 1000 MHz in 120 kHz (47 CFR 15.35(a)). Above that the same
 * figures are limits of another detector (`toMicrovoltLinesAbove`).
 */
export function toMicrovoltLine(record: MicrovoltRecord): LimitLine {
  return microvoltLine(record, record.id, 'quasi-peak', 120_000, (hz) => Math.min(hz, GIGAHERTZ), 0);
}

/**
 * What a µV/m record asks above 1000 MHz, in 1 MHz: its figures as average limits, and 20 dB more for peak (47 CFR
 * 15.35(b)). An open row is drawn to 40 GHz, as far as 15.33 asks at most for most devices (from memory). Empty where no
 * row reaches above 1000 MHz.
 */
export function toMicrovoltLinesAbove(record: MicrovoltRecord): LimitLine[] {
  if (record.rows.every(({ stopMHz }) => stopMHz !== null && stopMHz <= 1000)) return [];
  const above = (hz: number) => Math.max(hz, GIGAHERTZ);
  return [
    microvoltLine(record, `${record.id}-1g-av`, 'average', 1e6, above, 0),
    microvoltLine(record, `${record.id}-1g-pk`, 'peak', 1e6, above, PEAK_OVER_AVERAGE_DB),
  ];
}

const GIGAHERTZ = 1e9;
const OPEN_END_MHZ = 40_000;
const PEAK_OVER_AVERAGE_DB = 20;

function microvoltLine(
  record: MicrovoltRecord,
  id: string,
  detector: LineDetector,
  bandwidthHz: number,
  within: (hz: number) => number,
  moreDb: number,
): LimitLine {
  const segments = record.rows.flatMap(({ startMHz, stopMHz, limitUvPerM }): LimitSegment[] => {
    const microvolts = dbuvFromMicrovolts(limitUvPerM);
    if (microvolts === null) throw new RangeError(`${record.id}: ${limitUvPerM} uV/m is no limit.`);
    const startHz = within(hertz(startMHz));
    const stopHz = within(hertz(stopMHz ?? OPEN_END_MHZ));
    const limit = microvolts + moreDb;
    return startHz < stopHz ? [{ startHz, stopHz, startLimit: limit, stopLimit: limit, over: 'log-frequency' }] : [];
  });
  const { document, class: of, distanceM } = record;
  const portText = bandwidthHz === 1e6 ? 'enclosure, above 1 GHz' : 'enclosure';
  const name = lineName({ document, class: of, portText, limitUnit: 'dBuV/m', distanceM }, detector);
  return { id, name, detector, bandwidthHz, unit: 'dBuV/m', distanceM, segments };
}

function lineName(of: Omit<LimitRecord, 'id' | 'detector' | 'bandwidthHz' | 'segments'>, detector: string): string {
  const kind = /^[AB]\b/.test(of.class) ? `class ${of.class}` : of.class;
  const quantity = of.limitUnit === 'dBuA' ? ', current' : '';
  const distance = of.distanceM === null ? '' : `, ${of.distanceM} m`;
  return `${of.document} ${kind}, ${of.portText}${quantity}${distance}, ${detector}`;
}

/** Published edges are whole hertz; the product of two binary fractions need not be. */
function hertz(megahertz: number): number {
  return Math.round(megahertz * 1e6);
}
