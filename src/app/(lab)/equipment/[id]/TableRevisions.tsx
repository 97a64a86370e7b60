import Link from 'next/link';
import { EmptyLine } from '@/components/ui/EmptyLine';
import { Pager } from '@/components/ui/Pager';
import { SectionHeading } from '@/components/ui/SectionHeading';
import { Cell, HeadCell, KeyCell, Row, Table, TableHead } from '@/components/ui/Table';
import { formatDay } from '@/format/dates';
import { formatFrequencyRange } from '@/format/frequencies';
import { ABSENT, formatCount } from '@/format/quantities';
import { QUANTITY_WORDS, tableConditions } from '@/format/revisions';
import type { FactorTableSummary } from '@/schemas/tables';

interface Props {
  itemId: string;
  revisions: readonly FactorTableSummary[];
  chosenId: string | null;
  zone: string;
  firstHref: string | null;
  nextHref: string | null;
  manager: boolean;
}

const WIDE = 'max-pad:hidden';

/** Every table by name with all its revisions, the newest first: earlier runs name the one they were corrected with. */
export function TableRevisions({ itemId, revisions, chosenId, zone, firstHref, nextHref, manager }: Props) {
  const names = [...new Set(revisions.map(({ name }) => name))].sort((a, b) =>
    a.localeCompare(b, 'en', { numeric: true }),
  );
  return (
    <section aria-label="Factor tables">
      <SectionHeading className="mt-6" remark={names.length > 0 && 'each name once, its newest revision first'}>
        Factor tables
      </SectionHeading>
      {names.length === 0 ? (
        <EmptyLine lead="No factor table is entered for it yet.">
          {manager ? 'Upload its table; a signal path adds it afterwards.' : 'A manager uploads it.'}
        </EmptyLine>
      ) : (
        <Table caption="Revisions of factor tables" className="max-pad:[&_td]:align-top max-pad:[&_td]:py-1.5!">
          <TableHead>
            <HeadCell>Revision</HeadCell>
            <HeadCell>Range</HeadCell>
            <HeadCell figure className={WIDE}>
              Rows
            </HeadCell>
            <HeadCell>Calibrated</HeadCell>
            <HeadCell className={WIDE}>Entered</HeadCell>
            <HeadCell className={WIDE}>File</HeadCell>
          </TableHead>
          {names.map((name) => {
            const own = revisions.filter((one) => one.name === name);
            const { quantity, polarisation, distanceM } = own[0]!;
            return (
              <tbody key={name}>
                <tr>
                  <th scope="rowgroup" colSpan={6} className="t-text border-b-0! pt-2! align-bottom!">
                    <span className="font-semibold">{name}</span>
                    <span className="ml-3 text-ink2">
                      {[QUANTITY_WORDS[quantity], tableConditions(polarisation, distanceM)].filter(Boolean).join(', ')}
                    </span>
                  </th>
                </tr>
                {own.map((one) => (
                  <Row key={one.id} chosen={one.id === chosenId}>
                    <KeyCell className="whitespace-nowrap">
                      <Link
                        href={`/equipment/${itemId}?table=${one.id}#table`}
                        className="inline-flex min-h-8 items-center text-pen max-pad:min-h-11"
                        aria-current={one.id === chosenId ? 'true' : undefined}
                      >
                        revision {one.revision}
                      </Link>
                    </KeyCell>
                    <Cell className="t-figure">{formatFrequencyRange(one.firstHz, one.lastHz)}</Cell>
                    <Cell figure className={WIDE}>
                      {formatCount(one.rows)}
                    </Cell>
                    <Cell>{one.calibration ? formatDay(one.calibration.calibratedOn) : ABSENT}</Cell>
                    <Cell quiet className={WIDE}>
                      {formatDay(one.enteredAt, zone)}
                      {one.enteredBy && `, ${one.enteredBy.name}`}
                    </Cell>
                    <Cell className={WIDE}>
                      <a href={`/api/factor-tables/${one.id}/csv`} download className="text-pen hover:underline">
                        CSV
                        <span className="sr-only">
                          {' '}
                          of {name}, revision {one.revision}
                        </span>
                      </a>
                    </Cell>
                  </Row>
                ))}
              </tbody>
            );
          })}
        </Table>
      )}
      <Pager firstHref={firstHref} nextHref={nextHref} />
    </section>
  );
}
