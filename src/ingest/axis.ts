import { statsOf, type ColumnStats } from './columnStats';
import { moved } from './numbers';
import type { Declared } from './settings';
import { frequencyUnitIn, levelUnitIn, TO_HZ, type FrequencyUnit } from './units';

/** One column of the rows as the choice of the axis sees it. */
export interface AxisCandidate {
  /** 0-based column in the file. */
  column: number;
  heading: string | null;
  values: Float64Array;
}

export interface AxisChoice {
  /** Position among the candidates; null when none can be a frequency. */
  index: number | null;
  evidence: string;
  /** What stands in the way, when something does. */
  notFrequency: string | null;
}

const FREQUENCY_WORD = /^(?:f|x)$|freq|fréq|frec|^f ?\[|\b[kmg]?hz\b/i;
const TIME_WORD =
  /^\s*(?:t|time|zeit|temps|tiempo|seconds?|timestamp|date)\b|[([]\s*(?:n|u|µ|μ|m)?s(?:ec)?\s*[)\]]|\/\s*(?:m|µ|u)?s$/i;
const OTHER_WORD =
  /^\s*(?:#|no\.?|nr\.?|index|entry|point|sample|row|bin|channel|harmonic|azimuth|angle|height|position|distance|phase)s?\b|[([]\s*(?:deg|°|cm|m|mm|%|°c)\s*[)\]]/i;

export function headingIsFrequency(heading: string | null): boolean {
  if (heading === null || TIME_WORD.test(heading)) return false;
  return frequencyUnitIn(heading) !== null || (FREQUENCY_WORD.test(heading) && levelUnitIn(heading) === null);
}

export function headingIsTime(heading: string | null): boolean {
  return heading !== null && TIME_WORD.test(heading) && frequencyUnitIn(heading) === null;
}

export function headingIsPhase(heading: string | null): boolean {
  return heading !== null && /phase|phas|[([]\s*(?:deg|°|rad)\s*[)\]]/i.test(heading);
}

/** Columns that are numbers but neither frequency nor level. */
export function headingIsOther(heading: string | null): boolean {
  if (heading === null || headingIsPhase(heading)) return false;
  if (OTHER_WORD.test(heading) && levelUnitIn(heading) === null) return true;
  return /\b(?:limits?|margins?|delta|over ?limit|grenzwert|remark|status)\b/i.test(heading);
}

function isCounter(stats: ColumnStats): boolean {
  const steps = stats.count - 1;
  return (stats.first === 0 || stats.first === 1) && stats.rising === steps && stats.last - stats.first === steps;
}

/** Share of neighbours that go the column's own way; steps back (several sweeps, joined pieces) cost little. */
function steadiness(stats: ColumnStats): number {
  return stats.count < 2 ? 0 : (Math.max(stats.rising, stats.falling) + stats.equal) / (stats.count - 1);
}

function evenness(values: Float64Array, stats: ColumnStats): 'linear' | 'logarithmic' | null {
  const n = values.length;
  if (n < 3 || stats.equal > 0) return null;
  const within = (expected: (i: number) => number, tolerance: number) => {
    for (let i = 0; i < n; i += Math.max(1, Math.floor(n / 4096))) {
      if (!(Math.abs(values[i]! - expected(i)) <= tolerance)) return false;
    }
    return true;
  };
  const step = (stats.last - stats.first) / (n - 1);
  if (within((i) => stats.first + i * step, Math.abs(step) * 0.02)) return 'linear';
  if (stats.first <= 0 || stats.last <= 0) return null;
  const ratio = Math.log(stats.last / stats.first) / (n - 1);
  const closest = Math.abs(stats.first * (Math.exp(ratio) - 1));
  return within((i) => stats.first * Math.exp(ratio * i), closest * 0.5) ? 'logarithmic' : null;
}

/** Steps as even as an axis has them; no run of levels does that. */
export function evenSteps(values: Float64Array): boolean {
  return evenness(values, statsOf(values)) === 'linear';
}

/** Unit under which first and last are what the preamble declares; null when no unit does that. */
export function unitByDeclaration(
  first: number,
  last: number,
  step: number,
  { start, stop }: Pick<Declared, 'start' | 'stop'>,
): { unit: FrequencyUnit; line: number } | 'same-figures' | null {
  if (!start || !stop || !(stop.value > start.value)) return null;
  const [low, high] = first <= last ? [first, last] : [last, first];
  const near = (a: number, b: number) => Math.abs(a - b) <= 1.01 * step + 1e-9 * Math.abs(b);
  const [startUnit, stopUnit] = [start.unit, stop.unit].map((unit) => (unit === null ? null : frequencyUnitIn(unit)));
  if (!startUnit || !stopUnit) return near(low, start.value) && near(high, stop.value) ? 'same-figures' : null;
  for (const unit of ['Hz', 'kHz', 'MHz', 'GHz'] as const) {
    const declared = (value: number, its: FrequencyUnit) => moved(value, TO_HZ[its] - TO_HZ[unit]);
    if (near(low, declared(start.value, startUnit)) && near(high, declared(stop.value, stopUnit))) {
      return { unit, line: start.entry.line };
    }
  }
  return null;
}

/**
 * The frequency column by heading, agreement with what is declared, steadiness and step; never by position.
 */
export function chooseAxis(candidates: readonly AxisCandidate[], declared: Declared): AxisChoice {
  let best: { index: number; score: number; size: number; evidence: string } | null = null;
  let other: string | null = null;
  for (const [index, { heading, values, column }] of candidates.entries()) {
    const stats = statsOf(values);
    const named = headingIsFrequency(heading);
    const flat = stats.rising === 0 && stats.falling === 0;
    // A list of one frequency goes nowhere; several rows at one are a sweep over time.
    if (stats.holes > 0 || (flat && !(named && stats.count === 1))) continue;
    if (!named && steadiness(stats) < 0.9) continue;
    if (headingIsTime(heading)) {
      other ??= `column ${column + 1} is time (“${heading}”)`;
      continue;
    }
    if (headingIsOther(heading) || headingIsPhase(heading)) {
      other ??= `column ${column + 1} is “${heading}”`;
      continue;
    }
    const step = Math.abs(stats.last - stats.first) / Math.max(1, stats.count - 1);
    const even = evenness(values, stats);
    const oneWay = stats.falling === 0 ? 'rising' : stats.rising === 0 ? 'falling' : null;
    const weighed: [boolean, number, string][] = [
      [named, 100, `heading “${heading}”`],
      [!named && heading !== null && levelUnitIn(heading) !== null, -60, ''],
      [
        unitByDeclaration(stats.first, stats.last, step, declared) !== null,
        50,
        'agrees with the declared start and stop',
      ],
      [even !== null, even === 'linear' ? 10 : 8, even === 'linear' ? 'even step' : 'even ratio'],
      [oneWay !== null, 5, oneWay ?? ''],
      [!named && isCounter(stats), -12, ''],
    ];
    const holds = weighed.filter(([applies]) => applies);
    const score = holds.reduce((sum, [, weight]) => sum + weight, 0);
    const why = holds.map(([, , words]) => words).filter((words) => words !== '');
    const size = Math.max(Math.abs(stats.min), Math.abs(stats.max));
    if (best === null || score > best.score || (score === best.score && size > best.size)) {
      best = { index, score, size, evidence: why.join(', ') || 'mostly rising' };
    }
  }
  if (best === null) return { index: null, evidence: '', notFrequency: other };
  return { index: best.index, evidence: best.evidence, notFrequency: null };
}
