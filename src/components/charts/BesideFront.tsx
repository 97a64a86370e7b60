'use client';

import { memo, useId, useMemo, useSyncExternalStore } from 'react';
import type { ComparedEmission } from '@/schemas/comparison';
import { formatFrequency } from '@/format/frequencies';
import { moveText } from '@/format/comparison';
import { marginText, formatDb } from '@/format/quantities';
import { besideMarks, describeEmission, type BesideMark } from './besideMarks';
import type { Store } from './chartStore';
import type { ChartSubject } from './chartSubject';
import { FIGURE, HALO, VERDICT_MARKS } from './chartText';
import type { BesidePoint } from './compareSeries';
import { limitLabels } from './limitLabels';
import { drawnLimits, labelY, LimitLayer, zoneWords } from './LimitLayer';
import type { ChartMode } from './marginSeries';
import { markBox, overlaps, placeLabels, type Box } from './placeLabels';
import { Ruler } from './Ruler';
import { NARROW_PX, plotScale, type Frame, type PlotScale, type Range, type Span } from './scale';

export interface BesideFrontProps {
  subject: ChartSubject;
  names: { a: string; b: string };
  frame: Frame;
  range: Range;
  view: Store<Span>;
  mode: ChartMode;
  emissions: readonly ComparedEmission[];
  selectedRank: number | null;
  cursor: Store<BesidePoint | null>;
  onSelect: (emission: ComparedEmission) => void;
}

/** Over both traces: ruler, limits, and each emission on a thread from where a has it to where b has it. */
export const BesideFront = memo(function BesideFront(props: BesideFrontProps) {
  const { subject, frame, range, view, mode, emissions, selectedRank, names, cursor, onSelect } = props;
  const hatchId = useId();
  const span = useSyncExternalStore(view.subscribe, view.get, view.get);
  const scale = useMemo(() => plotScale(frame, span, range), [frame, span, range]);
  const narrow = frame.width < NARROW_PX;
  const marks = besideMarks(emissions, span, scale, mode, selectedRank);
  const { envelope, bands } = drawnLimits(subject, span, mode);
  const words = zoneWords({ envelope, bands, scale, narrow }).filter(({ x, y, widthPx }) => {
    const box = textBox(x - widthPx, y, widthPx);
    return !marks.some((mark) => overlaps(box, markBox(mark)));
  });
  const groups = mode === 'margin' ? [subject.lines] : subject.lines.map((line) => [line]);
  const place = { span, x: scale.x, hz: scale.hz, rightPx: scale.right - 4, sizePx: 12.5, taken: [] };
  const values = groups.flatMap((lines) => limitLabels(lines, subject.lines.length > 1, place));
  const obstacles: Box[] = [
    ...values.map((label) => textBox(label.x, labelY(scale, mode, label), label.widthPx)),
    ...words.map(({ x, y, widthPx }) => textBox(x - widthPx, y, widthPx)),
  ];
  const within = { left: scale.left, right: scale.right + 8, top: scale.top + 1, bottom: scale.bottom };
  const tabRank = marks.some(({ id }) => id === selectedRank) ? selectedRank : (marks[0]?.id ?? null);
  return (
    <svg className="absolute inset-0 size-full overflow-visible" focusable="false">
      <Ruler scale={scale} span={span} />
      <LimitLayer
        subject={subject}
        span={span}
        scale={scale}
        mode={mode}
        hatchId={hatchId}
        labels={values}
        words={words}
        narrow={narrow}
      />
      <path
        aria-hidden="true"
        d={`M${scale.left} ${scale.bottom}H${scale.right}`}
        className="stroke-ink3"
        strokeWidth="1.5"
      />
      <CursorTip cursor={cursor} names={names} mode={mode} scale={scale} span={span} />
      {[...marks]
        .sort((one, other) => other.id - one.id)
        .map((mark) => (
          <Emission
            key={mark.id}
            mark={mark}
            says={describeEmission(mark.emission, names)}
            pressed={mark.id === selectedRank}
            inTabs={mark.id === tabRank}
            onFocus={() => mark.id !== selectedRank && onSelect(mark.emission)}
          />
        ))}
      <g aria-hidden="true" fontSize="12.5" fontWeight="600" strokeWidth="5" className="pointer-events-none">
        {placeLabels(marks, within, obstacles).map((label) => (
          <text
            key={label.id}
            x={label.x}
            y={Math.min(label.y, scale.bottom - 2)}
            textAnchor="middle"
            fill="currentColor"
            className={`${FIGURE} ${HALO} ${colourOf(marks.find(({ id }) => id === label.id)!)}`}
          >
            {label.id}
          </text>
        ))}
      </g>
    </svg>
  );
});

const textBox = (left: number, baseline: number, width: number): Box => ({
  left,
  right: left + width,
  top: baseline - 10,
  bottom: baseline + 2,
});

/** Where no verdict is made of a level, its square is drawn as what is not decided and not covered. */
const lookOf = ({ verdict }: BesideMark) => VERDICT_MARKS[verdict ?? 'not-covered'];
const colourOf = (mark: BesideMark) => lookOf(mark).colour;

interface EmissionProps {
  mark: BesideMark;
  says: string;
  pressed: boolean;
  inTabs: boolean;
  onFocus: () => void;
}

function Emission({ mark, says, pressed, inTabs, onFocus }: EmissionProps) {
  const { x, y, fromY, ringed, id } = mark;
  const { colour, solid } = lookOf(mark);
  return (
    <>
      {fromY !== null && (
        <g aria-hidden="true" className={colour} stroke="currentColor" fill="none">
          <path d={`M${x} ${fromY}V${y}`} strokeWidth="1.4" />
          <path d={`M${x - 4} ${fromY}h8`} strokeWidth="1.6" />
        </g>
      )}
      <g
        role="button"
        tabIndex={inTabs ? 0 : -1}
        data-rank={id}
        aria-label={says}
        aria-pressed={pressed}
        onFocus={onFocus}
        className={`group cursor-pointer outline-none ${colour}`}
      >
        <rect x={x - 9} y={y - 9} width="18" height="18" fill="transparent" />
        {solid ? (
          <rect x={x - 4} y={y - 4} width="8" height="8" fill="currentColor" />
        ) : (
          <rect
            x={x - 3}
            y={y - 3}
            width="6"
            height="6"
            stroke="currentColor"
            strokeWidth="1.7"
            className="fill-sheet"
          />
        )}
        <rect
          x={x - 9}
          y={y - 9}
          width="18"
          height="18"
          fill="none"
          strokeWidth={ringed ? 1.6 : 0}
          className="stroke-pen group-focus-visible:[stroke-width:2.2px]"
        />
      </g>
    </>
  );
}

const TIP = { width: 178, height: 62 };

/** Follows the pointer by itself: what both runs read there, and how far apart they are. */
function CursorTip(props: {
  cursor: Store<BesidePoint | null>;
  names: { a: string; b: string };
  mode: ChartMode;
  scale: PlotScale;
  span: Span;
}) {
  const { cursor, names, mode, scale, span } = props;
  const point = useSyncExternalStore(cursor.subscribe, cursor.get, cursor.get);
  if (!point || point.hz < span.fromHz || point.hz > span.toHz) return null;
  const x = scale.x(point.hz);
  const left = x + 9 + TIP.width <= scale.right ? x + 9 : x - 9 - TIP.width;
  const top = scale.bottom - TIP.height - 6;
  const move = point.differenceDb === null ? null : moveText(point.differenceDb);
  return (
    <g aria-hidden="true" className="pointer-events-none">
      <path d={`M${x} ${scale.top}V${scale.bottom}`} className="stroke-pen" strokeWidth="1.3" strokeDasharray="2 3" />
      <g transform={`translate(${left} ${top})`} fontSize="12">
        <rect width={TIP.width} height={TIP.height} className="fill-sheet stroke-pen" strokeWidth="1.2" />
        <text x="8" y="18" fontWeight="600" className={`fill-ink ${FIGURE}`}>
          {formatFrequency(point.hz)}
        </text>
        <text x={TIP.width - 8} y="18" textAnchor="end" fontWeight="600" className={`fill-ink ${FIGURE}`}>
          {move && `${move.figure} ${move.word}`}
        </text>
        {(['b', 'a'] as const).map((side, row) => (
          <g key={side}>
            <text x="8" y={36 + row * 18} className="fill-ink2">
              {shortened(names[side])}
            </text>
            <text x={TIP.width - 8} y={36 + row * 18} textAnchor="end" className={`fill-ink ${FIGURE}`}>
              {readout(point[side], mode)}
            </text>
          </g>
        ))}
      </g>
    </g>
  );
}

const shortened = (name: string) => (name.length > 14 ? `${name.slice(0, 13)}…` : name);

export function readout(side: BesidePoint['a'], mode: ChartMode): string {
  if (!side) return 'not read';
  if (mode === 'level') return formatDb(side.level);
  if (side.marginDb === null) return 'no limit';
  const { figure, word } = marginText(side.marginDb);
  return `${figure} ${word}`;
}
