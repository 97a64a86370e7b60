import { bandsIn, type PlotScale, type Span } from './scale';
import type { FrequencyLabel } from './frequencyTicks';
import { rulerTicks } from './frequencyTicks';
import { figureWidthPx, wordWidthPx } from './textWidth';
import { FIGURE } from './chartText';

const HEIGHT_PX = 26;

/** The ruler on the plot's upper edge: log ticks, and the CISPR bands with an upright at each band edge. */
export function Ruler({ scale, span }: { scale: PlotScale; span: Span }) {
  const y = scale.top;
  const ticks = rulerTicks(span, scale.right - scale.left)
    .map(({ hz, tall }) => `M${scale.x(hz)} ${y}v${tall ? -9 : -5}`)
    .join('');
  const bands = bandsIn(span);
  const edges = [span.fromHz, ...bands.slice(1).map((band) => band.fromHz), span.toHz]
    .map((hz) => `M${scale.x(hz)} ${y}v${-HEIGHT_PX}`)
    .join('');
  return (
    <g aria-hidden="true">
      <path d={ticks} className="stroke-ink3" fill="none" strokeWidth="1" />
      <path d={`M${scale.left} ${y}H${scale.right}`} className="stroke-ink3" fill="none" strokeWidth="1.5" />
      <path d={edges} className="stroke-ink" fill="none" strokeWidth="1.2" />
      {bands.map((band, i) => (
        <BandName key={band.name} band={band} first={i === 0} scale={scale} y={y - 15} />
      ))}
    </g>
  );
}

interface BandNameProps {
  band: { name: string; text: string; fromHz: number; toHz: number };
  first: boolean;
  scale: PlotScale;
  y: number;
}

/** Says as much of a band's name as its stretch has room for. */
function BandName({ band, first, scale, y }: BandNameProps) {
  const room = scale.x(band.toHz) - scale.x(band.fromHz) - 12;
  const words = [`${first ? 'CISPR band' : 'band'} ${band.name}`, `band ${band.name}`, band.name].find(
    (wording) => wordWidthPx(wording, 12.5) <= room,
  );
  if (!words) return null;
  const full = wordWidthPx(words, 12.5) + figureWidthPx(band.text, 12.5) + 6 <= room;
  return (
    <text
      x={(scale.x(band.fromHz) + scale.x(band.toHz)) / 2}
      y={y}
      textAnchor="middle"
      fontSize="12.5"
      className="fill-ink2"
    >
      {words}
      {full ? (
        <tspan dx="4" className={FIGURE}>
          {band.text}
        </tspan>
      ) : null}
    </text>
  );
}

/** Frequency numbers under the plot; the last one carries the unit. */
export function FrequencyNumbers({ labels, scale, y }: { labels: FrequencyLabel[]; scale: PlotScale; y: number }) {
  return (
    <g aria-hidden="true" className="fill-ink3" fontSize="12">
      {labels.map((label) => (
        <text key={label.hz} x={scale.x(label.hz)} y={y} textAnchor={label.anchor} className={FIGURE}>
          {label.text}
        </text>
      ))}
    </g>
  );
}
