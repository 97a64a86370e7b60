import type { ReactNode } from 'react';
import { classes } from './classes';
import { VerdictGlyph } from './VerdictGlyph';

export interface MessageProps {
  /** The same positions as a verdict: under is done, inconclusive waits for a person, over is a refusal. */
  tone: 'under' | 'inconclusive' | 'over';
  /** The bold first clause: the thing and the number. */
  lead?: ReactNode;
  /** What follows from it. */
  children?: ReactNode;
  /** Read out when it appears; only lost work is `assertive`. */
  live?: 'polite' | 'assertive';
  className?: string;
}

export function Message({ tone, lead, children, live, className }: MessageProps) {
  return (
    <div
      className={classes('message', `message-${tone}`, className)}
      {...(live && { role: live === 'assertive' ? 'alert' : 'status' })}
    >
      <VerdictGlyph verdict={tone} />
      <div className="message-body">
        {lead && <strong>{lead}</strong>}
        {lead && children ? ' ' : null}
        {children}
      </div>
    </div>
  );
}
