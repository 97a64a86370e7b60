'use client';

import type { ReactNode } from 'react';
import type { SweepView } from '@/schemas/sweep';
import { DETECTOR_WORDS } from '@/format/words';
import { Switch } from '@/components/ui/Switch';
import { leadingTrace } from './chartSubject';
import { ClockField } from './ClockField';
import type { ChartMode } from './marginSeries';

interface Props {
  mode: ChartMode;
  onMode: (mode: ChartMode) => void;
  traces: SweepView['traces'];
  /** `prescan` or `final`, said of the leading trace. */
  purpose?: string;
  clockHz: number | null;
  onClock: (clockHz: number | null) => void;
  /** At the right: limit set, step, RBW, points. */
  children?: ReactNode;
}

/** A trace by its detector; where traces share one, each by its own name. */
function traceWord({ detector, name }: SweepView['traces'][number], traces: SweepView['traces']): string {
  const alone = traces.filter((other) => other.detector === detector).length === 1;
  return alone ? DETECTOR_WORDS[detector] : name;
}

/** The line over the chart: which chart, which traces, whose harmonics, and against what. */
export function ChartLegend({ mode, onMode, traces, purpose, clockHz, onClock, children }: Props) {
  const leading = leadingTrace(traces);
  return (
    <div className="flex flex-wrap items-center gap-x-5 gap-y-1.5 text-[0.84375rem] leading-5 text-ink2">
      <Switch<ChartMode>
        legend="Chart"
        choices={[
          { value: 'margin', word: 'Margin' },
          { value: 'level', word: 'Level' },
        ]}
        value={mode}
        onChange={onMode}
      />
      {traces.map((trace) => (
        <span key={trace.index} className="inline-flex items-center gap-1.5 whitespace-nowrap max-pad:hidden">
          <svg width="22" height="10" viewBox="0 0 22 10" aria-hidden>
            <path
              d="M1 6c1.5 0 2-3.5 3.5-3.5S6.5 7.5 8.5 7.5s2-6 4-6 2 5.5 3.5 5.5S18.5 4 21 4"
              fill="none"
              strokeWidth={trace.index === leading ? 1.4 : 1.1}
              className={trace.index === leading ? 'stroke-ink' : 'stroke-ink3'}
            />
          </svg>
          {traceWord(trace, traces)}
          {trace.index === leading && purpose ? `, ${purpose}` : ''}
        </span>
      ))}
      <span className="max-pad:ml-auto">
        <ClockField clockHz={clockHz} onClock={onClock} />
      </span>
      {children ? <span className="ml-auto inline-flex items-center gap-x-4 max-pad:hidden">{children}</span> : null}
    </div>
  );
}
