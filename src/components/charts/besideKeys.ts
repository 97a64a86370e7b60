import type { KeyboardEvent } from 'react';
import type { ComparedEmission } from '@/schemas/comparison';
import { nextEmission } from './besideMarks';
import type { Store } from './chartStore';
import type { BesidePoint } from './compareSeries';
import type { ChartMode } from './marginSeries';
import type { Span } from './scale';
import { bringIn, zoomAt } from './viewport';

const KEY_ZOOM = 1.6;
const POINTS_PER_STEP = 10;
/** Where the axis is uneven a step is this share of what is shown. */
const SHARE = 1 / 100;

interface Keyed {
  view: Store<Span>;
  whole: Span;
  cursor: Store<BesidePoint | null>;
  emissions: readonly ComparedEmission[];
  selectedRank: number | null;
  mode: ChartMode;
  onMode: (mode: ChartMode) => void;
  focusMark: (emission: ComparedEmission) => void;
  pointAt: (hz: number) => BesidePoint | null;
  say: (point: BesidePoint) => void;
  stepHz: number | null;
}

/** The keys of a chart (design, section 8) for two runs. What is not one of them is left to the shell. */
export function besideKeys(chart: Keyed, event: KeyboardEvent): void {
  const { view, whole, cursor, mode, onMode } = chart;
  if (event.ctrlKey || event.metaKey || event.altKey) return;
  const zoom = (factor: number) => view.set(zoomAt(view.get(), whole, cursorHz(chart), factor));
  const acts: Record<string, (() => void) | undefined> = {
    ArrowLeft: () => (event.shiftKey ? along(chart, -1) : toEmission(chart, -1)),
    ArrowRight: () => (event.shiftKey ? along(chart, 1) : toEmission(chart, 1)),
    '+': () => zoom(KEY_ZOOM),
    '=': () => zoom(KEY_ZOOM),
    '-': () => zoom(1 / KEY_ZOOM),
    '0': () => view.set(whole),
    l: () => onMode(mode === 'margin' ? 'level' : 'margin'),
    Escape: cursor.get() ? () => cursor.set(null) : undefined,
  };
  const act = acts[event.key.length === 1 ? event.key.toLowerCase() : event.key];
  if (!act) return;
  event.preventDefault();
  event.stopPropagation();
  act();
}

function cursorHz({ cursor, view, emissions, selectedRank }: Keyed): number {
  const at = cursor.get();
  if (at) return at.hz;
  const span = view.get();
  const hz = emissions.find(({ rank }) => rank === selectedRank)?.frequencyHz;
  return hz !== undefined && hz >= span.fromHz && hz <= span.toHz ? hz : Math.sqrt(span.fromHz * span.toHz);
}

function along(chart: Keyed, direction: 1 | -1): void {
  const { cursor, view, whole, pointAt, say, stepHz } = chart;
  const here = cursorHz(chart);
  const span = view.get();
  const byShare = here * (span.toHz / span.fromHz) ** (direction * SHARE);
  const byPoints = stepHz === null ? byShare : here + direction * POINTS_PER_STEP * stepHz;
  const point = pointAt(Math.min(whole.toHz, Math.max(whole.fromHz, byPoints)));
  if (!point) return;
  view.set(bringIn(span, whole, point.hz));
  cursor.set(point);
  say(point);
}

function toEmission(chart: Keyed, direction: 1 | -1): void {
  const { cursor, emissions, selectedRank } = chart;
  const next = nextEmission(emissions, { hz: cursorHz(chart), rank: cursor.get() ? null : selectedRank }, direction);
  if (!next) return;
  cursor.set(null);
  chart.focusMark(next);
}
