'use client';

import type { LineUnit } from '@/emc/kinds';
import type { LimitSegment } from '@/emc/types';
import { formatFrequencyRange } from '@/format/frequencies';
import { unitLabel } from '@/format/quantities';
import { differenceWords } from '@/format/revisions';
import type { DifferenceView } from '@/schemas/tables';
import { limitPolylines } from './limitPath';
import { RevisionChart } from './RevisionChart';
import { wholeSpan } from './scale';

interface Line {
  /** `revision 2` */
  name: string;
  segments: readonly LimitSegment[];
}

interface Props {
  unit: LineUnit | null;
  after: Line;
  before: Line | null;
  difference: DifferenceView | null;
}

/** A limit line over log f beside its revision before. */
export function LimitChart({ unit, after, before, difference }: Props) {
  const edges = [after, before].flatMap(
    (one) => one?.segments.flatMap(({ startHz, stopHz }) => [startHz, stopHz]) ?? [],
  );
  const span = wholeSpan(Math.min(...edges), Math.max(...edges));
  const compared = before ? ` It is ${differenceWords(difference, before.name)}.` : '';
  const own = after.segments.flatMap(({ startHz, stopHz }) => [startHz, stopHz]);
  const range = formatFrequencyRange(Math.min(...own), Math.max(...own));
  const drawn = (line: Line) => ({ name: line.name, stretches: limitPolylines(line, span) });
  return (
    <RevisionChart
      after={drawn(after)}
      before={before && drawn(before)}
      difference={difference}
      span={span}
      unit={unit ? unitLabel(unit) : 'dB'}
      sentence={`The limit of ${after.name} over ${range}.${compared}`}
    />
  );
}
