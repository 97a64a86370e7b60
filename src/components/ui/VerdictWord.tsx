import type { ReactNode } from 'react';
import type { Verdict } from '@/emc/kinds';
import { VERDICT_WORDS } from '@/format/words';
import { classes } from './classes';
import { VerdictGlyph } from './VerdictGlyph';

/** The glyph with its word, in the verdict's colour. `children` replaces the word, as in `in date`. */
export function VerdictWord({
  verdict,
  children,
  className,
}: {
  verdict: Verdict;
  children?: ReactNode;
  className?: string;
}) {
  return (
    <span className={classes('verdict', `verdict-${verdict}`, className)}>
      <VerdictGlyph verdict={verdict} />
      <span>{children ?? VERDICT_WORDS[verdict]}</span>
    </span>
  );
}
