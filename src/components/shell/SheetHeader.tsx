import type { ReactNode } from 'react';
import type { Verdict } from '@/emc/kinds';
import type { FindingRun } from '@/format/finding';
import { Finding } from '@/components/ui/Finding';
import { IdentityLine } from '@/components/ui/IdentityLine';
import { StateTag } from '@/components/ui/StateTag';

export interface SheetHeaderProps {
  title: ReactNode;
  state?: { label: string; planned?: boolean };
  /** Spans and `Id`s: client, job, run, path, time, person. */
  identity?: ReactNode;
  finding?: { verdict: Verdict; runs?: readonly FindingRun[]; children?: ReactNode };
  /** At most two buttons, one of them primary. */
  actions?: ReactNode;
}

/** Each sheet opens with its finding: title and state, identity, one sentence. */
export function SheetHeader({ title, state, identity, finding, actions }: SheetHeaderProps) {
  return (
    <div className="sheet-header">
      <div className="sheet-title">
        <h1 className="t-title">{title}</h1>
        {state && <StateTag label={state.label} planned={state.planned} size="title" />}
      </div>
      {actions && <div className="sheet-actions">{actions}</div>}
      {identity && (
        <div className="sheet-identity">
          <IdentityLine>{identity}</IdentityLine>
        </div>
      )}
      {finding && (
        <div className="sheet-finding">
          <Finding {...finding} />
        </div>
      )}
    </div>
  );
}
