import type { MouseEvent, ReactNode } from 'react';
import type { FindingRun } from '@/format/finding';
import { classes } from './classes';

export interface FigureProps {
  /** Formatted by @/format: this file never rounds. */
  value: ReactNode;
  unit?: string;
  strong?: boolean;
  className?: string;
}

/** A number with its unit in mono, so that it reads as one thing. */
export function Figure({ value, unit, strong, className }: FigureProps) {
  return (
    <span className={classes('t-figure', strong && 'font-semibold', className)}>
      {value}
      {unit && ` ${unit}`}
    </span>
  );
}

/** The runs of a finding, or of any sentence with figures in it. */
export function Runs({ runs }: { runs: readonly FindingRun[] }) {
  return runs.map((run, at) =>
    run.figure ? (
      <Figure key={at} value={run.text} strong={run.strong} />
    ) : (
      <span key={at} className={run.remark ? 'text-ochre' : undefined}>
        {run.text}
      </span>
    ),
  );
}

export interface ComputedFigureProps {
  value: string;
  unit?: string;
  /** What it is, for its name: `level 37.4 dBµV/m, show working`. */
  quantity: string;
  /** The unit as it is said, where the cell does not show it. */
  saidUnit?: string;
  open: boolean;
  /** `fromKeyboard` tells whether the working should take the focus. */
  onOpen: (fromKeyboard: boolean) => void;
  /** Id of what it opens. */
  controls?: string;
  strong?: boolean;
  className?: string;
}

/** A figure that opens its working. Open, it is the start of the tie line. */
export function ComputedFigure({
  value,
  unit,
  quantity,
  saidUnit = unit,
  open,
  onOpen,
  controls,
  strong,
  className,
}: ComputedFigureProps) {
  return (
    <button
      type="button"
      className={classes('computed', strong && 'font-semibold', className)}
      aria-label={`${quantity} ${value}${saidUnit ? ` ${saidUnit}` : ''}, show working`}
      aria-expanded={open}
      {...(controls && { 'aria-controls': controls })}
      {...(open && { 'data-tie': 'figure' })}
      onClick={(event: MouseEvent) => onOpen(event.detail === 0)}
    >
      {value}
      {unit && ` ${unit}`}
    </button>
  );
}
