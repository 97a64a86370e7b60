import Link from 'next/link';
import { DUE_VERDICTS, kindOf } from '@/app/(lab)/equipment/equipmentWords';
import { SignalPath } from '@/components/charts/SignalPath';
import { SectionHeading } from '@/components/ui/SectionHeading';
import { Cell, HeadCell, KeyCell, Row, Table, TableHead } from '@/components/ui/Table';
import { VerdictGlyph } from '@/components/ui/VerdictGlyph';
import { formatDay, formatDue } from '@/format/dates';
import { formatFrequencyRange } from '@/format/frequencies';
import { ABSENT } from '@/format/quantities';
import { formatEdge, tableConditions } from '@/format/revisions';
import type { PathItemRecord, PathRecord } from '@/schemas/paths';

const WIDE = 'max-pad:hidden';

/** The path drawn from the EUT to the receiver, and under it what each item adds from which table. */
export function Chain({ path, today }: { path: PathRecord; today: string }) {
  return (
    <section aria-label="Items">
      <SectionHeading className="mt-4" remark={`from the EUT to the receiver, revision ${path.revision}`}>
        Items
      </SectionHeading>
      <div
        className="mt-2 overflow-x-auto [&>ol]:overflow-visible"
        role="region"
        aria-label={`Path ${path.code}`}
        tabIndex={0}
      >
        <SignalPath
          items={path.items}
          sample={{ name: 'EUT', where: `position ${path.position}` }}
          distanceM={path.distanceM}
          today={today}
        />
      </div>
      <Table caption="Items of the path" className="mt-2 max-pad:[&_td]:align-top max-pad:[&_td]:py-1.5!">
        <TableHead>
          <HeadCell>Item</HeadCell>
          <HeadCell className={WIDE}>Kind</HeadCell>
          <HeadCell>Adds</HeadCell>
          <HeadCell>Table</HeadCell>
          <HeadCell className={WIDE}>Range</HeadCell>
          <HeadCell>Calibration due</HeadCell>
        </TableHead>
        <tbody>
          {path.items.map((item, i) => (
            <Row key={`${item.identifier} ${i}`}>
              <KeyCell>
                <Link
                  href={`/equipment/${item.equipmentId}`}
                  className="t-id inline-flex min-h-8 items-center text-pen max-pad:min-h-11"
                >
                  {item.identifier}
                </Link>
              </KeyCell>
              <Cell quiet className={WIDE}>
                {kindOf(item.role)}
              </Cell>
              <Cell>
                {item.term === null ? (
                  <span className="text-ink2">nothing</span>
                ) : (
                  <>
                    <span className="t-figure">{item.sign}</span> {item.term}
                    <InRange item={item} />
                  </>
                )}
              </Cell>
              <Cell>
                <Tables item={item} />
              </Cell>
              <Cell className={WIDE}>
                {item.tables.map((table) => (
                  <span key={table.id} className="t-figure block">
                    {formatFrequencyRange(table.frequencyHz[0]!, table.frequencyHz.at(-1)!)}
                  </span>
                ))}
              </Cell>
              <Cell>
                <Due item={item} today={today} />
              </Cell>
            </Row>
          ))}
        </tbody>
      </Table>
    </section>
  );
}

/** Where an item of a path split by frequency is in it. */
function InRange({ item: { fromHz, toHz } }: { item: PathItemRecord }) {
  if (fromHz === null && toHz === null) return null;
  if (fromHz === null) return <span className="text-ink2">, to {formatEdge(toHz!)}</span>;
  if (toHz === null) return <span className="text-ink2">, from {formatEdge(fromHz)}</span>;
  return <span className="text-ink2">, {formatFrequencyRange(fromHz, toHz)}</span>;
}

function Tables({ item }: { item: PathItemRecord }) {
  if (item.tables.length === 0) return <span className="text-ink2">{ABSENT}</span>;
  return item.tables.map(({ id, name, revision, polarisation, distanceM }) => (
    <span key={id} className="block">
      <Link
        href={`/equipment/${item.equipmentId}?table=${id}#table`}
        className="text-pen hover:underline max-pad:inline-flex max-pad:min-h-11 max-pad:items-center"
      >
        {name}
      </Link>
      <span className="text-ink2">
        {' '}
        revision {revision}
        {polarisation !== null && `, ${tableConditions(null, distanceM)}`}
      </span>
    </span>
  ));
}

function Due({ item, today }: { item: PathItemRecord; today: string }) {
  const verdict = DUE_VERDICTS[item.due];
  const words =
    item.due === 'not-calibrated' || item.dueOn === null
      ? 'not calibrated'
      : item.due === 'in-date'
        ? formatDay(item.dueOn)
        : formatDue(item.dueOn, today);
  return (
    <span className={`verdict verdict-${verdict}`}>
      <VerdictGlyph verdict={verdict} />
      {words}
      {item.state !== 'in-use' && `, ${item.state}`}
    </span>
  );
}
