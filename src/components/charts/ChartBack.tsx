'use client';

import { memo, useSyncExternalStore } from 'react';
import type { Store } from './chartStore';
import type { ChartSubject } from './chartSubject';
import { frequencyTicks } from './frequencyTicks';
import { flattened, guardBands, upperEnvelope, type PathPoint } from './limitPath';
import type { ChartMode } from './marginSeries';
import { plotScale, valueTicks, type Frame, type PlotScale, type Range, type Span } from './scale';
import { FIGURE } from './chartText';

/** Drawn lines as the chart has them: at 0 in the margin chart, at their level in the level chart. */
export function drawnEnvelope(subject: ChartSubject, span: Span, mode: ChartMode): PathPoint[][] {
  const upper = upperEnvelope(subject.lines, span);
  return mode === 'margin' ? flattened(upper) : upper;
}

/** Behind the traces: the over zone, the grid and the numbers of the dB axis. */
export const ChartBack = memo(function ChartBack(props: {
  subject: ChartSubject;
  frame: Frame;
  range: Range;
  view: Store<Span>;
  mode: ChartMode;
}) {
  const { subject, frame, range, view, mode } = props;
  const span = useSyncExternalStore(view.subscribe, view.get, view.get);
  const scale = plotScale(frame, span, range);
  const { gridHz } = frequencyTicks(span, scale.right - scale.left);
  const envelope = drawnEnvelope(subject, span, mode);
  const bands = guardBands(envelope, subject.uncertainty);
  const at = ({ hz, value }: PathPoint) => `${scale.x(hz)} ${Math.max(scale.top, scale.y(value))}`;
  const edges = bands.length > 0 ? bands.map((band) => band.upper) : envelope;
  const zone = edges
    .map((edge) => {
      const first = edge[0]!;
      const last = edge.at(-1)!;
      return `M${scale.x(first.hz)} ${scale.top}L${edge.map(at).join('L')}L${scale.x(last.hz)} ${scale.top}Z`;
    })
    .join('');
  const ticks = valueTicks(range, scale.bottom - scale.top);
  const grid =
    gridHz.map((hz) => `M${scale.x(hz)} ${scale.top}V${scale.bottom}`).join('') +
    ticks.map((value) => `M${scale.left} ${scale.y(value)}H${scale.right}`).join('');
  return (
    <svg className="absolute inset-0 size-full overflow-visible" aria-hidden="true" focusable="false">
      <path d={zone} className="fill-madderw print:fill-none" fillOpacity="0.55" />
      {subject.notRead && <NotRead range={subject.notRead} span={span} scale={scale} />}
      <path d={grid} className="stroke-rule" fill="none" strokeWidth="1" />
      {ticks.map((value) => (
        <ValueNumber key={value} value={value} x={scale.left - 5} y={scale.y(value) + 4} mode={mode} />
      ))}
    </svg>
  );
});

/** Where a broken file says nothing: shaded, over the zones, with its word at the foot. */
function NotRead(props: { range: Span; span: Span; scale: PlotScale }) {
  const { range, span, scale } = props;
  const from = scale.x(Math.max(range.fromHz, span.fromHz));
  const to = scale.x(Math.min(range.toHz, span.toHz));
  if (!(to > from)) return null;
  const width = to - from;
  return (
    <>
      <rect
        x={from}
        y={scale.top}
        width={width}
        height={scale.bottom - scale.top}
        className="fill-desk"
        fillOpacity="0.85"
      />
      {width > 52 && (
        <text x={(from + to) / 2} y={scale.bottom - 14} textAnchor="middle" fontSize="12.5" className="fill-ink2">
          not read
        </text>
      )}
    </>
  );
}

function ValueNumber({ value, x, y, mode }: { value: number; x: number; y: number; mode: ChartMode }) {
  const zero = mode === 'margin' && value === 0;
  return (
    <text x={x} y={y} textAnchor="end" fontSize="12" className={zero ? 'fill-ink font-semibold' : 'fill-ink3'}>
      <tspan className={FIGURE}>{mode === 'margin' ? Math.abs(value) : value}</tspan>
      {mode === 'margin' && value !== 0 ? (
        <tspan dx="2" fontSize="11" className="[font-stretch:80%]">
          {value > 0 ? 'over' : 'under'}
        </tspan>
      ) : null}
    </text>
  );
}
