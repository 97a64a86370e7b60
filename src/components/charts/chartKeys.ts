import type { KeyboardEvent } from 'react';
import type { CandidateView } from '@/schemas/sweep';
import { neighbour } from './candidateMarks';
import { stepAlong, tracePoint, windowAt, type Cursor, type Layers, type TracePoint } from './chartCursor';
import type { Store } from './chartStore';
import { leadingTrace, type ChartSubject } from './chartSubject';
import type { ChartMode } from './marginSeries';
import type { Span } from './scale';
import { bringIn, zoomAt } from './viewport';

const KEY_ZOOM = 1.6;
const POINTS_PER_STEP = 10;

interface Keyed {
  view: Store<Span>;
  whole: Span;
  cursor: Store<Cursor>;
  candidates: readonly CandidateView[];
  selected: CandidateView | null;
  layers: Layers;
  mode: ChartMode;
  subject: ChartSubject;
  focusMark: (candidate: CandidateView) => void;
  say: (point: TracePoint) => void;
  onMode?: (mode: ChartMode) => void;
  onCombKey?: () => void;
  onWorking?: (candidate: CandidateView) => void;
}

/** The keys of a focused chart (design, section 8). What is not one of them is left to the shell. */
export function pressChartKey(chart: Keyed, event: KeyboardEvent): void {
  const { view, whole, cursor, selected, mode, onMode, onWorking } = chart;
  if (event.ctrlKey || event.metaKey || event.altKey) return;
  const zoom = (factor: number) => view.set(zoomAt(view.get(), whole, cursorHz(chart), factor));
  const acts: Record<string, (() => void) | undefined> = {
    ArrowLeft: () => (event.shiftKey ? alongTrace(chart, -1) : toCandidate(chart, -1)),
    ArrowRight: () => (event.shiftKey ? alongTrace(chart, 1) : toCandidate(chart, 1)),
    '+': () => zoom(KEY_ZOOM),
    '=': () => zoom(KEY_ZOOM),
    '-': () => zoom(1 / KEY_ZOOM),
    '0': () => view.set(whole),
    l: onMode && (() => onMode(mode === 'margin' ? 'level' : 'margin')),
    c: chart.onCombKey,
    w: selected && onWorking ? () => onWorking(selected) : undefined,
    Enter: selected && onWorking ? () => onWorking(selected) : undefined,
    Escape: cursor.get() ? () => cursor.set(null) : undefined,
  };
  const act = acts[event.key.length === 1 ? event.key.toLowerCase() : event.key];
  if (!act) return;
  event.preventDefault();
  event.stopPropagation();
  act();
}

/** Where the keyboard is: on the trace, else on the selected candidate if it is in view, else in the middle. */
function cursorHz({ cursor, view, selected }: Keyed): number {
  const at = cursor.get();
  if (at?.kind === 'trace') return at.hz;
  const span = view.get();
  const hz = selected?.frequencyHz;
  return hz !== undefined && hz >= span.fromHz && hz <= span.toHz ? hz : Math.sqrt(span.fromHz * span.toHz);
}

function alongTrace(chart: Keyed, direction: 1 | -1): void {
  const { cursor, view, whole, layers, subject, selected, mode } = chart;
  const at = cursor.get();
  const index = at?.kind === 'trace' ? at.traceIndex : (selected?.traceIndex ?? leadingTrace(subject.traces));
  const here = cursorHz(chart);
  const source = windowAt(layers, here);
  if (!source || index === null) return;
  const hz = stepAlong(source, index, here, direction * POINTS_PER_STEP, subject.stepHz);
  // A step past the finer window goes on in the overview.
  const point = tracePoint(windowAt(layers, hz) ?? source, index, hz, mode);
  if (!point) return;
  view.set(bringIn(view.get(), whole, point.hz));
  cursor.set({ kind: 'trace', traceIndex: index, hz: point.hz });
  chart.say(point);
}

function toCandidate(chart: Keyed, direction: 1 | -1): void {
  const { cursor, candidates, selected } = chart;
  const rank = cursor.get()?.kind === 'trace' ? null : (selected?.rank ?? null);
  const next = neighbour(candidates, { hz: cursorHz(chart), rank }, direction);
  if (!next) return;
  cursor.set(null);
  chart.focusMark(next);
}
