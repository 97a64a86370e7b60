import type { ReactNode } from 'react';
import Link from 'next/link';

/** Keyset paging goes onward or back to the beginning; there is no page number to be wrong. */
export function Pager({
  firstHref,
  nextHref,
  children,
}: {
  /** null on the first page. */
  firstHref: string | null;
  /** null at the end. */
  nextHref: string | null;
  /** What is shown: `50 runs, newest first`. */
  children?: ReactNode;
}) {
  if (!firstHref && !nextHref && !children) return null;
  return (
    <nav className="pager" aria-label="Pages">
      {children && <span className="pager-shown">{children}</span>}
      {firstHref && (
        <Link className="pager-link" href={firstHref}>
          First
        </Link>
      )}
      {nextHref && (
        <Link className="pager-link" href={nextHref} rel="next">
          Next
        </Link>
      )}
    </nav>
  );
}
