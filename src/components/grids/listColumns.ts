import type { ReactNode } from 'react';

/** A column of a list of records. */
export interface ListColumn<Row> {
  key: string;
  heading: string;
  unit?: string;
  /** Set right, in mono. */
  figure?: boolean;
  /** In mono: a number or a code. */
  mono?: boolean;
  /** px; a column without a width shares what is left by `flex`, 1 when not said. */
  widthPx?: number;
  flex?: number;
  /** Left out where the list is narrower than this. */
  fromPx?: number;
  cell: (row: Row) => ReactNode;
}

export interface ListGridProps<Row> {
  /** Names the table for a screen reader: `Runs, newest first`. */
  label: string;
  /** `runs`, for the line under the table. */
  noun: string;
  columns: readonly ListColumn<Row>[];
  rows: readonly Row[];
  rowId: (row: Row) => string;
  /** Where a row leads: its first cell is a link, Enter and a click anywhere in the row follow it. */
  href: (row: Row) => string;
  /** Follows the link; the page's router. */
  onOpen: (href: string) => void;
  /** On a phone: one or two lines per record in place of the columns. */
  compact: (row: Row) => ReactNode;
  /** All there are, when only a page is loaded. */
  total?: number;
  onMore?: () => void;
  loading?: boolean;
  empty?: ReactNode;
}
