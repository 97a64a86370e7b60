import type { ReactNode } from 'react';
import '@/app/(lab)/sweeps/[id]/sum.css';

interface Props {
  sign?: string;
  figure: string;
  rule?: 'single' | 'double';
  source?: ReactNode;
  children: ReactNode;
}

/** One line of a column addition: sign, figure, what it is, where it is from. */
export function SumLine({ sign = '', figure, rule, source, children }: Props) {
  return (
    <div className={`sum-row ${rule ? `sum-${rule}` : ''}`}>
      <dt className="sum-sign t-figure">{sign}</dt>
      <dt className="sum-figure t-figure">{figure}</dt>
      <dd>{children}</dd>
      {source && <dd className="sum-source">{source}</dd>}
    </div>
  );
}
