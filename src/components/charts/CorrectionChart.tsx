'use client';

import { formatFrequencyRange } from '@/format/frequencies';
import { formatFigure } from '@/format/quantities';
import type { CorrectionView, PathItemRecord } from '@/schemas/paths';
import { RevisionChart } from './RevisionChart';
import { wholeSpan } from './scale';

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
  const [first, last] = [stretches[0], stretches.at(-1)];
  if (!first || !last) return null;
  const parts = terms.map(({ identifier, name, sign, tableId }) => {
    const table = items.flatMap(({ tables }) => tables).find(({ id }) => id === tableId)!;
    const points = table.frequencyHz.map((hz, i) => {
      return { hz, value: sign === '−' ? -table.valueDb[i]! : table.valueDb[i]! };
    });
    return { name: `${identifier} ${name}`, stretches: [points] };
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
      span={wholeSpan(first.fromHz, last.toHz)}
      unit={unit}
      sentence={sentence}
    />
  );
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
