'use client';

import { FactorChart } from '@/components/charts/FactorChart';
import { Message } from '@/components/ui/Message';
import { SectionHeading } from '@/components/ui/SectionHeading';
import { formatDay } from '@/format/dates';
import { formatFrequencyRange } from '@/format/frequencies';
import { formatCount } from '@/format/quantities';
import { differenceWords, QUANTITY_WORDS, remarkWords } from '@/format/revisions';
import { capitalised } from '@/format/words';
import type { FactorTablePreview } from '@/schemas/tables';

type Previewed = FactorTablePreview['tables'][number];

/** What takes a factor away from frequencies that had one. */
const NARROWER = new Set(['no-factor-above', 'no-factor-below']);
const MOST = 6;

/** One table as it would be entered: drawn beside the revision before, the difference in words, and what is worth a look. */
export function TablePreviewed({ table, zone }: { table: Previewed; zone: string }) {
  const { name, before, quantity, frequencyHz, valueDb, remarks } = table;
  const what = quantity ? QUANTITY_WORDS[quantity] : 'factor';
  const range = formatFrequencyRange(frequencyHz[0]!, frequencyHz.at(-1)!);
  const narrower = remarks.filter(({ kind }) => NARROWER.has(kind));
  const others = remarks.filter(({ kind }) => !NARROWER.has(kind));
  return (
    <section aria-label={name}>
      <SectionHeading className="mt-4" remark={`${formatCount(frequencyHz.length)} rows, ${range}`}>
        {name}
      </SectionHeading>
      {narrower.map((remark) => (
        <Message key={remark.kind} tone="inconclusive" className="mt-2" lead={remarkWords(remark, what)} />
      ))}
      <div className="mt-3">
        <FactorChart
          quantity={quantity}
          after={{
            name: before ? `revision ${before.revision + 1}, as it would be entered` : 'as it would be entered',
            frequencyHz,
            valueDb,
          }}
          before={
            before && {
              name: `revision ${before.revision}, entered ${formatDay(before.enteredAt, zone)}`,
              frequencyHz: before.frequencyHz,
              valueDb: before.valueDb,
            }
          }
          difference={before?.difference ?? null}
        />
      </div>
      <p className="t-text mt-2" aria-live="polite">
        {before ? (
          quantity === null ? (
            'What its figures are has to be said before the two can be compared. '
          ) : (
            <>
              <b>{capitalised(differenceWords(before.difference, `revision ${before.revision}`))}.</b>{' '}
            </>
          )
        ) : (
          'No revision of this name is entered yet. '
        )}
        The frequencies rise from row to row. Outside {range} it has no factor; nothing is carried beyond its rows.
      </p>
      {others.length > 0 && (
        <ul className="t-text mt-2 list-disc pl-5 text-ink2">
          {others.slice(0, MOST).map((remark, i) => (
            <li key={i}>{remarkWords(remark, what)}</li>
          ))}
          {others.length > MOST && <li>{formatCount(others.length - MOST)} more like these.</li>}
        </ul>
      )}
    </section>
  );
}
