import type { ReactNode } from 'react';

/** Client, job, run, path, time, person: one line, apart by 18 px, nothing between. */
export function IdentityLine({ children }: { children: ReactNode }) {
  return <div className="identity">{children}</div>;
}

/** An identifier in mono: HL-2611, R-07, P-3. */
export function Id({ children }: { children: ReactNode }) {
  return <span className="t-id">{children}</span>;
}
