'use client';

import dynamic from 'next/dynamic';
import { useCallback, useEffect, useId, useMemo, useRef, useState, type ReactNode } from 'react';
import type { CandidateView, WindowView } from '@/schemas/sweep';
import { candidateMarks, candidateValue } from './candidateMarks';
import { ChartBack } from './ChartBack';
import { nearestTrace, spokenPoint, traceTip, windowAt, type Cursor } from './chartCursor';
import { ChartFront } from './ChartFront';
import { pressChartKey } from './chartKeys';
import { createStore } from './chartStore';
import { holesOf, leadingTrace, type ChartSubject } from './chartSubject';
import { FORCED } from './chartText';
import { combTicks } from './combTicks';
import { describeChart } from './describeChart';
import { seriesExtremes, traceSeries, type ChartMode } from './marginSeries';
import {
  levelRange,
  marginRange,
  NARROW_LEFT_PX,
  NARROW_PX,
  plotScale,
  PREVIEW_INSETS,
  SHEET_INSETS,
  wholeSpan,
} from './scale';
import { useBoxSize } from './useBoxSize';
import { useChartGestures } from './useChartGestures';
import { useChartView } from './useChartView';
import { bringIn, sameSpan } from './viewport';

const loadCanvas = () => import('./TraceCanvas');
const TraceCanvas = dynamic(loadCanvas, { ssr: false });
// Fetched while the page hydrates, not after it.
if (typeof window !== 'undefined') void loadCanvas();

export interface SweepChartProps {
  /** Key the chart by run, so that another run starts at its whole range. */
  subject: ChartSubject;
  /** The first window covers the whole range and stays as overview; null draws limit, guard band and ruler alone. */
  window: WindowView | null;
  /** Worst first. */
  candidates: readonly CandidateView[];
  /** All there are, when only some are loaded. */
  total?: number;
  mode: ChartMode;
  onMode?: (mode: ChartMode) => void;
  selectedRank?: number | null;
  onSelect?: (candidate: CandidateView) => void;
  /** Enter or W on a candidate. */
  onWorking?: (candidate: CandidateView) => void;
  /** Asks for a finer window; debounced, padded by a third on both sides. */
  onWindow?: (fromHz: number, toHz: number, columns: number) => void;
  /** Draws harmonics of this frequency along the lower edge. */
  clockHz?: number | null;
  /** A harmonic was dragged. */
  onClock?: (clockHz: number) => void;
  /** The C key. */
  onCombKey?: () => void;
  /** Id of the table that is the chart's text form. */
  tableId?: string;
  /** Small and still, for the upload sheet. */
  preview?: boolean;
  /** With `window` null: a bold line that says what to do, and a text. */
  children?: ReactNode;
}

/** The margin chart and the level chart of one run, in one frame. */
export function SweepChart(props: SweepChartProps) {
  const { subject, window: shown, candidates, mode, onMode, onSelect, onWorking, onWindow, onClock, onCombKey } = props;
  const { selectedRank = null, clockHz = null, preview = false, total = candidates.length } = props;
  const id = useId();
  const box = useRef<HTMLDivElement>(null);
  const size = useBoxSize(box, { width: 990, height: preview ? 256 : 316 });
  const frame = useMemo(() => {
    const insets = preview ? PREVIEW_INSETS : SHEET_INSETS;
    return { ...size, ...insets, left: size.width < NARROW_PX ? NARROW_LEFT_PX : insets.left };
  }, [size, preview]);

  const whole = useMemo(() => wholeSpan(subject.firstHz, subject.lastHz), [subject.firstHz, subject.lastHz]);
  const { view, changeView } = useChartView(whole, frame, onWindow);
  const [cursor] = useState(() => createStore<Cursor>(null));
  const [spoken, setSpoken] = useState('');

  const [overview, setOverview] = useState(shown);
  if (shown && shown !== overview && (!overview || sameSpan(shown, overview))) setOverview(shown);
  const detail = shown && overview && !sameSpan(shown, overview) ? shown : null;

  const layers = useMemo(() => ({ overview, detail }), [overview, detail]);

  const range = useMemo(() => {
    const drawn = seriesExtremes(overview, mode);
    const marks = candidates.map((candidate) => candidateValue(candidate, mode));
    const limits = subject.lines.flatMap((line) => line.segments.flatMap((part) => [part.startLimit, part.stopLimit]));
    const highest = [...marks, ...(drawn ? [drawn.high] : []), ...(mode === 'level' ? limits : [])];
    const lowest = [...marks, ...(drawn ? [drawn.low] : [])];
    const high = highest.length > 0 ? Math.max(...highest) : null;
    const low = lowest.length > 0 ? Math.min(...lowest) : null;
    return mode === 'margin' ? marginRange(high, low) : levelRange(high, low);
  }, [overview, candidates, mode, subject.lines]);

  const traces = useMemo(() => {
    const leading = leadingTrace(subject.traces);
    const holes = holesOf(subject);
    const of = (window: WindowView | null, index: number) =>
      window?.traces.find((trace) => trace.index === index) ?? null;
    return subject.traces.map(({ index }) => ({
      index,
      leading: index === leading,
      points: traceSeries(of(overview, index), of(detail, index), detail, mode, holes),
    }));
  }, [subject, overview, detail, mode]);

  const unit = subject.lines[0]?.unit ?? 'dBuV';
  const scale = useCallback(() => plotScale(frame, view.get(), range), [frame, view, range]);

  const marksNow = () => candidateMarks(candidates, view.get(), scale(), mode, selectedRank);
  const markAt = (point: { x: number; y: number }, reachPx: number) =>
    marksNow()
      .map((mark) => ({ mark, far: Math.hypot(mark.x - point.x, mark.y - point.y) }))
      .filter(({ far }) => far <= reachPx)
      .sort((a, b) => a.far - b.far || a.mark.id - b.mark.id)[0]?.mark ?? null;
  const traceAt = (point: { x: number; y: number }): Cursor => {
    const plot = scale();
    if (point.x < plot.left || point.x > plot.right || point.y < plot.top || point.y > plot.bottom) return null;
    const hz = plot.hz(point.x);
    const source = windowAt(layers, hz);
    const found = source ? nearestTrace(source, hz, plot.value(point.y), mode) : null;
    return found ? { kind: 'trace', traceIndex: found.traceIndex, hz: found.hz } : null;
  };

  const focusMark = (candidate: CandidateView) => {
    const inView = bringIn(view.get(), whole, candidate.frequencyHz);
    view.set(inView);
    requestAnimationFrame(() => box.current?.querySelector<SVGElement>(`[data-rank="${candidate.rank}"]`)?.focus());
  };

  useChartGestures(
    box,
    preview
      ? null
      : {
          view,
          whole,
          scale,
          changeView,
          hover: (point) => {
            if (!point) return cursor.set(null);
            const mark = markAt(point, 9);
            cursor.set(mark ? { kind: 'candidate', rank: mark.id } : traceAt(point));
          },
          pick: (point, reachPx) => {
            const mark = markAt(point, reachPx);
            if (mark) focusMark(mark.candidate);
            else {
              box.current?.focus({ preventScroll: true });
              cursor.set(traceAt(point));
            }
          },
          combTicks: () =>
            clockHz === null
              ? []
              : combTicks(
                  clockHz,
                  view.get(),
                  scale().x,
                  candidates.map((c) => c.frequencyHz),
                  subject.stepHz,
                ),
          tuneClock: clockHz !== null && onClock ? onClock : null,
        },
  );

  const selected = candidates.find(({ rank }) => rank === selectedRank) ?? null;
  const selectedHz = selected?.frequencyHz ?? null;
  // A row picked in the table comes into view.
  useEffect(() => {
    if (selectedHz !== null) view.set(bringIn(view.get(), whole, selectedHz));
  }, [selectedHz, view, whole]);

  const onKeyDown = (event: React.KeyboardEvent) =>
    pressChartKey(
      {
        ...{
          view,
          whole,
          cursor,
          candidates,
          selected,
          layers,
          mode,
          subject,
          focusMark,
          onMode,
          onCombKey,
          onWorking,
        },
        say: (point) => setSpoken(spokenPoint(traceTip(point, subject, unit))),
      },
      event,
    );

  const sentence = describeChart(mode, whole, subject.limitName, candidates, total, overview !== null);
  const drawing = (
    <>
      <ChartBack subject={subject} frame={frame} range={range} view={view} mode={mode} />
      {overview ? (
        <div className="absolute inset-0">
          <TraceCanvas frame={frame} range={range} view={view} traces={traces} />
        </div>
      ) : null}
      <ChartFront
        subject={subject}
        frame={frame}
        range={range}
        view={view}
        cursor={cursor}
        layers={layers}
        mode={mode}
        unit={unit}
        candidates={candidates}
        selectedRank={selectedRank}
        clockHz={clockHz}
        preview={preview}
        onSelect={onSelect}
      />
    </>
  );
  if (preview)
    return (
      <div ref={box} role="img" aria-label={sentence} className={`relative h-[256px] ${FORCED}`}>
        {drawing}
      </div>
    );
  return (
    <div
      ref={box}
      role="group"
      aria-roledescription="chart"
      aria-label={mode === 'margin' ? 'Margin chart' : 'Level chart'}
      aria-describedby={`${id}-sentence`}
      aria-details={props.tableId}
      aria-keyshortcuts="ArrowLeft ArrowRight + - 0 L C"
      tabIndex={candidates.length > 0 ? -1 : 0}
      onKeyDown={onKeyDown}
      className={`relative h-[316px] touch-pan-y select-none max-pad:-mx-4 max-pad:h-[262px] ${FORCED}`}
    >
      <p id={`${id}-sentence`} className="sr-only">
        {sentence}
      </p>
      {drawing}
      {overview === null && props.children ? (
        <div className="absolute inset-x-0 bottom-16 mx-auto w-[min(430px,calc(100%-112px))] bg-sheet px-4 py-2.5">
          {props.children}
        </div>
      ) : null}
      <p aria-live="polite" className="sr-only">
        {spoken}
      </p>
    </div>
  );
}
