import type { CandidateView, SweepView } from '@/schemas/sweep';
import { formatBandwidth, formatFrequencyRange } from '@/format/frequencies';
import { unitLabel } from '@/format/quantities';
import { harmonicOf, combToleranceHz } from '@/components/charts/combTicks';

/** A figure of a candidate that opens its working. */
export type CandidateFigure = 'level' | 'margin';

export interface CandidateFigures {
  open: { rank: number; figure: CandidateFigure } | null;
  onFigure: (candidate: CandidateView, figure: CandidateFigure) => void;
}

/** What is the same for every row of one run. */
export interface CandidateFrame {
  readingUnit: string;
  levelUnit: string;
  /** Below 150 kHz frequencies are in kHz. */
  frequencyUnit: 'kHz' | 'MHz';
  polarisation: SweepView['polarisation'];
  line: SweepView['line'];
  heightM: number | null;
  azimuthDeg: number | null;
  stepHz: number | null;
}

export type CandidateSweep = Pick<
  SweepView,
  'traces' | 'limitSet' | 'lastHz' | 'polarisation' | 'line' | 'heightM' | 'azimuthDeg' | 'stepHz'
>;

export function candidateFrame(sweep: CandidateSweep): CandidateFrame {
  const units = new Set(sweep.traces.map((trace) => trace.unit));
  const [unit] = units;
  return {
    readingUnit: units.size === 1 && unit ? unitLabel(unit) : '',
    levelUnit: sweep.limitSet.lines[0] ? unitLabel(sweep.limitSet.lines[0].unit) : '',
    frequencyUnit: sweep.lastHz <= 150e3 ? 'kHz' : 'MHz',
    polarisation: sweep.polarisation,
    line: sweep.line,
    heightM: sweep.heightM,
    azimuthDeg: sweep.azimuthDeg,
    stepHz: sweep.stepHz,
  };
}

/** The last column: which harmonic it may be, the range of a noise floor, and why the reading cannot decide. */
export function candidateRemark(candidate: CandidateView, clockHz: number | null, stepHz: number | null): string {
  const parts: string[] = [];
  if (clockHz !== null && candidate.kind === 'peak') {
    const n = harmonicOf(candidate.frequencyHz, clockHz, combToleranceHz(candidate.frequencyHz, stepHz));
    if (n !== null) parts.push(`${formatBandwidth(clockHz)} ×${n}`);
  }
  if (candidate.kind === 'floor') parts.push(`noise floor ${formatFrequencyRange(candidate.fromHz, candidate.toHz)}`);
  if (candidate.because) parts.push(candidate.because);
  return parts.join(', ');
}

/** Which columns a width has room for; the row's working and the sheet's head still say what is left out. */
export interface ShownColumns {
  reading: boolean;
  orientation: boolean;
  height: boolean;
  azimuth: boolean;
}

export function shownColumns(widthPx: number, frame: CandidateFrame): ShownColumns {
  return {
    reading: widthPx >= 700,
    orientation: widthPx >= 760 && (frame.polarisation !== null || frame.line !== null),
    height: widthPx >= 900 && frame.heightM !== null,
    azimuth: widthPx >= 900 && frame.azimuthDeg !== null,
  };
}
