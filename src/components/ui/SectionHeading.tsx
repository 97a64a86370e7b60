import type { ReactNode } from 'react';
import { classes } from './classes';

/** A section hangs under a 1.5 px rule, its remark at the right. */
export function SectionHeading({
  children,
  remark,
  id,
  className,
}: {
  children: ReactNode;
  remark?: ReactNode;
  id?: string;
  className?: string;
}) {
  return (
    <div className={classes('section-head', className)}>
      <h2 className="t-section" id={id}>
        {children}
      </h2>
      {remark && <div className="section-remark t-detail">{remark}</div>}
    </div>
  );
}
