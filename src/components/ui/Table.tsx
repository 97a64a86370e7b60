import type { ComponentProps, ReactNode } from 'react';
import { classes } from './classes';
import { ScrollFrame } from './ScrollFrame';

/**
 * The parts of a table, worst row first: `<Table caption="Candidates"><TableHead>…</TableHead><tbody>…`. Rows are 32 px
 * (46 on a phone), two-line rows 44. Where it is wider than its place it scrolls inside it.
 */
export function Table({
  caption,
  twoLine,
  className,
  children,
}: {
  /** Read by a screen reader; the heading above the table is what others see. */
  caption: string;
  twoLine?: boolean;
  className?: string;
  children: ReactNode;
}) {
  return (
    <ScrollFrame name={caption} className="tbl-scroll">
      <table className={classes('tbl', twoLine && 'tbl-two', className)}>
        <caption className="sr-only">{caption}</caption>
        {children}
      </table>
    </ScrollFrame>
  );
}

export function TableHead({ children }: { children: ReactNode }) {
  return (
    <thead>
      <tr>{children}</tr>
    </thead>
  );
}

export interface HeadCellProps extends ComponentProps<'th'> {
  /** After the name, at 0.9 em. */
  unit?: string;
  /** A column of figures, set right. */
  figure?: boolean;
}

export function HeadCell({ unit, figure, className, children, ...rest }: HeadCellProps) {
  return (
    <th scope="col" className={classes(figure && 'tbl-figure', className)} {...rest}>
      {children}
      {unit && <span className="tbl-unit">{unit}</span>}
    </th>
  );
}

export interface RowProps extends ComponentProps<'tr'> {
  /** The row whose figure is open or whose record is shown. */
  chosen?: boolean;
}

export function Row({ chosen, className, ...rest }: RowProps) {
  return <tr className={classes(chosen && 'tbl-chosen', className)} {...(chosen && { 'data-chosen': '' })} {...rest} />;
}

export interface CellProps extends ComponentProps<'td'> {
  figure?: boolean;
  /** ink2: what is known and not looked for. */
  quiet?: boolean;
  strong?: boolean;
}

export function Cell({ figure, quiet, strong, className, ...rest }: CellProps) {
  return (
    <td
      className={classes(figure && 'tbl-figure', quiet && 'tbl-quiet', strong && 'tbl-strong', className)}
      {...rest}
    />
  );
}

/** The cell that names its row: `LD-40`, `ANT-02`. */
export function KeyCell({ className, ...rest }: ComponentProps<'th'>) {
  return <th scope="row" className={classes('tbl-key', className)} {...rest} />;
}
