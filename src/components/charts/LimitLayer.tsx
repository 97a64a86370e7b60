import { formatUncertainty } from '@/format/quantities';
import type { ChartSubject } from './chartSubject';
import { drawnEnvelope } from './ChartBack';
import { FIGURE, HALO } from './chartText';
import { guardBands, limitPolylines, stepsIn, type Band, type PathPoint } from './limitPath';
import type { LimitLabel } from './limitLabels';
import type { ChartMode } from './marginSeries';
import type { PlotScale, Span } from './scale';
import { figureWidthPx, wordWidthPx } from './textWidth';

interface Props {
  subject: ChartSubject;
  span: Span;
  scale: PlotScale;
  mode: ChartMode;
  hatchId: string;
  labels: LimitLabel[];
  words: ZoneWord[];
  /** Smaller words, and no word for the guard band: its hatch says it. */
  narrow: boolean;
}

/** The guard band ±U, the limit lines with their values riding on them, and the words of the three zones. */
export function LimitLayer({ subject, span, scale, mode, hatchId, labels, words, narrow }: Props) {
  const { envelope, lines, bands } = drawnLimits(subject, span, mode);
  const at = ({ hz, value }: PathPoint) => `${scale.x(hz)} ${clampY(scale, scale.y(value))}`;
  const path = (points: PathPoint[]) => `M${points.map(at).join('L')}`;
  const area = bands.map((band) => `${path(band.upper)}L${[...band.lower].reverse().map(at).join('L')}Z`).join('');
  const edges = bands.flatMap((band) => [path(band.upper), path(band.lower)]).join('');
  const limits = lines.map(path).join('');
  const steps =
    mode === 'margin'
      ? stepsIn(subject.lines, span)
          .map((hz) => `M${scale.x(hz)} ${scale.y(0) - 6}v12`)
          .join('')
      : '';
  return (
    <g aria-hidden="true">
      <defs>
        <pattern id={hatchId} width="6" height="6" patternUnits="userSpaceOnUse" patternTransform="rotate(45)">
          <path d="M0 0V6" className="stroke-ochre" strokeWidth="1.2" strokeOpacity="0.42" />
        </pattern>
      </defs>
      <path d={area} fill={`url(#${hatchId})`} />
      <path d={edges} className="stroke-ochre" fill="none" strokeWidth="0.8" strokeOpacity="0.6" />
      <path
        d={uncovered(envelope, span, scale, mode)}
        className="stroke-ink3"
        fill="none"
        strokeWidth="1.5"
        strokeDasharray="2 2"
      />
      <path d={limits} className="stroke-ink" fill="none" strokeWidth="2" strokeLinejoin="miter" />
      <path d={steps} className="stroke-ink" fill="none" strokeWidth="2" />
      <ZoneWords words={words} narrow={narrow} />
      {labels.map((label) => (
        <text
          key={label.key}
          x={label.x}
          y={labelY(scale, mode, label)}
          fontSize={narrow ? 12 : 12.5}
          strokeWidth="5"
          className={`fill-ink ${FIGURE} ${HALO}`}
        >
          {label.text}
        </text>
      ))}
    </g>
  );
}

/** What is drawn of the limits: at 0 in the margin chart, at their level in the level chart. */
export function drawnLimits(subject: ChartSubject, span: Span, mode: ChartMode) {
  const envelope = drawnEnvelope(subject, span, mode);
  const lines = mode === 'margin' ? envelope : subject.lines.flatMap((line) => limitPolylines(line, span));
  return { envelope, lines, bands: guardBands(lines, subject.uncertainty) };
}

/** Baseline of a value that rides on the line. */
export function labelY(scale: PlotScale, mode: ChartMode, label: LimitLabel): number {
  return scale.y(mode === 'margin' ? 0 : label.value) - 7;
}

const clampY = (scale: PlotScale, y: number) => Math.min(scale.bottom, Math.max(scale.top, y));

/** Where no limit applies the margin chart's zero goes on as the dashes of "not covered". */
function uncovered(envelope: PathPoint[][], span: Span, scale: PlotScale, mode: ChartMode): string {
  if (mode === 'level') return '';
  const y = scale.y(0);
  const holes: [number, number][] = [];
  let reachedHz = span.fromHz;
  for (const points of envelope) {
    if (points[0]!.hz > reachedHz) holes.push([reachedHz, points[0]!.hz]);
    reachedHz = points.at(-1)!.hz;
  }
  if (reachedHz < span.toHz) holes.push([reachedHz, span.toHz]);
  return holes.map(([from, to]) => `M${scale.x(from)} ${y}H${scale.x(to)}`).join('');
}

interface ZoneWordsProps {
  envelope: PathPoint[][];
  /** Every line's own; the lowest of them bounds what is under. */
  bands: Band[];
  scale: PlotScale;
  narrow: boolean;
}

export type ZoneWord = ReturnType<typeof zoneWords>[number];

/** The words at the right edge: what a square means above, across and under the line there. */
export function zoneWords({ envelope, bands, scale, narrow }: ZoneWordsProps) {
  const last = envelope.at(-1)?.at(-1);
  if (!last) return [];
  const ends = bands.filter((band) => band.upper.at(-1)!.hz === last.hz);
  const expandedDb = ends.at(-1)?.expandedDb ?? null;
  const lowest = Math.min(last.value, ...ends.map((band) => band.lower.at(-1)!.value));
  const u = expandedDb ?? 0;
  const right = Math.min(scale.right, scale.x(last.hz)) - 8;
  return [
    { word: 'over', figure: '', x: right, y: scale.y(last.value + u) - 9, colour: 'fill-madder' },
    expandedDb === null || narrow
      ? null
      : {
          word: 'inconclusive',
          figure: formatUncertainty(expandedDb),
          x: right,
          y: scale.y(last.value) - 8,
          colour: 'fill-ochre',
        },
    { word: 'under', figure: '', x: right, y: scale.y(lowest) + 17, colour: 'fill-kelp' },
  ]
    .filter((zone) => zone !== null)
    .map((zone) => ({ ...zone, widthPx: wordWidthPx(zone.word, 13) + figureWidthPx(zone.figure, 13) + 4 }));
}

function ZoneWords({ words, narrow }: { words: ZoneWord[]; narrow: boolean }) {
  return words.map((zone) => (
    <text
      key={zone.word}
      x={zone.x}
      y={zone.y}
      textAnchor="end"
      fontSize={narrow ? 12.5 : 13}
      strokeWidth="4"
      className={zone.colour}
    >
      {zone.word}
      {zone.figure ? (
        <tspan dx="4" className={FIGURE}>
          {zone.figure}
        </tspan>
      ) : null}
    </text>
  ));
}
