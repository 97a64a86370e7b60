import { scanSeconds, secondsOf, type ScanRange } from './scanTime';

/** How often something is done, and how long it takes to go from one to the next. */
export interface Positions {
  count: number;
  changeS: number;
}

/** One range that is scanned with one antenna or network; each position is scanned once. */
export interface ScanPlan extends ScanRange {
  /** e.g. `30-300 MHz, biconical` */
  name: string;
  /** Connecting and checking before the first scan. */
  setUpS: number;
  lines: Positions;
  polarisations: Positions;
  heights: Positions;
  azimuths: Positions;
}

/** Finals of a range: each is approached, maximised and then read in its detectors. */
export interface FinalsPlan {
  name: string;
  count: number;
  /** Going to the position of one final. */
  changeS: number;
  /** Looking for its maximum over height and azimuth, or 0. */
  maximiseS: number;
  /** Measuring time of each detector. */
  detectors: readonly { detector: string; measuringS: number }[];
  /** Detectors read one after another, or all at once in the longest of their times. */
  read: 'one after another' | 'at once';
}

export interface BenchPlan {
  /** Placing the sample and bringing it into its state. */
  setUpS: number;
  scans: readonly ScanPlan[];
  finals: readonly FinalsPlan[];
}

export const BENCH_PARTS = [
  'set-up',
  'range set-up',
  'scan',
  'line change',
  'polarisation change',
  'height change',
  'azimuth change',
  'final change',
  'final maximising',
  'final reading',
] as const;
export type BenchPart = (typeof BENCH_PARTS)[number];

/** One line of the breakdown: seconds = count · eachS. */
export interface BenchLine {
  part: BenchPart;
  /** The range or the finals it belongs to; null for what belongs to the whole. */
  name: string | null;
  count: number;
  eachS: number;
  seconds: number;
}

export interface BenchTime {
  lines: BenchLine[];
  /** The sum of the lines, in seconds. */
  totalS: number;
}

/**
 * Bench time of a plan as lines that add up. Every line, polarisation, height and azimuth is scanned with every other,
 * going back and forth, so that between two scans exactly one of them changes: lines outermost, azimuths innermost.
 * Lines that take no time are left out. Throws RangeError on a count that is none and a time below zero.
 */
export function benchTime({ setUpS, scans, finals }: BenchPlan): BenchTime {
  const lines: BenchLine[] = [];
  const add = (part: BenchPart, name: string | null, count: number, eachS: number) => {
    const seconds = count * secondsOf(eachS, part);
    if (seconds > 0) lines.push({ part, name, count, eachS, seconds });
  };
  add('set-up', null, 1, setUpS);
  for (const scan of scans) {
    const { name } = scan;
    add('range set-up', name, 1, scan.setUpS);
    let before = 1;
    const changes = (part: BenchPart, { count, changeS }: Positions) => {
      if (!(Number.isInteger(count) && count >= 1)) throw new RangeError(`${name}: ${count} is no count (${part}).`);
      add(part, name, before * (count - 1), changeS);
      before *= count;
    };
    changes('line change', scan.lines);
    changes('polarisation change', scan.polarisations);
    changes('height change', scan.heights);
    changes('azimuth change', scan.azimuths);
    add('scan', name, before, scanSeconds(scan));
  }
  for (const { name, count, changeS, maximiseS, detectors, read } of finals) {
    if (!(Number.isInteger(count) && count >= 0)) throw new RangeError(`${name}: ${count} is no count of finals.`);
    if (detectors.length === 0) throw new RangeError(`${name}: a final without a detector reads nothing.`);
    const times = detectors.map(({ detector, measuringS }) => secondsOf(measuringS, detector));
    add('final change', name, count, changeS);
    add('final maximising', name, count, maximiseS);
    const readS = read === 'at once' ? Math.max(...times) : times.reduce((sum, seconds) => sum + seconds, 0);
    add('final reading', name, count, readS);
  }
  return { lines, totalS: lines.reduce((sum, { seconds }) => sum + seconds, 0) };
}
