'use client';

import Link from 'next/link';
import { useMemo, useRef } from 'react';
import { AgGridProvider, AgGridReact, type CustomCellRendererProps } from 'ag-grid-react';
import type { CellFocusedEvent, CellKeyDownEvent, ColDef, RowClickedEvent } from 'ag-grid-community';
import { useBoxSize } from '@/components/charts/useBoxSize';
import { classes } from '@/components/ui/classes';
import { GridHead } from './GridHead';
import { GRID_BOX, GRID_MODULES, gridOptions } from './gridLook';
import type { ListColumn, ListGridProps } from './listColumns';

interface CellParams<Row> {
  cell: ListColumn<Row>['cell'];
  href: ((row: Row) => string) | null;
}

function ListCell<Row>({ data, cell, href }: CustomCellRendererProps<Row> & CellParams<Row>) {
  if (!data) return null;
  const content = cell(data);
  return href ? (
    <Link href={href(data)} className="text-ink" tabIndex={-1}>
      {content}
    </Link>
  ) : (
    content
  );
}

function columnsOf<Row>(
  columns: readonly ListColumn<Row>[],
  widthPx: number,
  href: (row: Row) => string,
): ColDef<Row>[] {
  return columns
    .filter(({ fromPx = 0 }) => widthPx >= fromPx)
    .map((column, i, shown) => ({
      colId: column.key,
      headerName: column.heading,
      ...(column.widthPx === undefined
        ? { flex: column.flex ?? 1, minWidth: 60 }
        : { width: column.widthPx, minWidth: 24 }),
      cellClass: classes(
        column.figure && 't-figure text-right',
        column.mono && 't-figure',
        i < shown.length - 1 && 'pr-3.5',
        'truncate',
      ),
      headerComponentParams: { unit: column.unit, figure: column.figure },
      cellRenderer: ListCell,
      cellRendererParams: { cell: column.cell, href: i === 0 ? href : null } satisfies CellParams<Row>,
    }));
}

/** The records in AG Grid. Arrow keys move in it; Enter or a click opens. */
export default function ListTable<Row>({ label, columns, rows, rowId, href, onOpen }: ListGridProps<Row>) {
  const box = useRef<HTMLDivElement>(null);
  const { width } = useBoxSize(box, { width: 990, height: 0 });
  const shared = useMemo(() => ({ ...gridOptions<Row>(), rowSelection: undefined }), []);
  const steps = columns.map(({ fromPx = 0 }) => fromPx).filter((least) => width >= least);
  const bucket = Math.max(0, ...steps);
  const columnDefs = useMemo(() => columnsOf(columns, bucket, href), [columns, bucket, href]);
  const rowData = useMemo(() => [...rows], [rows]);

  const onCellFocused = ({ rowIndex, column }: CellFocusedEvent<Row>) => {
    if (rowIndex === null || !column || typeof column === 'string') return;
    const cell = box.current?.querySelector(`[row-index="${rowIndex}"] [col-id="${column.getColId()}"]`);
    cell?.querySelector('a')?.focus({ preventScroll: true });
  };
  const onCellKeyDown = ({ event, data }: CellKeyDownEvent<Row>) => {
    if (!(event instanceof KeyboardEvent) || event.key !== 'Enter' || !data) return;
    if (event.target instanceof HTMLAnchorElement) return;
    event.preventDefault();
    onOpen(href(data));
  };
  const onRowClicked = ({ event, data }: RowClickedEvent<Row>) => {
    // A link does its own following; a marked text is being copied, not clicked.
    const onLink = event?.target instanceof Element && event.target.closest('a, button');
    if (data && !onLink && !window.getSelection()?.toString()) onOpen(href(data));
  };

  return (
    <div ref={box} className={GRID_BOX}>
      <AgGridProvider modules={GRID_MODULES}>
        <AgGridReact<Row>
          {...shared}
          components={COMPONENTS}
          columnDefs={columnDefs}
          rowData={rowData}
          rowClass="cursor-pointer hover:bg-margin"
          getRowId={({ data }) => rowId(data)}
          onGridReady={() =>
            box.current?.querySelector('[role="grid"], [role="treegrid"]')?.setAttribute('aria-label', label)
          }
          onCellFocused={onCellFocused}
          onCellKeyDown={onCellKeyDown}
          onRowClicked={onRowClicked}
        />
      </AgGridProvider>
    </div>
  );
}

const COMPONENTS = { agColumnHeader: GridHead };
