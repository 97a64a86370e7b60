'use client';

import { useEffect, useMemo, useRef } from 'react';
import {
  Chart as ChartJS,
  Filler,
  LinearScale,
  LineController,
  LineElement,
  LogarithmicScale,
  PointElement,
  type ChartData,
  type ChartOptions,
} from 'chart.js';
import { Chart } from 'react-chartjs-2';
import type { Store } from './chartStore';
import type { DrawnPoint } from './marginSeries';
import { useRoomColours } from './roomColours';
import type { Frame, Range, Span } from './scale';

ChartJS.register(LineController, LineElement, PointElement, LinearScale, LogarithmicScale, Filler);

/** Hidden axes would measure the text of their ticks in every frame all the same. */
const noTicks = (axis: { ticks: unknown[] }) => {
  axis.ticks = [];
};

export interface DrawnTrace {
  index: number;
  leading: boolean;
  /** Drawn in dashes whatever its place: the run another is laid over. */
  dashed?: boolean;
  points: DrawnPoint[];
}

/**
 * The traces alone: Chart.js draws on canvas, its axes hidden and its padding fixed to the frame's insets, so that the
 * SVG layers share its coordinates. A change of the span redraws the canvas without React.
 */
export default function TraceCanvas(props: { frame: Frame; range: Range; view: Store<Span>; traces: DrawnTrace[] }) {
  const { frame, range, view, traces } = props;
  const chart = useRef<ChartJS<'line', DrawnPoint[]>>(undefined);
  const { ink, ink3, fill } = useRoomColours();

  const data = useMemo<ChartData<'line', DrawnPoint[]>>(
    () => ({
      // Chart.js draws the last dataset first.
      datasets: [...traces]
        .sort((a, b) => Number(b.leading) - Number(a.leading))
        .map((trace, order) => ({
          label: String(trace.index),
          data: trace.points,
          borderColor: trace.leading ? ink : ink3,
          borderWidth: trace.leading ? 1 : 0.9,
          borderDash: trace.dashed || order > 1 ? [4, 3] : [],
          backgroundColor: fill,
          fill: trace.leading ? 'start' : false,
        })),
    }),
    [traces, ink, ink3, fill],
  );

  const { left, right, top, bottom } = frame;
  const options = useMemo<ChartOptions<'line'>>(
    () => ({
      animation: false,
      parsing: false,
      normalized: true,
      responsive: true,
      maintainAspectRatio: false,
      events: [],
      layout: { autoPadding: false, padding: { left, right, top, bottom } },
      elements: { point: { radius: 0, hitRadius: 0, hoverRadius: 0 }, line: { tension: 0, borderJoinStyle: 'round' } },
      scales: {
        x: {
          type: 'logarithmic',
          display: false,
          min: view.get().fromHz,
          max: view.get().toHz,
          afterBuildTicks: noTicks,
        },
        y: { type: 'linear', display: false, min: range.bottom, max: range.top, afterBuildTicks: noTicks },
      },
    }),
    [left, right, top, bottom, range.bottom, range.top, view],
  );

  useEffect(
    () =>
      view.subscribe(() => {
        const x = chart.current?.options.scales?.x;
        if (!chart.current || !x) return;
        x.min = view.get().fromHz;
        x.max = view.get().toHz;
        chart.current.update('none');
      }),
    [view],
  );

  return (
    <Chart type="line" ref={chart} data={data} options={options} updateMode="none" role="presentation" aria-hidden />
  );
}
