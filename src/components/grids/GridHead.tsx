'use client';

import type { CustomHeaderProps } from 'ag-grid-react';
import { classes } from '@/components/ui/classes';

export interface GridHeadParams {
  unit?: string;
  figure?: boolean;
  /** Said, not shown. */
  hidden?: boolean;
}

/** A column's name in ink3, its unit after it at 0.9 em. */
export function GridHead({ displayName, unit, figure, hidden, column }: CustomHeaderProps & GridHeadParams) {
  if (hidden) return <span className="sr-only">{displayName}</span>;
  const pad = column.getColDef().cellClass;
  return (
    <span
      className={classes(
        't-colhead block w-full self-end whitespace-nowrap pb-1.5',
        figure && 'text-right',
        typeof pad === 'string' && pad.split(' ').find((name) => /^p[lr]-/.test(name)),
      )}
    >
      {displayName}
      {unit ? <span className="tbl-unit">{unit}</span> : null}
    </span>
  );
}
