import type { Span } from './scale';

/** A span is never narrower than this ratio: about 10 px per point at the finest sweeps. */
const NARROWEST = 1.0004;

/** Moves a span back inside the whole range, keeping its width in log f where that fits. */
export function clampSpan(span: Span, whole: Span): Span {
  const ratio = Math.min(Math.max(span.toHz / span.fromHz, NARROWEST), whole.toHz / whole.fromHz);
  const middle = Math.sqrt(span.fromHz * span.toHz);
  let fromHz = middle / Math.sqrt(ratio);
  if (fromHz * ratio > whole.toHz) fromHz = whole.toHz / ratio;
  if (fromHz < whole.fromHz) fromHz = whole.fromHz;
  return { fromHz, toHz: Math.min(fromHz * ratio, whole.toHz) };
}

/** Zooms by a factor (over 1 is closer), keeping the frequency under the cursor where it is. */
export function zoomAt(span: Span, whole: Span, aroundHz: number, factor: number): Span {
  const power = 1 / factor;
  return clampSpan(
    {
      fromHz: aroundHz * (span.fromHz / aroundHz) ** power,
      toHz: aroundHz * (span.toHz / aroundHz) ** power,
    },
    whole,
  );
}

/** Moves the span by a share of its own width; positive looks higher. */
export function panBy(span: Span, whole: Span, share: number): Span {
  const by = (span.toHz / span.fromHz) ** share;
  return clampSpan({ fromHz: span.fromHz * by, toHz: span.toHz * by }, whole);
}

/** Two fingers: the frequencies that were under them stay under them. `at` are shares of the width, 0 left, 1 right. */
export function pinch(whole: Span, held: [number, number], at: [number, number]): Span {
  const [lowHz, highHz] = held[0] < held[1] ? held : [held[1], held[0]];
  const [low, high] = at[0] < at[1] ? at : [at[1], at[0]];
  const octaves = Math.log(highHz / lowHz) / Math.max(high - low, 0.01);
  const fromHz = lowHz * Math.exp(-low * octaves);
  return clampSpan({ fromHz, toHz: fromHz * Math.exp(octaves) }, whole);
}

/** The span centred on a frequency when it is outside, else unchanged. */
export function bringIn(span: Span, whole: Span, hz: number): Span {
  if (hz >= span.fromHz && hz <= span.toHz) return span;
  const half = Math.sqrt(span.toHz / span.fromHz);
  return clampSpan({ fromHz: hz / half, toHz: hz * half }, whole);
}

/** What to ask the server for: the view with a third of its width on both sides, so that a small pan needs no answer. */
export function padded(span: Span, whole: Span): Span {
  const by = (span.toHz / span.fromHz) ** (1 / 3);
  return { fromHz: Math.max(whole.fromHz, span.fromHz / by), toHz: Math.min(whole.toHz, span.toHz * by) };
}

export function sameSpan(a: Span, b: Span): boolean {
  return Math.abs(a.fromHz / b.fromHz - 1) < 1e-9 && Math.abs(a.toHz / b.toHz - 1) < 1e-9;
}
