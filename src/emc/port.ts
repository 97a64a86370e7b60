import { intersected, type Interval } from './intervals';
import type { MainsLine, Polarisation, Port, Purpose, Verdict } from './kinds';
import type { CoverageGap } from './types';
import { worstVerdict } from './verdict';

/** One run of a sample state, as the port's verdict sees it. */
export interface PortRun {
  purpose: Purpose;
  polarisation: Polarisation | null;
  line: MainsLine | null;
  verdict: Verdict;
  gaps: readonly CoverageGap[];
  /** The limit lines the run was judged against, whether or not a trace was there for each. */
  lines: readonly { id: string; name: string }[];
}

export interface PortVerdict {
  verdict: Verdict;
  /** What is missing for a verdict on the port, one plain sentence each; empty when nothing is. */
  missing: string[];
}

/**
 * The verdict of one port over all runs of one sample state. One run over makes it over. Otherwise it is not covered
 * while a position is missing (both polarisations for the enclosure; L and N on single-phase mains; L1, L2, L3 and N
 * once any of L1 to L3 was measured), or a position has a part of a limit line that none of its runs covers. Then the
 * worst of the runs: needs a final, inconclusive, under. Ambient runs do not count: they are without the sample.
 * A run's gaps alone do not speak against the port: another run of the same position may fill them.
 */
export function portVerdict(port: Port, runs: readonly PortRun[]): PortVerdict {
  const counted = runs.filter((run) => run.purpose !== 'ambient');
  const missing: string[] = [];
  for (const position of positionsOf(port, counted)) {
    const there = counted.filter((run) => position.holds(run));
    if (there.length === 0) missing.push(`${position.name} is not measured.`);
    else missing.push(...missingAt(there, counted, position.name));
  }
  const worst = worstVerdict(counted.map((run) => run.verdict).filter((verdict) => verdict !== 'not-covered'));
  if (worst === 'over') return { verdict: 'over', missing };
  if (missing.length > 0) return { verdict: 'not-covered', missing };
  // Runs that are only not covered judged every point of theirs under, and together they leave nothing open.
  return { verdict: worst ?? 'under', missing };
}

interface Position {
  name: string;
  holds(run: PortRun): boolean;
}

function positionsOf(port: Port, runs: readonly PortRun[]): Position[] {
  if (port === 'enclosure') {
    return (['horizontal', 'vertical'] as const).map((polarisation) => ({
      name: polarisation === 'horizontal' ? 'Horizontal polarisation' : 'Vertical polarisation',
      holds: (run) => run.polarisation === polarisation,
    }));
  }
  if (port === 'ac-mains') {
    const threePhase = runs.some((run) => run.line !== null && ['L1', 'L2', 'L3'].includes(run.line));
    const lines: MainsLine[] = threePhase ? ['L1', 'L2', 'L3', 'N'] : ['L', 'N'];
    return lines.map((line) => ({ name: `Line ${line}`, holds: (run) => run.line === line }));
  }
  return [{ name: 'The port', holds: () => true }];
}

function missingAt(runs: readonly PortRun[], all: readonly PortRun[], position: string): string[] {
  const lines = new Map(all.flatMap((run) => run.lines.map((line) => [line.id, line.name] as const)));
  if (lines.size === 0) return [`${position}: no limit line is chosen.`];
  const missing: string[] = [];
  for (const [lineId, name] of lines) {
    const against = runs.filter((run) => run.lines.some((line) => line.id === lineId));
    if (against.length === 0) missing.push(`${position} is not compared with ${name}.`);
    for (const gap of leftOpen(against, lineId)) {
      missing.push(`${position}: ${gap.fromHz / 1e6} to ${gap.toHz / 1e6} MHz of ${name}, ${inWords(gap.because)}.`);
    }
  }
  return missing;
}

/** The parts of a line that every run leaves open, with the reasons the first run gives. */
function leftOpen(runs: readonly PortRun[], lineId: string): CoverageGap[] {
  const gapsIn = (run: PortRun) => run.gaps.filter((gap) => gap.lineId === lineId);
  const [first, ...rest] = runs;
  if (!first) return [];
  return gapsIn(first).flatMap((gap) => {
    let open: Interval[] = [gap];
    for (const run of rest) open = intersected(open, gapsIn(run));
    return open.map((range) => ({ ...gap, fromHz: range.fromHz, toHz: range.toHz }));
  });
}

function inWords(because: CoverageGap['because']): string {
  switch (because) {
    case 'no-trace':
      return 'not swept';
    case 'no-factor':
      return 'no factor in the signal path';
    case 'no-uncertainty':
      return 'no uncertainty stated';
    case 'detector':
      return 'detector not usable';
    case 'gap':
      return 'a gap in the sweep';
  }
}
