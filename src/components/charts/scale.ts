/** The stretch of frequency a chart shows. The x axis is linear in log f. */
export interface Span {
  fromHz: number;
  toHz: number;
}

/** Values at the upper and the lower edge of the plot, in dB or in the unit of the level. */
export interface Range {
  top: number;
  bottom: number;
}

export interface Frame {
  width: number;
  height: number;
  left: number;
  right: number;
  top: number;
  bottom: number;
}

/** Insets of the sweep sheet's chart: ruler above, harmonics and frequency numbers below. */
export const SHEET_INSETS = { left: 46, right: 10, top: 30, bottom: 46 } as const;
/** On a phone the chart runs to the screen's edge, and the axis words have to fit inside the inset. */
export const NARROW_PX = 560;
export const NARROW_LEFT_PX = 50;
/** Without harmonics the frequency numbers come up to the plot. */
export const PREVIEW_INSETS = { left: 46, right: 10, top: 30, bottom: 26 } as const;

export interface PlotScale {
  left: number;
  right: number;
  top: number;
  bottom: number;
  x: (hz: number) => number;
  hz: (x: number) => number;
  y: (value: number) => number;
  value: (y: number) => number;
}

/** Both axes of one frame, in CSS pixels from the frame's upper left corner. */
export function plotScale(frame: Frame, span: Span, range: Range): PlotScale {
  const left = frame.left;
  const right = Math.max(left + 1, frame.width - frame.right);
  const top = frame.top;
  const bottom = Math.max(top + 1, frame.height - frame.bottom);
  const octaves = Math.log(span.toHz / span.fromHz);
  const perValue = (bottom - top) / (range.top - range.bottom);
  return {
    left,
    right,
    top,
    bottom,
    x: (hz) => left + (Math.log(hz / span.fromHz) / octaves) * (right - left),
    hz: (x) => span.fromHz * Math.exp(((x - left) / (right - left)) * octaves),
    y: (value) => top + (range.top - value) * perValue,
    value: (y) => range.top - (y - top) / perValue,
  };
}

/** CISPR 16-1-1 frequency bands. */
export const CISPR_BANDS = [
  { name: 'A', fromHz: 9e3, toHz: 150e3, text: '9–150 kHz' },
  { name: 'B', fromHz: 150e3, toHz: 30e6, text: '0.15–30 MHz' },
  { name: 'C', fromHz: 30e6, toHz: 300e6, text: '30–300 MHz' },
  { name: 'D', fromHz: 300e6, toHz: 1e9, text: '300–1000 MHz' },
  { name: 'E', fromHz: 1e9, toHz: 18e9, text: 'above 1 GHz' },
] as const;

/** Bands that are visible in the span, cut to it. */
export function bandsIn(span: Span): { name: string; text: string; fromHz: number; toHz: number }[] {
  return CISPR_BANDS.filter((band) => band.fromHz < span.toHz && band.toHz > span.fromHz).map((band) => ({
    name: band.name,
    text: band.text,
    fromHz: Math.max(band.fromHz, span.fromHz),
    toHz: Math.min(band.toHz, span.toHz),
  }));
}

/** The whole range of a run: its ends, moved out to a band edge that is within 2 %. */
export function wholeSpan(firstHz: number, lastHz: number): Span {
  const edges = CISPR_BANDS.flatMap((band) => [band.fromHz, band.toHz]);
  const fromHz = edges.find((edge) => edge <= firstHz && firstHz / edge < 1.02) ?? firstHz;
  const toHz = edges.find((edge) => edge >= lastHz && edge / lastHz < 1.02) ?? lastHz;
  return toHz > fromHz ? { fromHz, toHz } : { fromHz: firstHz / 1.01, toHz: firstHz * 1.01 };
}

/** dB over the limit at the plot's edges: +12 to −38, growing by 10 to fit; below −98 the trace is cut off. */
export function marginRange(highestDb: number | null, lowestDb: number | null): Range {
  let top = 12;
  let bottom = -38;
  while (highestDb !== null && highestDb > top - 1) top += 10;
  while (lowestDb !== null && lowestDb < bottom && bottom > -98) bottom -= 10;
  return { top, bottom };
}

/** Level at the plot's edges: room for a label over the highest mark or limit, at least 58 dB in all. */
export function levelRange(highest: number | null, lowest: number | null): Range {
  const top = Math.ceil(((highest ?? 50) + 8) / 10) * 10;
  let bottom = top - 58;
  while (lowest !== null && lowest < bottom && bottom > top - 118) bottom -= 10;
  return { top, bottom };
}

/** Multiples of 10 dB inside the range, of 20 where the plot is too low for them. */
export function valueTicks(range: Range, heightPx: number): number[] {
  const step = (heightPx / (range.top - range.bottom)) * 10 < 18 ? 20 : 10;
  const ticks: number[] = [];
  for (let value = Math.ceil(range.bottom / step) * step; value <= range.top; value += step) ticks.push(value + 0);
  return ticks;
}
