'use client';

import type { ReactNode } from 'react';
import { Sheet } from '@/components/shell/Sheet';
import { SheetHeader } from '@/components/shell/SheetHeader';
import { Button } from '@/components/ui/Button';
import { SectionHeading } from '@/components/ui/SectionHeading';
import { formatBytes } from '@/format/quantities';

interface Props {
  /** `a limit line` */
  what: string;
  file: { name: string; bytes: number };
  refusal: { line: number | null; found: string; expected: string; message: string };
  ways: readonly string[];
  onDiscard: () => void;
  /** The file's lines. */
  children: ReactNode;
}

/** A file that cannot be entered: the line, what was found and expected, and the ways on, the cheapest first. */
export function RefusedFile({ what, file, refusal, ways, onDiscard, children }: Props) {
  return (
    <Sheet
      header={
        <SheetHeader
          title={`This file is not ${what}`}
          identity={
            <>
              <span className="t-id">{file.name}</span>
              <span>{formatBytes(file.bytes)}</span>
            </>
          }
          finding={{ verdict: 'over', children: refusal.message }}
          actions={
            <Button kind="primary" keyName="U" onClick={onDiscard}>
              Drop a new copy
            </Button>
          }
        />
      }
    >
      <div className="mt-2 grid gap-6 wide:grid-cols-[minmax(0,540px)_minmax(0,1fr)]">
        <div className="min-w-0">{children}</div>
        <section aria-label="What stands there">
          <SectionHeading>What stands there</SectionHeading>
          <dl className="t-text mt-2 grid grid-cols-[88px_minmax(0,1fr)] gap-y-1">
            {refusal.line !== null && (
              <>
                <dt className="text-ink2">Line</dt>
                <dd className="t-figure">{refusal.line}</dd>
              </>
            )}
            <dt className="text-ink2">Found</dt>
            <dd className="[overflow-wrap:anywhere]">{refusal.found}</dd>
            <dt className="text-ink2">Expected</dt>
            <dd>{refusal.expected}</dd>
          </dl>
          <SectionHeading className="mt-5">What to do</SectionHeading>
          <ol className="t-text mt-2 list-decimal pl-5">
            {ways.map((way) => (
              <li key={way}>{way}</li>
            ))}
          </ol>
          <p className="t-detail mt-3">Nothing was entered.</p>
        </section>
      </div>
    </Sheet>
  );
}
