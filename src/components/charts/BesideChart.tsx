'use client';

import dynamic from 'next/dynamic';
import { useCallback, useEffect, useId, useMemo, useRef, useState } from 'react';
import type { LineUnit } from '@/emc/kinds';
import type { ComparedEmission } from '@/schemas/comparison';
import { formatFrequency } from '@/format/frequencies';
import { formatMove } from '@/format/comparison';
import { unitLabel } from '@/format/quantities';
import { besideKeys } from './besideKeys';
import { besideMarks, sightingValue } from './besideMarks';
import { BesideFront, readout } from './BesideFront';
import { ChartBack } from './ChartBack';
import { createStore } from './chartStore';
import { holesOf, type ChartSubject } from './chartSubject';
import { FORCED } from './chartText';
import { differenceOfPair, pointBeside, traceOf, type Beside, type BesidePoint, type ShownPair } from './compareSeries';
import { DifferenceStrip } from './DifferenceStrip';
import { columnValues, traceSeries, type ChartMode } from './marginSeries';
import { levelRange, marginRange, NARROW_LEFT_PX, NARROW_PX, plotScale, wholeSpan, type Range } from './scale';
import { useBoxSize } from './useBoxSize';
import { useChartGestures } from './useChartGestures';
import { useChartView } from './useChartView';
import { bringIn, sameSpan } from './viewport';

const loadCanvas = () => import('./TraceCanvas');
const TraceCanvas = dynamic(loadCanvas, { ssr: false });
if (typeof window !== 'undefined') void loadCanvas();

/** The margin chart's frame without its lower part, and under it the strip with the frequency numbers. */
const PLOT = { height: 286, left: 58, right: 10, top: 30, bottom: 8 };
const STRIP = { height: 112, left: 58, right: 10, top: 8, bottom: 26 };

interface Props {
  /** Of each run; limits and guard band are b's. */
  subjects: { a: ChartSubject; b: ChartSubject };
  names: { a: string; b: string };
  /** The first covers all that either run covers and stays as overview. */
  beside: Beside;
  /** null where no trace of one can be laid over one of the other. */
  pair: ShownPair | null;
  unit: LineUnit;
  emissions: readonly ComparedEmission[];
  mode: ChartMode;
  onMode: (mode: ChartMode) => void;
  selectedRank: number | null;
  onSelect: (emission: ComparedEmission) => void;
  onWindow: (fromHz: number, toHz: number, columns: number) => void;
  /** The finding, which says of the chart what it shows. */
  sentence: string;
  tableId: string;
}

/** Two runs over each other: b in ink, a behind it in thin dashes, and their difference on a strip below. */
export function BesideChart(props: Props) {
  const { subjects, names, beside, pair, emissions, mode, onMode, selectedRank, onSelect, onWindow } = props;
  const id = useId();
  const box = useRef<HTMLDivElement>(null);
  const { width } = useBoxSize(box, { width: 990, height: PLOT.height + STRIP.height });
  const [frame, strip] = useMemo(() => {
    const left = width < NARROW_PX ? NARROW_LEFT_PX + 6 : PLOT.left;
    return [
      { ...PLOT, width, left },
      { ...STRIP, width, left },
    ];
  }, [width]);

  const { fromHz, toHz } = beside;
  const [overview] = useState(beside);
  const whole = useMemo(() => wholeSpan(overview.fromHz, overview.toHz), [overview]);
  const detail = sameSpan({ fromHz, toHz }, overview) ? null : beside;
  const { view, changeView } = useChartView(whole, frame, onWindow);
  const [cursor] = useState(() => createStore<BesidePoint | null>(null));
  const [spoken, setSpoken] = useState('');

  const traces = useMemo(
    () =>
      (['b', 'a'] as const).map((side, index) => ({
        index,
        leading: side === 'b',
        dashed: side === 'a',
        points: traceSeries(
          traceOf(overview, side, pair),
          traceOf(detail, side, pair),
          detail,
          mode,
          holesOf(subjects[side]),
        ),
      })),
    [overview, detail, pair, mode, subjects],
  );
  const range = useMemo(
    () => rangeOf(overview, pair, emissions, subjects.b, mode),
    [overview, pair, emissions, subjects, mode],
  );
  const scale = useCallback(() => plotScale(frame, view.get(), range), [frame, view, range]);
  const finest = (hz: number) => (detail && hz >= detail.fromHz && hz <= detail.toHz ? detail : overview);
  const pointAt = (hz: number) => pair && pointBeside(finest(hz), pair, hz, mode);

  const focusMark = (emission: ComparedEmission) => {
    view.set(bringIn(view.get(), whole, emission.frequencyHz));
    requestAnimationFrame(() => box.current?.querySelector<SVGElement>(`[data-rank="${emission.rank}"]`)?.focus());
  };
  useChartGestures(box, {
    view,
    whole,
    scale,
    changeView,
    hover: (point) => cursor.set(point ? pointAt(scale().hz(point.x)) : null),
    pick: (point, reachPx) => {
      const [nearest] = besideMarks(emissions, view.get(), scale(), mode, selectedRank)
        .map((mark) => ({ mark, far: Math.hypot(mark.x - point.x, mark.y - point.y) }))
        .filter(({ far }) => far <= reachPx)
        .sort((one, other) => one.far - other.far || one.mark.id - other.mark.id);
      if (nearest) return focusMark(nearest.mark.emission);
      box.current?.focus({ preventScroll: true });
      cursor.set(pointAt(scale().hz(point.x)));
    },
    combTicks: () => [],
    tuneClock: null,
  });
  const selectedHz = emissions.find(({ rank }) => rank === selectedRank)?.frequencyHz ?? null;
  // A row picked in the table comes into view.
  useEffect(() => {
    if (selectedHz !== null) view.set(bringIn(view.get(), whole, selectedHz));
  }, [selectedHz, view, whole]);

  const say = (point: BesidePoint) =>
    setSpoken(
      [
        formatFrequency(point.hz),
        `${names.b} ${readout(point.b, mode)}`,
        `${names.a} ${readout(point.a, mode)}`,
        point.differenceDb === null ? 'no difference' : formatMove(point.differenceDb),
      ].join(', '),
    );
  const onKeyDown = (event: React.KeyboardEvent) =>
    besideKeys(
      {
        ...{ view, whole, cursor, emissions, selectedRank, mode, onMode, focusMark, pointAt, say },
        stepHz: Math.max(subjects.a.stepHz ?? 0, subjects.b.stepHz ?? 0) || null,
      },
      event,
    );

  return (
    <div
      ref={box}
      role="group"
      aria-roledescription="chart"
      aria-label={mode === 'margin' ? 'Margin chart of both runs' : 'Level chart of both runs'}
      aria-describedby={`${id}-sentence`}
      aria-details={props.tableId}
      aria-keyshortcuts="ArrowLeft ArrowRight + - 0 L"
      tabIndex={emissions.length > 0 ? -1 : 0}
      onKeyDown={onKeyDown}
      className={`relative touch-pan-y select-none max-pad:-mx-4 ${FORCED}`}
    >
      <p id={`${id}-sentence`} className="sr-only">
        {props.sentence}
      </p>
      <div className="relative h-[286px]">
        <ChartBack subject={subjects.b} frame={frame} range={range} view={view} mode={mode} />
        <div className="absolute inset-0">
          <TraceCanvas frame={frame} range={range} view={view} traces={traces} />
        </div>
        <BesideFront
          subject={subjects.b}
          names={names}
          frame={frame}
          range={range}
          view={view}
          mode={mode}
          emissions={emissions}
          selectedRank={selectedRank}
          cursor={cursor}
          onSelect={onSelect}
        />
      </div>
      <div className="relative h-[112px]">
        <DifferenceStrip
          overview={differenceOfPair(overview, pair)}
          detail={differenceOfPair(detail, pair)}
          detailSpan={detail}
          frame={strip}
          view={view}
        />
      </div>
      <p className="t-detail max-pad:px-4">
        Below: {names.b} less {names.a}, dB, per stretch{mode === 'level' ? `; above: ${unitLabel(props.unit)}` : ''}
      </p>
      <p aria-live="polite" className="sr-only">
        {spoken}
      </p>
    </div>
  );
}

function rangeOf(
  overview: Beside,
  pair: ShownPair | null,
  emissions: readonly ComparedEmission[],
  subject: ChartSubject,
  mode: ChartMode,
): Range {
  const values = emissions.flatMap(({ a, b }) => [sightingValue(a, mode) ?? [], sightingValue(b, mode) ?? []].flat());
  let [high, low] = [Math.max(...values), Math.min(...values)];
  for (const side of ['a', 'b'] as const) {
    const trace = traceOf(overview, side, pair);
    for (let i = 0; i < (trace?.frequencyHz.length ?? 0); i++) {
      const column = columnValues(trace!, i, mode);
      if (!column) continue;
      high = Math.max(high, column.high);
      low = Math.min(low, column.low);
    }
  }
  const limits = subject.lines.flatMap(({ segments }) => segments.flatMap((one) => [one.startLimit, one.stopLimit]));
  if (mode === 'level') high = Math.max(high, ...limits);
  const known = (value: number) => (Number.isFinite(value) ? value : null);
  return mode === 'margin' ? marginRange(known(high), known(low)) : levelRange(known(high), known(low));
}
