import { z } from 'zod';
import {
  instant,
  levelUnit,
  lineDetector,
  lineUnit,
  mainsLine,
  polarisation,
  port,
  publicId,
  verdict,
  type LevelUnit,
  type LineDetector,
  type LineUnit,
  type MainsLine,
  type Polarisation,
  type Port,
  type Verdict,
} from './common';
import { operation } from './operation';
import { retestStatus } from './retest';

/* Final measurement typed at the bench: readings of one position, kept as runs with purpose final. */

/** As many as one sheet lists. */
export const MOST_FINALS = 100;
const LONGEST_REMARK = 160;

const reading = z.strictObject({
  detector: lineDetector,
  /** As the receiver showed it, in the unit of the body. */
  level: z.number().min(-200, 'is no level of a receiver').max(300, 'is no level of a receiver'),
});

export const typedFinal = z.strictObject({
  /** The retests that this emission was read for, at this position. */
  retestIds: z.array(publicId).min(1).max(12),
  /** To the hertz: what the receiver was tuned to. */
  frequencyHz: z.int().min(9000, 'is below 9 kHz').max(40e9, 'is above 40 GHz'),
  readings: z.array(reading).min(1, 'is needed').max(3),
  rbwHz: z.number().positive(),
  heightM: z.number().min(0).max(10, 'is above 10 m').nullable().default(null),
  azimuthDeg: z.number().min(0).max(360, 'is beyond 360°').nullable().default(null),
  /** When the reading was typed, by the clock of the bench. */
  readAt: instant.nullable().default(null),
  remark: z.string().trim().max(LONGEST_REMARK, `takes at most ${LONGEST_REMARK} characters`).nullable().default(null),
});
export type TypedFinal = z.infer<typeof typedFinal>;

export const finalsBody = z.strictObject({
  stateId: publicId,
  port,
  polarisation: polarisation.nullable().default(null),
  line: mainsLine.nullable().default(null),
  pathId: publicId.nullable(),
  limitSetId: publicId,
  distanceM: z.number().positive().max(100).nullable().default(null),
  operatingMode: z.string().trim().min(1, 'is needed').max(120),
  valuesHold: z.enum(['receiver-input', 'field']),
  unit: levelUnit,
  /** Path terms that the readings hold already, by term id. */
  alreadyCorrected: z.array(z.string().max(80)).max(20).default([]),
  /** The antenna height was varied for each reading while the maximum was held. */
  heightSwept: z.boolean().default(false),
  finals: z.array(typedFinal).min(1, 'is empty; type a reading').max(MOST_FINALS),
});
export type FinalsBody = z.infer<typeof finalsBody>;

const judgedReading = z.strictObject({
  detector: lineDetector,
  lineName: z.string().nullable(),
  /** Null where the path has no factor, or the unit is none that the line is in. */
  level: z.number().nullable(),
  unit: lineUnit.nullable(),
  limit: z.number().nullable(),
  marginDb: z.number().nullable(),
  uncertaintyDb: z.number().nullable(),
  verdict,
  because: z.string().nullable(),
});
export type JudgedReading = z.infer<typeof judgedReading>;

/** In the order of the finals that were sent. */
export const finalsPreview = z.strictObject({
  finals: z.array(z.strictObject({ readings: z.array(judgedReading) })),
  /** How many runs they make: one for each set of detectors and bandwidth. */
  runs: z.int(),
});
export type FinalsPreview = z.infer<typeof finalsPreview>;

export const finalsKept = z.strictObject({
  runs: z.array(z.strictObject({ id: publicId, number: z.string(), verdict, points: z.int() })),
  retests: z.array(
    z.strictObject({ id: publicId, number: z.string(), status: retestStatus, statusReason: z.string() }),
  ),
});
export type FinalsKept = z.infer<typeof finalsKept>;

export const keepFinals = operation({
  id: 'keepFinals',
  method: 'POST',
  path: '/api/finals',
  summary: 'Keep finals typed at the bench as runs of one position; the file kept with them says who typed what',
  permission: 'sweep.keep',
  status: 201,
  body: finalsBody,
  reply: finalsKept,
  idempotent: true,
});
export const previewFinals = operation({
  id: 'previewFinals',
  method: 'POST',
  path: '/api/finals/preview',
  summary: 'Level, limit, margin and verdict that typed finals would have; nothing is kept',
  permission: 'sweep.keep',
  status: 200,
  body: finalsBody,
  reply: finalsPreview,
  repeatable: true,
});

/** A retest that a row of the sheet answers. */
export interface AskedRetest {
  id: string;
  number: string;
  reason: 'over' | 'needs-final';
  status: z.infer<typeof retestStatus>;
  detector: LineDetector;
  lineName: string;
  unit: LineUnit;
  /** As it was read last. */
  level: number;
  limit: number;
  marginDb: number;
  verdict: Verdict;
}

/** One emission to be read at one position. */
export interface AskedFinal {
  /** Of this emission at this position. */
  key: string;
  kind: 'peak' | 'floor';
  frequencyHz: number;
  /** The stretch of a noise floor; both are the frequency of a peak. */
  fromHz: number;
  toHz: number;
  rbwHz: number;
  /** Of the lines that have a limit there in this bandwidth; those that a retest asks for among them. */
  detectors: LineDetector[];
  retests: AskedRetest[];
  /** Where it read worst. */
  heightM: number | null;
  azimuthDeg: number | null;
}

/** What is waiting for a final on one state and port, and how the run that asked for it was measured. */
export interface FinalsSheetView {
  /** The run it was asked for; null for the whole port. */
  run: { id: string; number: string } | null;
  organisation: string;
  job: { id: string; number: string };
  sample: { id: string; code: string; product: string };
  state: { id: string; label: string };
  port: Port;
  /** Worst first within each. */
  positions: { position: Polarisation | MainsLine | null; finals: AskedFinal[] }[];
  /** Emissions beyond what one sheet lists. */
  leftOut: number;
  /** Null where nothing waits. */
  proposed: {
    from: { id: string; number: string };
    pathId: string | null;
    limitSet: { id: string; name: string };
    distanceM: number | null;
    operatingMode: string;
    valuesHold: FinalsBody['valuesHold'];
    unit: LevelUnit;
    alreadyCorrected: string[];
    heightSwept: boolean;
  } | null;
  /** Paths of this port. */
  paths: { id: string; code: string; name: string; revision: number; wrong: string | null }[];
}
