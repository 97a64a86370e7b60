'use client';

import { formatFrequencyRange } from '@/format/frequencies';
import { formatFigure } from '@/format/quantities';
import type { CorrectionView, PathItemRecord } from '@/schemas/paths';
import type { PathPoint } from './limitPath';
import { RevisionChart } from './RevisionChart';
import { wholeSpan, type Span } from './scale';

interface Props {
  correction: CorrectionView;
  /** The other polarisation, drawn dashed; null where there is none. */
  other: CorrectionView | null;
  items: readonly PathItemRecord[];
  unit: string;
}

/** What a path adds to a reading over log f, and what each item gives to it. Nothing is drawn where one has no value. */
export function CorrectionChart({ correction, other, items, unit }: Props) {
  const { lines, stretches, terms } = correction;
  const line = lines.flat();
  const known = stretches.filter(({ missing }) => missing.length === 0);
  const [first, last] = [known[0] ?? stretches[0], known.at(-1) ?? stretches.at(-1)];
  if (!first || !last) return null;
  const span = wholeSpan(first.fromHz, last.toHz);
  const parts = terms.map(({ identifier, name }, i) => {
    return { name: `${identifier} ${name}`, stretches: partOf(correction, i, items, span) };
  });
  const totals = line.map(({ totalDb }) => totalDb);
  const range = line.length > 0 ? formatFrequencyRange(line[0]!.frequencyHz, line.at(-1)!.frequencyHz) : null;
  const sentence = range
    ? `${nameOf(correction)} over ${range}: from ${formatFigure(Math.min(...totals), 1)} to ${formatFigure(Math.max(...totals), 1)} ${unit}.`
    : 'The items of this path have no frequency in common, so there is no correction.';
  return (
    <RevisionChart
      after={drawn(correction)}
      before={other && drawn(other)}
      parts={parts}
      difference={null}
      span={span}
      unit={unit}
      sentence={sentence}
    />
  );
}

/** What one term gives inside the span: its rows there, and at both ends of the correction its share. */
function partOf(correction: CorrectionView, at: number, items: readonly PathItemRecord[], span: Span): PathPoint[][] {
  const { sign, tableId } = correction.terms[at]!;
  const item = items.find(({ tables }) => tables.some(({ id }) => id === tableId))!;
  const table = item.tables.find(({ id }) => id === tableId)!;
  const fromHz = Math.max(span.fromHz, item.fromHz ?? 0);
  const toHz = Math.min(span.toHz, item.toHz ?? Infinity);
  const rows = table.frequencyHz.map((hz, i) => ({ hz, value: sign === '−' ? -table.valueDb[i]! : table.valueDb[i]! }));
  const shares = correction.at.flatMap(({ frequencyHz, shares }) => {
    const { shareDb } = shares[at]!;
    return shareDb === null ? [] : [{ hz: frequencyHz, value: shareDb }];
  });
  const points = new Map(
    [...shares, ...rows].filter(({ hz }) => hz >= fromHz && hz <= toHz).map((one) => [one.hz, one]),
  );
  return points.size > 0 ? [[...points.values()].sort((a, b) => a.hz - b.hz)] : [];
}

function nameOf({ polarisation }: CorrectionView): string {
  return polarisation ? `total correction, ${polarisation}` : 'total correction';
}

function drawn(correction: CorrectionView) {
  const pieces = correction.lines.map((line) =>
    line.map(({ frequencyHz, totalDb }) => ({ hz: frequencyHz, value: totalDb })),
  );
  return { name: nameOf(correction), stretches: pieces };
}
