'use client';

import { Sheet } from '@/components/shell/Sheet';
import { SheetHeader } from '@/components/shell/SheetHeader';
import { Button } from '@/components/ui/Button';
import { SectionHeading } from '@/components/ui/SectionHeading';
import { formatBytes } from '@/format/quantities';
import type { SweepFileView } from '@/schemas/sweepFile';
import { FilePreview } from './FilePreview';
import { Recognised } from './Recognised';

/** A file that cannot be read: the line, what stands there, what was expected, and the way on. Nothing is kept. */
export function RefusedSheet({ file, onDiscard }: { file: SweepFileView; onDiscard: () => void }) {
  const refusal = file.recognition.refusal!;
  return (
    <Sheet
      header={
        <SheetHeader
          title="This file was not kept"
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
      margin={[
        { id: 'recognised', title: 'What was recognised', children: <Recognised recognition={file.recognition} /> },
      ]}
      keys={[{ keys: ['U'], does: 'new copy' }]}
    >
      <div className="mt-2 grid gap-6 wide:grid-cols-[minmax(0,540px)_minmax(0,1fr)]">
        <FilePreview recognition={file.recognition} wrongLine={refusal.line} />
        <section>
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
            <li>Export it again from the receiver, as text or CSV with frequency and level, and drop the new copy.</li>
            <li>If the file is what the receiver wrote, keep it and tell the lab’s manager its first lines.</li>
          </ol>
        </section>
      </div>
    </Sheet>
  );
}
