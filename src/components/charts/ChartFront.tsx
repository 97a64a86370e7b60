'use client';

import { memo, useId, useMemo, useSyncExternalStore } from 'react';
import type { CandidateView } from '@/schemas/sweep';
import type { LineUnit } from '@/emc/kinds';
import { candidateMarks, candidateValue } from './candidateMarks';
import { candidateTip, traceTip, tracePoint, windowAt, type Cursor, type Layers } from './chartCursor';
import type { Store } from './chartStore';
import type { ChartSubject } from './chartSubject';
import { CombLayer } from './CombLayer';
import { combTicks } from './combTicks';
import { frequencyTicks } from './frequencyTicks';
import { floorPath, floorsOnce } from './floorPath';
import { limitLabels, type LimitLabel } from './limitLabels';
import { drawnLimits, labelY, LimitLayer, zoneWords, type ZoneWord } from './LimitLayer';
import type { ChartMode } from './marginSeries';
import { MarkLayer } from './MarkLayer';
import { markBox, overlaps, placeLabels, type Box } from './placeLabels';
import { PointTip } from './PointTip';
import { FrequencyNumbers, Ruler } from './Ruler';
import { NARROW_PX, plotScale, type PlotScale, type Frame, type Range, type Span } from './scale';

export interface ChartFrontProps {
  subject: ChartSubject;
  frame: Frame;
  range: Range;
  view: Store<Span>;
  cursor: Store<Cursor>;
  layers: Layers;
  mode: ChartMode;
  unit: LineUnit;
  candidates: readonly CandidateView[];
  selectedRank: number | null;
  clockHz: number | null;
  preview: boolean;
  onSelect?: (candidate: CandidateView) => void;
}

/** Over the traces: ruler, guard band, limits, threads with their squares and numbers, harmonics, numbers. */
export const ChartFront = memo(function ChartFront(props: ChartFrontProps) {
  const { subject, frame, range, view, mode, unit, candidates, selectedRank, clockHz, preview } = props;
  const hatchId = useId();
  const span = useSyncExternalStore(view.subscribe, view.get, view.get);
  const scale = useMemo(() => plotScale(frame, span, range), [frame, span, range]);
  const { labels: frequencyLabels } = frequencyTicks(span, scale.right - scale.left);
  const narrow = preview || frame.width < NARROW_PX;
  const { envelope, bands } = drawnLimits(subject, span, mode);
  const marks = candidateMarks(candidates, span, scale, mode, selectedRank);
  // A zone is known by its place: where squares need the room, its word goes.
  const words = zoneWords({ envelope, bands, scale, narrow }).filter(({ x, y, widthPx }) => {
    const box = textBox(x - widthPx, y, widthPx);
    return !marks.some((mark) => overlaps(box, markBox(mark)));
  });
  const values = valueLabels(props, scale, marks, words);
  const obstacles: Box[] = [
    ...values.map((label) => textBox(label.x, labelY(scale, mode, label), label.widthPx)),
    ...words.map(({ x, y, widthPx }) => textBox(x - widthPx, y, widthPx)),
  ];
  const within = { left: scale.left, right: scale.right + 8, top: scale.top + 1, bottom: scale.bottom };
  const comb =
    clockHz === null
      ? []
      : combTicks(
          clockHz,
          span,
          scale.x,
          candidates.map((c) => c.frequencyHz),
          subject.stepHz,
        );
  const { overview, detail } = props.layers;
  const finest = detail && detail.fromHz <= span.fromHz && detail.toHz >= span.toHz ? detail : overview;
  const floors = useMemo(() => floorsOnce(candidates), [candidates]).flatMap((candidate) => {
    const path = floorPath(candidate, finest, span, scale, mode);
    return path ? [{ key: `${candidate.rank} ${candidate.fromHz}`, path, verdict: candidate.verdict }] : [];
  });
  const tabRank = marks.some(({ id }) => id === selectedRank) ? selectedRank : Math.min(...marks.map(({ id }) => id));
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
      {clockHz === null ? null : <CombLayer ticks={comb} scale={scale} />}
      <FrequencyNumbers labels={frequencyLabels} scale={scale} y={frame.height - 8} />
      <CursorLayer {...props} scale={scale} span={span} />
      <MarkLayer
        marks={marks}
        labels={placeLabels(marks, within, obstacles)}
        floors={floors}
        scale={scale}
        unit={unit}
        selectedRank={selectedRank}
        tabRank={marks.length > 0 ? tabRank : null}
        onFocusMark={(candidate) => candidate.rank !== selectedRank && props.onSelect?.(candidate)}
      />
    </svg>
  );
});

/** Follows the pointer by itself: a hover redraws this layer alone. */
function CursorLayer(props: ChartFrontProps & { scale: ReturnType<typeof plotScale>; span: Span }) {
  const { cursor, candidates, selectedRank, layers, mode, subject, unit, scale, span, frame } = props;
  const over = useSyncExternalStore(cursor.subscribe, cursor.get, cursor.get);
  const rank = over?.kind === 'candidate' ? over.rank : over ? null : selectedRank;
  const candidate = candidates.find((one) => one.rank === rank);
  if (candidate) {
    if (candidate.frequencyHz < span.fromHz || candidate.frequencyHz > span.toHz) return null;
    // On a narrow chart the slip would hide what the selection points at; the line stays.
    const text = over || frame.width >= NARROW_PX ? candidateTip(candidate, subject.orientation, unit) : null;
    const y = scale.y(candidateValue(candidate, mode));
    return <PointTip x={scale.x(candidate.frequencyHz)} y={y + 1} text={text} scale={scale} />;
  }
  const window = over?.kind === 'trace' ? windowAt(layers, over.hz) : null;
  if (over?.kind !== 'trace' || !window) return null;
  const point = tracePoint(window, over.traceIndex, over.hz, mode);
  if (!point || point.hz < span.fromHz || point.hz > span.toHz) return null;
  const x = scale.x(point.hz);
  const y = Math.min(scale.bottom, Math.max(scale.top, scale.y(point.value)));
  return (
    <g aria-hidden="true">
      <PointTip x={x} y={y} text={traceTip(point, subject, unit)} scale={scale} />
      <circle cx={x} cy={y} r="3" className="fill-sheet stroke-pen" strokeWidth="1.4" />
    </g>
  );
}

const textBox = (left: number, baseline: number, width: number): Box => ({
  left,
  right: left + width,
  top: baseline - 10,
  bottom: baseline + 2,
});

/** In the margin chart one text names every limit of a stretch; in the level chart each line carries its own. */
function valueLabels(
  { subject, mode, view }: ChartFrontProps,
  scale: PlotScale,
  marks: ReturnType<typeof candidateMarks>,
  words: ZoneWord[],
): LimitLabel[] {
  const inconclusive = words.find(({ word }) => word === 'inconclusive');
  const named = subject.lines.length > 1;
  const groups = mode === 'margin' ? [subject.lines] : subject.lines.map((line) => [line]);
  return groups.flatMap((lines) => {
    const place = (taken: [number, number][]) => ({
      span: view.get(),
      x: scale.x,
      hz: scale.hz,
      rightPx: inconclusive ? inconclusive.x - inconclusive.widthPx - 8 : scale.right - 4,
      sizePx: 12.5,
      taken,
    });
    // Where the text would stand decides which marks are in its way.
    const drawn = limitLabels(lines, named, place([]));
    const rows = drawn.map((label) => labelY(scale, mode, label));
    const taken = marks
      .filter(({ y }) => rows.some((baseline) => y > baseline - 15 && y < baseline + 6))
      .map(({ x, ringed }): [number, number] => (ringed ? [x - 11, x + 11] : [x - 7, x + 7]));
    return limitLabels(lines, named, place(taken));
  });
}
