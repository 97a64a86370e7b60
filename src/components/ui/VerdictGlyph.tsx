import type { Verdict } from '@/emc/kinds';
import { VERDICT_WORDS } from '@/format/words';
import { classes } from './classes';

export interface VerdictGlyphProps {
  verdict: Verdict;
  /** 16 in rows, 20 in findings. */
  size?: 16 | 20;
  /** Where no word follows, the glyph says its own: `true` for the verdict's word, or a text of your own. */
  label?: boolean | string;
  /** Takes the colour of the text around it instead of the verdict's. */
  plain?: boolean;
  className?: string;
}

/** Position, fill and colour of a verdict on a 16 × 16 grid: under the line, across it, above it. */
export function VerdictGlyph({ verdict, size = 16, label, plain, className }: VerdictGlyphProps) {
  const name = label === true ? VERDICT_WORDS[verdict] : label || undefined;
  return (
    <svg
      className={classes('glyph', plain ? 'glyph-plain' : `glyph-${verdict}`, className)}
      width={size}
      height={size}
      viewBox="0 0 16 16"
      {...(name ? { role: 'img', 'aria-label': name } : { 'aria-hidden': true })}
    >
      <VerdictMarks verdict={verdict} />
    </svg>
  );
}

/** The marks alone, for a chart that places them itself; they draw in `currentColor`. */
export function VerdictMarks({ verdict }: { verdict: Verdict }) {
  switch (verdict) {
    case 'under':
      return (
        <>
          <path d="M1 8h14" stroke="currentColor" strokeWidth="1.5" />
          <rect x="5.25" y="9.75" width="5.5" height="5.5" fill="currentColor" />
        </>
      );
    case 'inconclusive':
      return (
        <>
          <path d="M1 8h3.5M11.5 8H15" stroke="currentColor" strokeWidth="1.5" />
          <rect x="5.25" y="5.25" width="5.5" height="5.5" fill="none" stroke="currentColor" strokeWidth="1.5" />
        </>
      );
    case 'over':
      return (
        <>
          <path d="M1 8h14" stroke="currentColor" strokeWidth="1.5" />
          <rect x="5.25" y="0.75" width="5.5" height="5.5" fill="currentColor" />
        </>
      );
    case 'needs-final':
      return (
        <>
          <path d="M1 8h14" stroke="currentColor" strokeWidth="1.5" />
          <rect x="5.25" y="0.75" width="5.5" height="5.5" fill="none" stroke="currentColor" strokeWidth="1.5" />
        </>
      );
    case 'not-covered':
      return <path d="M1 8h14" stroke="currentColor" strokeWidth="1.5" strokeDasharray="2 2" />;
  }
}
