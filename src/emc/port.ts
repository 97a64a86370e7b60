import { intersected, type Interval } from './intervals';
import type { MainsLine, Polarisation, Port, Purpose, Verdict } from './kinds';
import type { CoverageGap } from './types';
import { worstVerdict } from './verdict';

/** One run of a sample state, as the port's verdict sees it. */
export interface PortRun {
  purpose: Purpose;
  polarisation: Polarisation | null;
  line: MainsLine | null;
  /** Antenna height; null when it is not stated. */
  heightM: number | null;
  /** Whether the height was varied while the maximum was held. */
  heightSwept: boolean;
  verdict: Verdict;
  gaps: readonly CoverageGap[];
  /** The limit lines the run was judged against, whether or not a trace was there for each. */
  lines: readonly { id: string; name: string }[];
  /** Kept from a file that breaks off: it speaks where it is over or needs more, and covers nothing. */
  partial?: boolean;
}

/** Something that is missing for a verdict on the port; `@/format/missing` says it in a sentence. */
export interface Missing {
  /** `partial`: the position was measured, but only in part. */
  what: 'position' | 'partial' | 'height' | 'no-line' | 'comparison' | 'range';
  /** Null where the port has only one position. */
  position: Polarisation | MainsLine | null;
  lineName: string | null;
  fromHz: number | null;
  toHz: number | null;
  because: CoverageGap['because'] | null;
  /** The one height there was, for `height`. */
  heightM: number | null;
}

export interface PortVerdict {
  verdict: Verdict;
  /** Empty when nothing is missing. */
  missing: Missing[];
}

/**
 * The verdict of one port over all runs of one sample state. One run over makes it over. Otherwise it is not covered
 * while a position is missing (both polarisations for the enclosure; L and N on single-phase mains; L1, L2, L3 and N
 * once any of L1 to L3 was measured), a polarisation was measured at one height only, or a position has a part of a
 * limit line that none of its runs covers. Then the worst of the runs: needs a final, inconclusive, under.
 * Ambient runs do not count: they are without the sample. A partial run counts where it is over, inconclusive or needs a
 * final; it measures no position or height, covers nothing and settles nothing. Where a final covers all that a prescan of the same position
 * was compared with, the prescan has been settled by it and counts no more.
 * A run's gaps alone do not speak against the port: another run of the same position may fill them.
 */
export function portVerdict(port: Port, runs: readonly PortRun[]): PortVerdict {
  const counted = runs.filter((run) => run.purpose !== 'ambient');
  const missing: Missing[] = [];
  const verdicts: Verdict[] = [];
  const positions = positionsOf(port, counted);
  for (const position of positions) {
    const there = counted.filter(position.holds);
    const whole = there.filter((run) => !run.partial);
    if (there.length === 0) missing.push(lacking('position', position.key));
    else if (whole.length === 0) missing.push(lacking('partial', position.key));
    else missing.push(...heightMissing(port, position.key, whole), ...missingAt(whole, counted, position.key));
    verdicts.push(...there.filter((run) => !isSettled(run, there)).map((run) => run.verdict));
  }
  // A run that stands at no known position still speaks when it is over.
  verdicts.push(...counted.filter((run) => !positions.some(({ holds }) => holds(run))).map((run) => run.verdict));
  const worst = worstVerdict(verdicts.filter((verdict) => verdict !== 'not-covered'));
  if (worst === 'over') return { verdict: 'over', missing };
  if (missing.length > 0) return { verdict: 'not-covered', missing };
  // Runs that are only not covered judged every point of theirs under, and together they leave nothing open.
  return { verdict: worst ?? 'under', missing };
}

/** Whether a final of the same position decided all that this prescan was compared with. */
function isSettled(prescan: PortRun, there: readonly PortRun[]): boolean {
  if (prescan.purpose !== 'prescan' || prescan.verdict === 'over') return false;
  const decided: Verdict[] = ['under', 'inconclusive', 'over'];
  return there.some(
    (run) =>
      run.purpose === 'final' &&
      !run.partial &&
      decided.includes(run.verdict) &&
      run.gaps.length === 0 &&
      prescan.lines.every(({ id }) => run.lines.some((line) => line.id === id)),
  );
}

export interface Position {
  key: Polarisation | MainsLine | null;
  holds: (run: PortRun) => boolean;
}

/** Where a port is measured; what of the runs counts is whether a mains port turned out to have three phases. */
export function positionsOf(port: Port, runs: readonly PortRun[]): Position[] {
  if (port === 'enclosure') {
    return (['horizontal', 'vertical'] as const).map((key) => ({ key, holds: (run) => run.polarisation === key }));
  }
  if (port === 'ac-mains') {
    const threePhase = runs.some((run) => run.line !== null && ['L1', 'L2', 'L3'].includes(run.line));
    const lines: MainsLine[] = threePhase ? ['L1', 'L2', 'L3', 'N'] : ['L', 'N'];
    return lines.map((key) => ({ key, holds: (run) => run.line === key }));
  }
  return [{ key: null, holds: () => true }];
}

function lacking(what: Missing['what'], position: Missing['position'], more: Partial<Missing> = {}): Missing {
  return { what, position, lineName: null, fromHz: null, toHz: null, because: null, heightM: null, ...more };
}

/** The field of an emission has its maximum at some height; one height alone proves nothing about the others. */
export function heightMissing(port: Port, position: Missing['position'], there: readonly PortRun[]): Missing[] {
  if (port !== 'enclosure' || there.some((run) => run.heightSwept)) return [];
  const heights = new Set(there.map((run) => run.heightM));
  if (heights.size > 1 && ![...heights].includes(null)) return [];
  const [only = null] = heights.size === 1 ? heights : [null];
  return [lacking('height', position, { heightM: only })];
}

function missingAt(runs: readonly PortRun[], all: readonly PortRun[], position: Missing['position']): Missing[] {
  const lines = new Map(all.flatMap((run) => run.lines.map((line) => [line.id, line.name] as const)));
  if (lines.size === 0) return [lacking('no-line', position)];
  const missing: Missing[] = [];
  for (const [lineId, lineName] of lines) {
    const against = runs.filter((run) => run.lines.some((line) => line.id === lineId));
    if (against.length === 0) missing.push(lacking('comparison', position, { lineName }));
    for (const { fromHz, toHz, because } of leftOpen(against, lineId)) {
      missing.push(lacking('range', position, { lineName, fromHz, toHz, because }));
    }
  }
  return missing;
}

/** The parts of a line that every run leaves open, with the reasons the first run gives. */
export function leftOpen(runs: readonly PortRun[], lineId: string): CoverageGap[] {
  const gapsIn = (run: PortRun) => run.gaps.filter((gap) => gap.lineId === lineId);
  const [first, ...rest] = runs;
  if (!first) return [];
  return gapsIn(first).flatMap((gap) => {
    let open: Interval[] = [gap];
    for (const run of rest) open = intersected(open, gapsIn(run));
    return open.map((range) => ({ ...gap, fromHz: range.fromHz, toHz: range.toHz }));
  });
}
