import type { ReactNode } from 'react';
import { classes } from './classes';

/** Where nothing is yet: one bold line says what to do, the rest how. The table keeps its head above it. */
export function EmptyLine({
  lead,
  children,
  className,
}: {
  lead: ReactNode;
  children?: ReactNode;
  className?: string;
}) {
  return (
    <div className={classes('empty-line border-b border-rule py-2', className)}>
      <p className="t-text font-semibold">{lead}</p>
      {children && <p className="t-detail">{children}</p>}
    </div>
  );
}
