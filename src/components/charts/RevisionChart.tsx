'use client';

import { useRef } from 'react';
import { formatDifference } from '@/format/revisions';
import { formatTrimmed } from '@/format/quantities';
import type { DifferenceView } from '@/schemas/tables';
import { FIGURE, FORCED, HALO } from './chartText';
import { frequencyTicks } from './frequencyTicks';
import type { PathPoint } from './limitPath';
import { rangeTicks, revisionRange, stripRange } from './revisionScale';
import { FrequencyNumbers, Ruler } from './Ruler';
import {
  NARROW_LEFT_PX,
  NARROW_PX,
  plotScale,
  PREVIEW_INSETS,
  type Frame,
  type PlotScale,
  type Range,
  type Span,
} from './scale';
import { figureWidthPx } from './textWidth';
import { useBoxSize } from './useBoxSize';

export interface DrawnRevision {
  /** `revision 2, not entered yet` */
  name: string;
  stretches: PathPoint[][];
  /** Rows of a table, each marked; a limit line has none. */
  rows?: PathPoint[];
}

export interface RevisionChartProps {
  after: DrawnRevision;
  before: DrawnRevision | null;
  /** What the line is made of, drawn thin, each with its name at its end. */
  parts?: readonly DrawnRevision[];
  difference: DifferenceView | null;
  span: Span;
  /** Written over the axis: dB/m, dBµV. */
  unit: string;
  /** The chart in one sentence; the rows beside it are its text form. */
  sentence: string;
}

const PLOT_PX = 264;
const STRIP_PX = 104;
const MOST_MARKS = 80;

/** A new revision in ink beside the one before in grey, and under them the difference between the two. */
export function RevisionChart(props: RevisionChartProps) {
  const { after, before, parts = [], difference, span, unit, sentence } = props;
  const box = useRef<HTMLDivElement>(null);
  const { width } = useBoxSize(box, { width: 640, height: PLOT_PX });
  const left = width < NARROW_PX ? NARROW_LEFT_PX : PREVIEW_INSETS.left;
  const frame: Frame = { ...PREVIEW_INSETS, left, width, height: PLOT_PX };
  const values = [after, before, ...parts].flatMap((one) => one?.stretches.flat().map(({ value }) => value) ?? []);
  const range = revisionRange(values);
  const scale = wholeHundredths(plotScale(frame, span, range));
  const { gridHz, labels } = frequencyTicks(span, scale.right - scale.left);
  const ticks = rangeTicks(range, scale.bottom - scale.top);
  const path = (points: PathPoint[]) =>
    `M${points.map(({ hz, value }) => `${scale.x(hz)} ${scale.y(value)}`).join('L')}`;
  const drawn = (revision: DrawnRevision) => revision.stretches.map(path).join('');
  const rows = after.rows && after.rows.length <= MOST_MARKS ? after.rows : [];
  return (
    <figure className={`revision-chart ${FORCED}`}>
      <div ref={box} role="img" aria-label={sentence} className="relative">
        <svg width="100%" height={PLOT_PX} className="block overflow-visible" aria-hidden="true">
          <g className="stroke-rule" fill="none">
            <path
              d={
                gridHz.map((hz) => `M${scale.x(hz)} ${scale.top}V${scale.bottom}`).join('') +
                ticks.map((value) => `M${scale.left} ${scale.y(value)}H${scale.right}`).join('')
              }
            />
          </g>
          <ValueNumbers ticks={ticks} x={scale.left - 6} y={scale.y} />
          <text x={scale.left - 6} y={scale.top - 12} textAnchor="end" fontSize="12" className="fill-ink3">
            {unit}
          </text>
          <Ruler scale={scale} span={span} />
          {parts.map((part) => (
            <path key={part.name} d={drawn(part)} className="stroke-ink3" fill="none" strokeWidth="1" />
          ))}
          {before && (
            <path d={drawn(before)} className="stroke-ink3" fill="none" strokeWidth="1.4" strokeDasharray="5 3" />
          )}
          <path d={drawn(after)} className="stroke-ink" fill="none" strokeWidth="1.8" strokeLinejoin="round" />
          {rows.map(({ hz, value }) => (
            <rect key={hz} x={scale.x(hz) - 2} y={scale.y(value) - 2} width="4" height="4" className="fill-ink" />
          ))}
          <PartNames parts={parts} x={scale.x} y={scale.y} />
          <path d={`M${scale.left} ${scale.bottom}H${scale.right}`} className="stroke-ink3" />
          <FrequencyNumbers labels={labels} scale={scale} y={scale.bottom + 18} />
        </svg>
        {difference && <DifferenceStrip difference={difference} frame={frame} span={span} gridHz={gridHz} />}
      </div>
      <figcaption className="t-detail mt-1 flex flex-wrap gap-x-5 gap-y-0.5 text-ink2">
        <Key name={after.name} className="stroke-ink" width="1.8" />
        {before && <Key name={before.name} className="stroke-ink3" width="1.4" dash="5 3" />}
      </figcaption>
    </figure>
  );
}

/** A browser's logarithm may differ from the server's in its last bit; a drawing made by both has to be the same. */
function wholeHundredths(scale: PlotScale): PlotScale {
  const whole = (px: number) => Math.round(px * 100) / 100;
  return { ...scale, x: (hz) => whole(scale.x(hz)), y: (value) => whole(scale.y(value)) };
}

function Key({ name, className, width, dash }: { name: string; className: string; width: string; dash?: string }) {
  return (
    <span className="flex items-center gap-2">
      <svg width="28" height="8" aria-hidden="true">
        <path d="M0 4H28" className={className} strokeWidth={width} strokeDasharray={dash} />
      </svg>
      {name}
    </span>
  );
}

const NAME_PX = 14;

/** From the lowest up, each at least a name's height over the one below it. */
function apart<T extends { y: number }>(names: readonly T[]): T[] {
  const placed: T[] = [];
  for (const name of [...names].sort((a, b) => b.y - a.y)) {
    placed.push({ ...name, y: Math.min(name.y, (placed.at(-1)?.y ?? Infinity) - NAME_PX) });
  }
  return placed;
}

/** Each part's name over its last point, apart from the one below it. */
function PartNames({
  parts,
  x,
  y,
}: {
  parts: readonly DrawnRevision[];
  x: (hz: number) => number;
  y: (value: number) => number;
}) {
  const ends = parts.flatMap(({ name, stretches }) => {
    const end = stretches.at(-1)?.at(-1);
    return end ? [{ name, x: x(end.hz) - 4, y: y(end.value) - 5 }] : [];
  });
  return (
    <g fontSize="12" textAnchor="end" strokeWidth="4" className={`fill-ink2 ${HALO}`}>
      {apart(ends).map((end) => (
        <text key={end.name} x={end.x} y={end.y}>
          {end.name}
        </text>
      ))}
    </g>
  );
}

function ValueNumbers({ ticks, x, y }: { ticks: readonly number[]; x: number; y: (value: number) => number }) {
  return (
    <g className={`fill-ink3 ${FIGURE}`} fontSize="12" textAnchor="end">
      {ticks.map((value) => (
        <text key={value} x={x} y={y(value) + 4}>
          {formatTrimmed(value, 2)}
        </text>
      ))}
    </g>
  );
}

interface StripProps {
  difference: DifferenceView;
  frame: Frame;
  span: Span;
  gridHz: readonly number[];
}

/** New minus old around a zero of its own; the largest carries its figure. */
function DifferenceStrip({ difference, frame, span, gridHz }: StripProps) {
  const { stretches, largestDb, atHz } = difference;
  const range: Range = stripRange(largestDb);
  const scale = wholeHundredths(plotScale({ ...frame, height: STRIP_PX, top: 22, bottom: 8 }, span, range));
  const line = stretches
    .map((points) => `M${points.map(({ hz, db }) => `${scale.x(hz)} ${scale.y(db)}`).join('L')}`)
    .join('');
  const area = stretches
    .map((points) => {
      const [first, last] = [points[0]!, points.at(-1)!];
      const along = points.map(({ hz, db }) => `${scale.x(hz)} ${scale.y(db)}`).join('L');
      return `M${scale.x(first.hz)} ${scale.y(0)}L${along}L${scale.x(last.hz)} ${scale.y(0)}Z`;
    })
    .join('');
  const words = formatDifference(largestDb);
  const x = scale.x(atHz);
  const onLeft = x + 10 + figureWidthPx(words, 12.5) > scale.right;
  return (
    <svg width="100%" height={STRIP_PX} className="mt-2 block overflow-visible" aria-hidden="true">
      <path
        d={gridHz.map((hz) => `M${scale.x(hz)} ${scale.top}V${scale.bottom}`).join('')}
        className="stroke-rule"
        fill="none"
      />
      <text x={scale.left} y="13" fontSize="12.5" className="fill-ink2">
        Difference, new less old, dB
      </text>
      <path d={area} className="fill-ink" fillOpacity="0.1" />
      <path d={`M${scale.left} ${scale.y(0)}H${scale.right}`} className="stroke-ink" strokeWidth="1" />
      <path d={line} className="stroke-ink" fill="none" strokeWidth="1.4" strokeLinejoin="round" />
      <g fontSize="12" textAnchor="end" className={`fill-ink3 ${FIGURE}`}>
        {[range.top, 0, range.bottom].map((value) => (
          <text key={value} x={scale.left - 6} y={scale.y(value) + 4}>
            {formatTrimmed(Math.abs(value), 2)}
          </text>
        ))}
      </g>
      <g fontSize="11.5" strokeWidth="3" className={`fill-ink3 ${HALO}`}>
        <text x={scale.left + 4} y={scale.top + 9}>
          higher
        </text>
        <text x={scale.left + 4} y={scale.bottom - 2}>
          lower
        </text>
      </g>
      {words !== 'no different' && (
        <>
          <rect x={x - 3} y={scale.y(largestDb) - 3} width="6" height="6" className="fill-ink" />
          <text
            x={onLeft ? x - 8 : x + 8}
            y={scale.y(largestDb) + (largestDb > 0 ? -4 : 13)}
            textAnchor={onLeft ? 'end' : 'start'}
            fontSize="12.5"
            fontWeight="600"
            strokeWidth="4"
            className={`fill-ink ${HALO}`}
          >
            {words}
          </text>
        </>
      )}
    </svg>
  );
}
