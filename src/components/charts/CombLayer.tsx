import type { CombTick } from './combTicks';
import { FIGURE } from './chartText';
import type { PlotScale } from './scale';

/** Harmonics of one clock along the plot's lower edge: longer, thicker and numbered where a candidate lies on one. */
export function CombLayer({ ticks, scale }: { ticks: CombTick[]; scale: PlotScale }) {
  const y = scale.bottom;
  const short = ticks.filter((tick) => !tick.near).map((tick) => `M${tick.x} ${y}v7`);
  const long = ticks.filter((tick) => tick.near).map((tick) => `M${tick.x} ${y}v13`);
  return (
    <g aria-hidden="true">
      <path d={short.join('')} className="stroke-pen" fill="none" strokeWidth="1" strokeOpacity="0.55" />
      <path d={long.join('')} className="stroke-pen" fill="none" strokeWidth="1.6" />
      <text x={scale.left - 5} y={y + 12} textAnchor="end" fontSize="11.5" className="fill-pen">
        ×n
      </text>
      {ticks
        .filter((tick) => tick.numbered)
        .map((tick) => (
          <text key={tick.n} x={tick.x} y={y + 23} textAnchor="middle" fontSize="11.5" className={`fill-pen ${FIGURE}`}>
            {tick.n}
          </text>
        ))}
    </g>
  );
}
