'use client';

import { memo, useSyncExternalStore } from 'react';
import type { DifferenceView } from '@/schemas/comparison';
import type { Store } from './chartStore';
import { stripPath, stripReachDb } from './compareSeries';
import { FIGURE } from './chartText';
import { frequencyTicks } from './frequencyTicks';
import { FrequencyNumbers } from './Ruler';
import { plotScale, type Frame, type Span } from './scale';

interface Props {
  overview: DifferenceView | null;
  detail: DifferenceView | null;
  detailSpan: Span | null;
  frame: Frame;
  view: Store<Span>;
}

/** How much higher or lower the second run is, dB, on a line of its own under the chart; the frequency numbers below. */
export const DifferenceStrip = memo(function DifferenceStrip({ overview, detail, detailSpan, frame, view }: Props) {
  const span = useSyncExternalStore(view.subscribe, view.get, view.get);
  const reachDb = stripReachDb(overview?.differenceDb ?? []);
  const scale = plotScale(frame, span, { top: reachDb, bottom: -reachDb });
  const { labels, gridHz } = frequencyTicks(span, scale.right - scale.left);
  const finer = detail && detailSpan && detailSpan.fromHz <= span.fromHz && detailSpan.toHz >= span.toHz;
  const shown = finer ? detail : overview;
  const { area, line } = shown ? stripPath(shown, span, reachDb, scale.x, scale.y) : { area: '', line: '' };
  const ticks = [reachDb, 0, -reachDb];
  return (
    <svg className="absolute inset-0 size-full overflow-visible" aria-hidden="true" focusable="false">
      <path
        d={
          gridHz.map((hz) => `M${scale.x(hz)} ${scale.top}V${scale.bottom}`).join('') +
          [reachDb, -reachDb].map((db) => `M${scale.left} ${scale.y(db)}H${scale.right}`).join('')
        }
        className="stroke-rule"
        fill="none"
        strokeWidth="1"
      />
      <path d={area} className="fill-ink" fillOpacity="0.1" />
      <path d={line} className="stroke-ink" fill="none" strokeWidth="1" />
      <path d={`M${scale.left} ${scale.y(0)}H${scale.right}`} className="stroke-ink" strokeWidth="1.5" />
      {ticks.map((db) => (
        <text
          key={db}
          x={scale.left - 5}
          y={scale.y(db) + 4}
          textAnchor="end"
          fontSize="12"
          className={db === 0 ? 'fill-ink font-semibold' : 'fill-ink3'}
        >
          <tspan className={FIGURE}>{Math.abs(db)}</tspan>
          {db !== 0 && (
            <tspan dx="2" fontSize="11" className="[font-stretch:80%]">
              {db > 0 ? 'higher' : 'lower'}
            </tspan>
          )}
        </text>
      ))}
      <FrequencyNumbers labels={labels} scale={scale} y={frame.height - 8} />
    </svg>
  );
});
