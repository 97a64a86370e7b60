import { useId } from 'react';
import type { CandidateView, WindowView } from '@/schemas/sweep';
import { formatMargin } from '@/format/quantities';
import { VERDICT_WORDS } from '@/format/words';
import { FIGURE, FORCED, VERDICT_MARKS } from './chartText';
import { columnValues } from './marginSeries';
import { plotScale } from './scale';
import { figureWidthPx } from './textWidth';

/** The worst emission of one run against its line, +14 to −34 dB. */
export interface SmallMultipleProps {
  /** What is shown, for its name: `M2, enclosure`. */
  name: string;
  window: WindowView | null;
  traceIndex?: number;
  worst: Pick<CandidateView, 'frequencyHz' | 'marginDb' | 'uncertaintyDb' | 'verdict'> | null;
  /** A state that is planned: a dashed frame and what it needs. */
  needs?: string;
}

const RANGE = { top: 14, bottom: -34 };
const SIZES = { wide: { width: 190, height: 80 }, narrow: { width: 104, height: 58 } } as const;

export function SmallMultiple(props: SmallMultipleProps) {
  const { worst, needs } = props;
  const said =
    needs ?? (worst ? `worst ${formatMargin(worst.marginDb)}, ${VERDICT_WORDS[worst.verdict]}` : 'not measured');
  return (
    <figure role="img" aria-label={`${props.name}: ${said}`} className={FORCED}>
      <Drawing {...props} size="wide" className="max-pad:hidden" />
      <Drawing {...props} size="narrow" className="pad:hidden" />
    </figure>
  );
}

function Drawing(props: SmallMultipleProps & { size: keyof typeof SIZES; className: string }) {
  const { window, worst, needs, size, className } = props;
  const { width, height } = SIZES[size];
  const span = window ?? { fromHz: 30e6, toHz: 1e9 };
  const scale = plotScale({ width, height, left: 0, right: 0, top: 0, bottom: 0 }, span, RANGE);
  const zero = scale.y(0);
  const hatchId = useId();
  const svg = { width, height, viewBox: `0 0 ${width} ${height}`, 'aria-hidden': true } as const;
  if (needs !== undefined || !window)
    return (
      <svg {...svg} className={`overflow-visible ${className}`}>
        <rect
          x="0.5"
          y="0.5"
          width={width - 1}
          height={height - 1}
          fill="none"
          className="stroke-edge"
          strokeDasharray="3 3"
        />
        <path d={`M0 ${zero}H${width}`} className="stroke-ink" strokeWidth="1.5" strokeDasharray="4 3" />
        <text
          x={width / 2}
          y={zero + (height - zero) / 2 + 1}
          textAnchor="middle"
          fontSize="12.5"
          className="fill-ink2"
        >
          {needs ?? 'not measured'}
        </text>
      </svg>
    );
  const trace = traceLine(window, props.traceIndex, width, scale.x, (value) => clamp(scale.y(value), height));
  const guard = worst ? Math.abs(scale.y(worst.uncertaintyDb) - zero) : 0;
  return (
    <svg {...svg} className={`overflow-visible ${className}`}>
      <pattern id={hatchId} width="5" height="5" patternUnits="userSpaceOnUse" patternTransform="rotate(45)">
        <path d="M0 0V5" className="stroke-ochre" strokeWidth="1.1" strokeOpacity="0.42" />
      </pattern>
      <path d={`M0 ${zero - guard}H${width}V${zero + guard}H0Z`} fill={`url(#${hatchId})`} />
      {trace ? <path d={`M0 ${height}L${trace}L${width} ${height}Z`} className="fill-ink" fillOpacity="0.06" /> : null}
      {trace ? (
        <path d={`M${trace}`} fill="none" className="stroke-ink" strokeWidth="0.9" strokeLinejoin="round" />
      ) : null}
      <path d={`M0 ${height - 0.5}H${width}`} className="stroke-rule2" />
      <path d={`M0 ${zero}H${width}`} className="stroke-ink" strokeWidth="1.8" />
      {worst ? (
        <Worst
          worst={worst}
          x={scale.x(worst.frequencyHz)}
          y={clamp(scale.y(-worst.marginDb), height)}
          zero={zero}
          width={width}
        />
      ) : null}
    </svg>
  );
}

const clamp = (y: number, height: number) => Math.min(height, Math.max(0, y));

/** Highest value per drawn pixel: one pixel of a small multiple holds several columns of the window. */
function traceLine(
  window: WindowView,
  traceIndex: number | undefined,
  width: number,
  x: (hz: number) => number,
  y: (value: number) => number,
): string {
  const trace = window.traces.find(({ index }) => index === (traceIndex ?? window.traces[0]?.index));
  if (!trace) return '';
  const highest = new Map<number, number>();
  for (let i = 0; i < trace.frequencyHz.length; i++) {
    const values = columnValues(trace, i, 'margin');
    if (!values) continue;
    const pixel = Math.round(x(trace.frequencyHz[i]!));
    if (pixel < 0 || pixel > width) continue;
    highest.set(pixel, Math.max(highest.get(pixel) ?? -Infinity, values.high));
  }
  return [...highest].map(([pixel, value]) => `${pixel} ${y(value)}`).join('L');
}

interface WorstProps {
  worst: NonNullable<SmallMultipleProps['worst']>;
  x: number;
  y: number;
  zero: number;
  width: number;
}

/** The figure stands beside its square, or over the line when it is inconclusive or the chart is narrow. */
function Worst({ worst, x, y, zero, width }: WorstProps) {
  const text = formatMargin(worst.marginDb);
  const wide = figureWidthPx(text, 12.5) + 4;
  const mark = VERDICT_MARKS[worst.verdict];
  const over = worst.verdict === 'inconclusive' || worst.verdict === 'needs-final' || width < 150;
  const onRight = x + 8 + wide <= width;
  const at = over
    ? { x: Math.min(Math.max(x, wide / 2), width - wide / 2), y: Math.min(y, zero) - 8, anchor: 'middle' as const }
    : { x: onRight ? x + 8 : x - 8, y: y + 5, anchor: onRight ? ('start' as const) : ('end' as const) };
  return (
    <g className={mark.colour}>
      <path d={`M${x} ${zero}V${y}`} stroke="currentColor" strokeWidth="1.4" />
      {mark.solid ? (
        <rect x={x - 3.5} y={y - 3.5} width="7" height="7" fill="currentColor" />
      ) : (
        <rect
          x={x - 2.8}
          y={y - 2.8}
          width="5.6"
          height="5.6"
          stroke="currentColor"
          strokeWidth="1.5"
          className="fill-sheet"
        />
      )}
      <text
        x={at.x}
        y={at.y}
        textAnchor={at.anchor}
        fontSize="12.5"
        fontWeight="600"
        fill="currentColor"
        strokeWidth="4"
        className={`${FIGURE} stroke-sheet [paint-order:stroke]`}
      >
        {text}
      </text>
    </g>
  );
}
