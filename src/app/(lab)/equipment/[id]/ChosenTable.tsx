import { FactorChart } from '@/components/charts/FactorChart';
import { SectionHeading } from '@/components/ui/SectionHeading';
import { Cell, HeadCell, Row, Table, TableHead } from '@/components/ui/Table';
import { formatDay } from '@/format/dates';
import { formatFrequencyRange } from '@/format/frequencies';
import { formatCount, formatTrimmed } from '@/format/quantities';
import { capitalised } from '@/format/words';
import { differenceWords, quantityUnit, QUANTITY_WORDS, tableConditions } from '@/format/revisions';
import type { FactorTableView } from '@/schemas/tables';
import { OutdatedRuns } from '../OutdatedRuns';

interface Props {
  table: FactorTableView;
  before: FactorTableView | null;
  zone: string;
}

/** As many rows as a reader scrolls through; the whole table is one press away. */
const SHOWN = 120;

/** One revision: its chart beside the one before, what differs in words, and its rows. */
export function ChosenTable({ table, before, zone }: Props) {
  const { name, revision, quantity, frequencyHz, valueDb } = table;
  const conditions = tableConditions(table.polarisation, table.distanceM);
  const rowsBy = new Map(before?.frequencyHz.map((hz, i) => [hz, before.valueDb[i]!]));
  return (
    <section aria-label={`${name}, revision ${revision}`} id="table">
      <SectionHeading
        className="mt-6"
        remark={`${QUANTITY_WORDS[quantity]}${conditions && `, ${conditions}`}, ${formatCount(table.rows)} rows, ${formatFrequencyRange(table.firstHz, table.lastHz)}`}
      >
        {name}, revision {revision}
      </SectionHeading>
      {table.outdated && <OutdatedRuns outdated={table.outdated} className="mt-2" />}
      <div className="mt-3">
        <FactorChart
          quantity={quantity}
          after={{ name: `revision ${revision}`, frequencyHz, valueDb }}
          before={
            before && {
              name: `revision ${before.revision}, entered ${formatDay(before.enteredAt, zone)}`,
              frequencyHz: before.frequencyHz,
              valueDb: before.valueDb,
            }
          }
          difference={table.before?.difference ?? null}
        />
      </div>
      <p className="t-text mt-2">
        {table.before && (
          <>{capitalised(differenceWords(table.before.difference, `revision ${table.before.revision}`))}. </>
        )}
        Outside {formatFrequencyRange(table.firstHz, table.lastHz)} it has no factor; nothing is carried beyond its
        rows.
      </p>
      <details className="mt-3" open={table.rows <= 24}>
        <summary className="t-text cursor-pointer text-pen max-pad:min-h-11 max-pad:py-3">
          {formatCount(table.rows)} rows
        </summary>
        <Table caption={`Rows of ${name}, revision ${revision}`} className="max-w-[440px]">
          <TableHead>
            <HeadCell figure unit="MHz">
              Frequency
            </HeadCell>
            <HeadCell figure unit={quantityUnit(quantity)}>
              {capitalised(QUANTITY_WORDS[quantity])}
            </HeadCell>
            {before && (
              <HeadCell figure unit={quantityUnit(quantity)}>
                Revision {before.revision}
              </HeadCell>
            )}
          </TableHead>
          <tbody>
            {frequencyHz.slice(0, SHOWN).map((hz, i) => (
              <Row key={hz}>
                <Cell figure>{formatTrimmed(hz / 1e6, 6)}</Cell>
                <Cell figure>{formatTrimmed(valueDb[i]!, 3)}</Cell>
                {before && (
                  <Cell figure quiet>
                    {rowsBy.has(hz) ? formatTrimmed(rowsBy.get(hz)!, 3) : 'no row'}
                  </Cell>
                )}
              </Row>
            ))}
          </tbody>
        </Table>
        {table.rows > SHOWN && (
          <p className="t-detail mt-1">
            The first {SHOWN} of {formatCount(table.rows)} rows; the CSV holds all.
          </p>
        )}
      </details>
    </section>
  );
}
