'use client';

import { useState, type ReactNode } from 'react';
import { useKey } from '@/components/shell/keys';
import { Sheet } from '@/components/shell/Sheet';
import { useSheet } from '@/components/shell/sheetState';
import { Cell, HeadCell, KeyCell, Row, Table, TableHead } from '@/components/ui/Table';
import { VerdictWord } from '@/components/ui/VerdictWord';
import { formatDay } from '@/format/dates';
import { ABSENT, formatCount } from '@/format/quantities';
import type { EquipmentView } from '@/schemas/bench';
import { stripScale, type StripScale } from './calibrationScale';
import { CalibrationStrip, StripHead } from './CalibrationStrip';
import { DUE_VERDICTS, dueWords, kindOf } from './equipmentWords';
import { CalibrationRecord, FactorTables } from './ItemRecord';

interface Props {
  header: ReactNode;
  items: readonly EquipmentView[];
  today: string;
  /** Pager, signal paths and limit sets. */
  children: ReactNode;
}

/** Equipment with its calibration strips; the chosen item's certificate and factor tables lie in the margin. */
export function EquipmentSheet({ header, items, today, children }: Props) {
  const [chosenId, setChosenId] = useState(items[0]?.id ?? null);
  const chosen = items.find(({ id }) => id === chosenId) ?? null;
  const scale = stripScale(today);
  const rows = (count: number) => (count === 1 ? '1 table' : `${formatCount(count)} tables`);
  return (
    <Sheet
      header={header}
      margin={
        chosen
          ? [
              {
                id: 'calibration',
                title: 'Calibration',
                subject: `of ${chosen.identifier}`,
                children: <CalibrationRecord item={chosen} today={today} />,
              },
              {
                id: 'tables',
                title: 'Factor tables',
                remark: chosen.tables.length > 0 ? rows(chosen.tables.length) : undefined,
                count: chosen.tables.length,
                children: <FactorTables item={chosen} />,
              },
            ]
          : undefined
      }
      marginLine={chosen && `${chosen.identifier}: ${dueWords(chosen, today)}`}
      keys={
        chosen
          ? [
              { keys: ['ArrowUp', 'ArrowDown'], does: 'rows' },
              { keys: ['?'], does: 'all keys' },
            ]
          : undefined
      }
    >
      <div className="mt-3">
        <EquipmentTable items={items} scale={scale} chosenId={chosenId} onChoose={setChosenId} />
      </div>
      {children}
    </Sheet>
  );
}

interface TableProps {
  items: readonly EquipmentView[];
  scale: StripScale;
  chosenId: string | null;
  onChoose: (id: string) => void;
}

const WIDE = 'max-pad:hidden';
/** The margin says it again beside the table. */
const BROAD = 'max-wide:hidden';

function EquipmentTable({ items, scale, chosenId, onChoose }: TableProps) {
  const { open } = useSheet();
  const step = (by: number): boolean | void => {
    const next = items[items.findIndex(({ id }) => id === chosenId) + by];
    if (!next) return false;
    onChoose(next.id);
  };
  useKey('ArrowDown', () => step(1), { says: 'next item', weak: true });
  useKey('ArrowUp', () => step(-1), { says: 'item before', weak: true });
  return (
    <Table caption="Equipment, what asks for somebody first">
      <TableHead>
        <HeadCell>Item</HeadCell>
        <HeadCell className={WIDE}>Kind</HeadCell>
        <HeadCell className={`${BROAD} w-[23%]`}>What it is</HeadCell>
        <HeadCell className="w-[31%] max-pad:w-[34%]">
          <span className="sr-only">Calibrated until</span>
          <StripHead scale={scale} />
        </HeadCell>
        <HeadCell figure className={WIDE}>
          Due
        </HeadCell>
        <HeadCell>Calibration</HeadCell>
        <HeadCell figure className={WIDE}>
          Tables
        </HeadCell>
      </TableHead>
      <tbody>
        {items.map((item) => (
          <Row key={item.id} chosen={item.id === chosenId}>
            <KeyCell className="whitespace-nowrap">
              <button
                type="button"
                className="t-id min-h-8 font-semibold hover:text-pen"
                aria-pressed={item.id === chosenId}
                aria-label={`${item.identifier}, show its calibration`}
                onClick={(event) => {
                  onChoose(item.id);
                  open('calibration', { focus: event.detail === 0 });
                }}
              >
                {item.identifier}
              </button>
            </KeyCell>
            <Cell className={`${WIDE} whitespace-nowrap`} quiet>
              {kindOf(item.role)}
            </Cell>
            <Cell className={`${BROAD} max-w-0 truncate`} quiet title={item.description}>
              {item.description}
            </Cell>
            <Cell>
              <CalibrationStrip item={item} scale={scale} />
            </Cell>
            <Cell figure className={WIDE}>
              {item.dueOn ? formatDay(item.dueOn) : ABSENT}
            </Cell>
            <Cell>
              <VerdictWord verdict={DUE_VERDICTS[item.due]} className="max-pad:whitespace-normal">
                {dueWords(item, scale.today)}
              </VerdictWord>
            </Cell>
            <Cell figure className={WIDE}>
              {item.tables.length > 0 ? formatCount(item.tables.length) : ABSENT}
            </Cell>
          </Row>
        ))}
      </tbody>
    </Table>
  );
}
