import type { Verdict } from '@/emc/kinds';
import type { MarginText } from '@/format/quantities';
import { FIGURE, VERDICT_MARKS } from './chartText';
import type { PlotScale } from './scale';

export const TIP = { width: 158, height: 44 } as const;

export interface TipText {
  frequency: string;
  how: string;
  level: string;
  margin: MarginText | { figure: ''; word: 'no limit' };
  /** null for a point of the trace: it has a margin and no verdict. */
  verdict: Verdict | null;
}

/** The dotted line from a point to the floor of the plot, and the slip beside it. */
export function PointTip({ x, y, text, scale }: { x: number; y: number; text: TipText | null; scale: PlotScale }) {
  const onRight = x + 9 + TIP.width <= scale.right;
  const left = onRight ? x + 9 : x - 9 - TIP.width;
  const top = scale.bottom - TIP.height - 6;
  return (
    <g aria-hidden="true" className="pointer-events-none">
      <path
        d={`M${x} ${Math.min(y + 4, scale.bottom)}V${scale.bottom}`}
        className="stroke-pen"
        strokeWidth="1.3"
        strokeDasharray="2 3"
      />
      {text ? (
        <g transform={`translate(${left} ${top})`}>
          <rect width={TIP.width} height={TIP.height} className="fill-sheet stroke-pen" strokeWidth="1.2" />
          <text x="8" y="18" fontSize="12" fontWeight="600" className={`fill-ink ${FIGURE}`}>
            {text.frequency}
          </text>
          <text x={TIP.width - 8} y="18" fontSize="12" textAnchor="end" className="fill-ink2">
            {text.how}
          </text>
          <text x="8" y="36" fontSize="12" className={`fill-ink ${FIGURE}`}>
            {text.level}
          </text>
          <text
            x={TIP.width - 8}
            y="36"
            fontSize="12"
            textAnchor="end"
            fill="currentColor"
            className={`${FIGURE} ${text.verdict ? `font-semibold ${VERDICT_MARKS[text.verdict].colour}` : 'text-ink'}`}
          >
            {text.margin.figure}
            <tspan dx="3" className="font-sans tracking-normal [font-stretch:85%]">
              {text.margin.word}
            </tspan>
          </text>
        </g>
      ) : null}
    </g>
  );
}
