import type { ReactNode } from 'react';
import type { Verdict } from '@/emc/kinds';
import type { FindingRun } from '@/format/finding';
import { Runs } from './Figure';
import { VerdictGlyph } from './VerdictGlyph';

/** The sentence a sheet opens with: a glyph, figures and units. Give it `runs` from @/format/finding, or children. */
export function Finding({
  verdict,
  runs,
  children,
}: {
  verdict: Verdict;
  runs?: readonly FindingRun[];
  children?: ReactNode;
}) {
  return (
    <p className="finding">
      <VerdictGlyph verdict={verdict} size={20} />
      <span>{runs ? <Runs runs={runs} /> : children}</span>
    </p>
  );
}
