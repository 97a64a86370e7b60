'use client';

import type { FactorQuantity } from '@/emc/kinds';
import { differenceWords, QUANTITY_WORDS, quantityUnit } from '@/format/revisions';
import { formatFrequencyRange } from '@/format/frequencies';
import { formatCount } from '@/format/quantities';
import type { DifferenceView } from '@/schemas/tables';
import { RevisionChart } from './RevisionChart';
import { tableLine } from './revisionScale';
import { wholeSpan } from './scale';

interface Rows {
  /** `revision 2` */
  name: string;
  frequencyHz: readonly number[];
  valueDb: readonly number[];
}

interface Props {
  quantity: FactorQuantity | null;
  after: Rows;
  before: Rows | null;
  difference: DifferenceView | null;
}

/** A factor table over log f beside its revision before. Nothing is drawn beyond its rows: there is no factor there. */
export function FactorChart({ quantity, after, before, difference }: Props) {
  const ends = [after, before].flatMap((one) => (one ? [one.frequencyHz[0]!, one.frequencyHz.at(-1)!] : []));
  const what = quantity ? QUANTITY_WORDS[quantity] : 'figures, loss or gain not said';
  const count = after.frequencyHz.length;
  const range = formatFrequencyRange(after.frequencyHz[0]!, after.frequencyHz.at(-1)!);
  const compared = before ? ` It is ${differenceWords(difference, before.name)}.` : '';
  const drawn = ({ name, frequencyHz, valueDb }: Rows) => {
    const points = tableLine(frequencyHz, valueDb);
    return { name, stretches: [points], rows: points };
  };
  return (
    <RevisionChart
      after={drawn(after)}
      before={before && drawn(before)}
      difference={difference}
      span={wholeSpan(Math.min(...ends), Math.max(...ends))}
      unit={quantityUnit(quantity)}
      sentence={`The ${what} of ${after.name}, ${formatCount(count)} rows over ${range}.${compared}`}
    />
  );
}
