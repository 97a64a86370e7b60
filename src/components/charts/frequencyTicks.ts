import { formatTrimmed } from '@/format/quantities';
import { plotScale, type Span } from './scale';
import { figureWidthPx } from './textWidth';

const SIZE_PX = 12;
const GAP_PX = 12;

export interface FrequencyLabel {
  hz: number;
  text: string;
  anchor: 'start' | 'middle' | 'end';
}

/** Multiples of a decade worth a grid line, the weightiest first. */
function mantissas(pxPerDecade: number): number[] {
  if (pxPerDecade < 150) return [1, 3];
  if (pxPerDecade < 300) return [1, 2, 5, 3];
  return [1, 2, 5, 3, 1.5, 4, 6, 8];
}

function niceStep(atLeast: number): number {
  const decade = 10 ** Math.floor(Math.log10(atLeast));
  return decade * ([1, 2, 5].find((factor) => factor * decade >= atLeast) ?? 10);
}

function unitOf(span: Span): { name: string; hz: number } {
  if (span.toHz <= 1e6) return { name: 'kHz', hz: 1e3 };
  if (span.fromHz >= 1e9) return { name: 'GHz', hz: 1e9 };
  return { name: 'MHz', hz: 1e6 };
}

/** Decimals that tell two pixels of this span apart, no more. */
function edgeText(hz: number, unitHz: number, span: Span, widthPx: number): string {
  const perPixel = ((span.toHz - span.fromHz) / widthPx / unitHz) * 2;
  const decimals = Math.max(0, Math.min(6, Math.ceil(-Math.log10(perPixel))));
  return formatTrimmed(hz / unitHz, decimals);
}

/**
 * Grid frequencies, and which of them carry a number: the two ends first (the right one with the unit), then by
 * weight, each only where 12 px stay free on both sides.
 */
export function frequencyTicks(span: Span, widthPx: number): { gridHz: number[]; labels: FrequencyLabel[] } {
  const scale = plotScale({ width: widthPx, height: 1, left: 0, right: 0, top: 0, bottom: 0 }, span, {
    top: 1,
    bottom: 0,
  });
  const unit = unitOf(span);
  const gridHz: number[] = [];
  if (span.toHz / span.fromHz >= 3) {
    const pxPerDecade = widthPx / Math.log10(span.toHz / span.fromHz);
    for (const mantissa of mantissas(pxPerDecade)) {
      for (let d = Math.floor(Math.log10(span.fromHz)); 10 ** d <= span.toHz; d++) {
        const hz = Number((mantissa * 10 ** d).toPrecision(6));
        if (hz > span.fromHz && hz < span.toHz) gridHz.push(hz);
      }
    }
  } else {
    const step = niceStep(((span.toHz - span.fromHz) / widthPx) * 76);
    for (let n = Math.ceil(span.fromHz / step); n * step < span.toHz; n++) gridHz.push(n * step);
  }

  const endText = `${edgeText(span.toHz, unit.hz, span, widthPx)} ${unit.name}`;
  const startText = edgeText(span.fromHz, unit.hz, span, widthPx);
  const labels: FrequencyLabel[] = [
    { hz: span.fromHz, text: startText, anchor: 'start' },
    { hz: span.toHz, text: endText, anchor: 'end' },
  ];
  const taken: [number, number][] = [
    [0, figureWidthPx(startText, SIZE_PX)],
    [widthPx - figureWidthPx(endText, SIZE_PX), widthPx],
  ];
  for (const hz of gridHz) {
    const text = edgeText(hz, unit.hz, span, widthPx);
    const half = figureWidthPx(text, SIZE_PX) / 2;
    const x = scale.x(hz);
    if (taken.some(([from, to]) => x - half - GAP_PX < to && x + half + GAP_PX > from)) continue;
    taken.push([x - half, x + half]);
    labels.push({ hz, text, anchor: 'middle' });
  }
  return { gridHz: gridHz.sort((a, b) => a - b), labels: labels.sort((a, b) => a.hz - b.hz) };
}

/** A gap is divided finely only where the ticks stay well apart. */
const DIVISIONS = [
  { parts: 10, atLeastPx: 8 },
  { parts: 5, atLeastPx: 4 },
  { parts: 2, atLeastPx: 4 },
];

/** Ticks of the ruler: whole multiples of each decade are tall; each gap is divided by 10, 5 or 2 as far as there is room. */
export function rulerTicks(span: Span, widthPx: number): { hz: number; tall: boolean }[] {
  const ticks: { hz: number; tall: boolean }[] = [];
  const x = (hz: number) => (Math.log(hz / span.fromHz) / Math.log(span.toHz / span.fromHz)) * widthPx;
  const divide = (fromHz: number, toHz: number, deep: number) => {
    if (toHz <= span.fromHz || fromHz >= span.toHz) return;
    // The upper end of a division is the narrowest on a log axis.
    const parts = DIVISIONS.find(
      (division) => x(toHz) - x(toHz - (toHz - fromHz) / division.parts) >= division.atLeastPx,
    )?.parts;
    if (parts === undefined) return;
    const step = (toHz - fromHz) / parts;
    for (let i = 0; i < parts; i++) {
      const at = fromHz + i * step;
      if (i > 0 && at >= span.fromHz && at <= span.toHz) ticks.push({ hz: at, tall: deep > 0 });
      if (parts === 10 && deep < 4) divide(at, at + step, deep - 1);
    }
  };
  for (let d = Math.floor(Math.log10(span.fromHz)); 10 ** d <= span.toHz; d++) {
    for (let m = 1; m < 10; m++) {
      const hz = m * 10 ** d;
      if (hz >= span.fromHz && hz <= span.toHz) ticks.push({ hz, tall: true });
      divide(hz, (m + 1) * 10 ** d, 0);
    }
  }
  return ticks.sort((a, b) => a.hz - b.hz);
}
