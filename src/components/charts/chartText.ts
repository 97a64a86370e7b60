import type { Verdict } from '@/emc/kinds';

/** Figures in a chart: the mono, drawn as one thing with their unit. */
export const FIGURE = 'font-mono tracking-[-0.02em] [word-spacing:-0.22em]';

/** A sheet-coloured edge around a text, so that it reads over the trace. */
export const HALO = 'stroke-sheet [paint-order:stroke] [stroke-linejoin:round]';

/** Colour and fill of a verdict's square: solid is decided, open is not. */
export const VERDICT_MARKS: Record<Verdict, { colour: string; solid: boolean }> = {
  over: { colour: 'text-madder', solid: true },
  'needs-final': { colour: 'text-pen', solid: false },
  inconclusive: { colour: 'text-ochre', solid: false },
  'not-covered': { colour: 'text-ink3', solid: false },
  under: { colour: 'text-kelp', solid: true },
};

/** In forced colours the drawing takes the system's: position, fill and word still carry the verdict. */
export const FORCED = [
  'forced-colors:[--ink:CanvasText]',
  'forced-colors:[--ink2:CanvasText]',
  'forced-colors:[--ink3:CanvasText]',
  'forced-colors:[--kelp:CanvasText]',
  'forced-colors:[--ochre:CanvasText]',
  'forced-colors:[--madder:CanvasText]',
  'forced-colors:[--pen:Highlight]',
  'forced-colors:[--sheet:Canvas]',
  'forced-colors:[--madderw:Canvas]',
  'forced-colors:[--rule:GrayText]',
  'forced-colors:[--rule2:GrayText]',
  'forced-colors:[--edge:GrayText]',
].join(' ');
