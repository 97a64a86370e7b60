import type { Verdict } from '@/emc/kinds';
import type { ComparedEmission } from '@/schemas/comparison';
import { formatFrequency, formatFrequencyRange } from '@/format/frequencies';
import { formatMargin } from '@/format/quantities';
import { formatMove } from '@/format/comparison';
import { VERDICT_WORDS } from '@/format/words';
import type { ChartMode } from './marginSeries';
import type { Mark } from './placeLabels';
import type { PlotScale, Span } from './scale';
import { figureWidthPx } from './textWidth';

type Sighting = NonNullable<ComparedEmission['a']>;

/** Where a sighting is drawn: dB over its limit, or its level; null where there is no limit. */
export function sightingValue(sighting: Sighting | null, mode: ChartMode): number | null {
  if (!sighting) return null;
  if (mode === 'level') return sighting.level;
  return sighting.marginDb === null ? null : 0 - sighting.marginDb;
}

export type BesideMark = Mark & {
  emission: ComparedEmission;
  /** Where the other run stands, null where it did not read; `y` is that of b, or of a where b has none. */
  fromY: number | null;
  verdict: Verdict | null;
};

/** The emissions inside the span as marks in px. */
export function besideMarks(
  emissions: readonly ComparedEmission[],
  span: Span,
  scale: PlotScale,
  mode: ChartMode,
  selectedRank: number | null,
): BesideMark[] {
  const inside = (value: number) => Math.min(scale.bottom, Math.max(scale.top, scale.y(value)));
  return emissions
    .filter(({ frequencyHz }) => frequencyHz >= span.fromHz && frequencyHz <= span.toHz)
    .flatMap((emission): BesideMark[] => {
      const [a, b] = [sightingValue(emission.a, mode), sightingValue(emission.b, mode)];
      const at = b ?? a;
      if (at === null) return [];
      const shown = b === null ? emission.a : emission.b;
      return [
        {
          emission,
          id: emission.rank,
          x: scale.x(emission.frequencyHz),
          y: inside(at),
          fromY: a === null || b === null ? null : inside(a),
          verdict: shown?.verdict ?? null,
          side: a !== null && b !== null && b < a ? 'below' : 'above',
          width: figureWidthPx(String(emission.rank), 12.5),
          ringed: emission.rank === selectedRank,
        },
      ];
    });
}

/** What an emission's mark says of itself. */
export function describeEmission(emission: ComparedEmission, names: { a: string; b: string }): string {
  const { kind, frequencyHz, fromHz, toHz, movedDb } = emission;
  const said = (sighting: Sighting | null) => {
    if (!sighting || sighting.marginDb === null) return 'not read';
    const verdict = sighting.verdict ? VERDICT_WORDS[sighting.verdict] : 'not listed';
    return `${formatMargin(sighting.marginDb)}, ${verdict}`;
  };
  const where = kind === 'floor' ? `noise floor ${formatFrequencyRange(fromHz, toHz)}` : formatFrequency(frequencyHz);
  const parts = [
    `Emission ${emission.rank}`,
    where,
    `${names.a} ${said(emission.a)}`,
    `${names.b} ${said(emission.b)}`,
    movedDb === null ? null : formatMove(movedDb),
  ];
  return parts.filter(Boolean).join('; ');
}

/** The emission after or before a frequency; null past the last one. */
export function nextEmission(
  emissions: readonly ComparedEmission[],
  at: { hz: number; rank: number | null },
  direction: 1 | -1,
): ComparedEmission | null {
  const order = [...emissions].sort((one, other) => one.frequencyHz - other.frequencyHz || one.rank - other.rank);
  const here = order.findIndex(({ rank }) => rank === at.rank);
  if (here >= 0) return order[here + direction] ?? null;
  return direction === 1
    ? (order.find(({ frequencyHz }) => frequencyHz > at.hz) ?? null)
    : (order.filter(({ frequencyHz }) => frequencyHz < at.hz).at(-1) ?? null);
}
