'use client';

import dynamic from 'next/dynamic';
import type { ReactNode } from 'react';
import type { CandidateView } from '@/schemas/sweep';
import { candidateFrame, type CandidateFigure, type CandidateFigures, type CandidateSweep } from './candidateColumns';
import { CandidateList } from './CandidateList';
import { MoreLine } from './MoreLine';
import { usePhone } from './useWidths';

export type { CandidateFigure };

const loadTable = () => import('./CandidateTable');
const CandidateTable = dynamic(loadTable, { ssr: false });
// Fetched while the page hydrates, not after it; a phone has its own list.
if (typeof window !== 'undefined' && window.innerWidth >= 760) void loadTable();

export interface CandidateGridProps extends CandidateFigures {
  /** The chart points here with `aria-details`. */
  id?: string;
  sweep: CandidateSweep;
  /** Worst first. */
  candidates: readonly CandidateView[];
  /** All there are, loaded or not. */
  total?: number;
  selectedRank: number | null;
  onSelect: (candidate: CandidateView) => void;
  onMore?: () => void;
  loading?: boolean;
  /** Names harmonics of this clock in the last column. */
  clockHz?: number | null;
  /** What stands under the head when there is none. */
  empty?: ReactNode;
}

/** The candidates of a run, worst first: the chart's text form. A table from 760 px on, a list on a phone. */
export function CandidateGrid(props: CandidateGridProps) {
  const { id, sweep, candidates, total = candidates.length, onMore, loading, clockHz = null } = props;
  const phone = usePhone();
  const frame = candidateFrame(sweep);
  const rows = { ...props, clockHz, frame };
  return (
    <section id={id} aria-label="Candidates, worst first">
      {phone ? <CandidateList {...rows} /> : <CandidateTable {...rows} />}
      {candidates.length === 0 ? (
        <div className="border-b border-rule py-2 text-ink2 max-pad:border-t">
          {props.empty ?? 'No candidates: no peak is near the limit, and all of the trace is under it by more than U.'}
        </div>
      ) : null}
      <MoreLine shown={candidates.length} total={total} noun="candidates" onMore={onMore} loading={loading} />
    </section>
  );
}
