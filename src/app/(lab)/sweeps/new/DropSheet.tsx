'use client';

import { useEffect, useRef, useState } from 'react';
import { ProblemMessage } from '@/components/forms/ProblemMessage';
import { problemOf, UNREACHABLE, type Problem } from '@/components/forms/problem';
import { Sheet } from '@/components/shell/Sheet';
import { SheetHeader } from '@/components/shell/SheetHeader';
import { Button } from '@/components/ui/Button';
import { Message } from '@/components/ui/Message';
import { formatBytes } from '@/format/quantities';
import type { SweepFileView } from '@/schemas/sweepFile';

const MAX_BYTES = 100 * 1024 * 1024;

type Sending = { name: string; bytes: number; share: number };

/** Sends a file with its progress; resolves to what was recognised, or to the problem. */
function send(
  file: File,
  onShare: (share: number) => void,
): { done: Promise<SweepFileView | Problem>; stop: () => void } {
  const request = new XMLHttpRequest();
  const done = new Promise<SweepFileView | Problem>((resolve) => {
    request.open('POST', '/api/sweep-files');
    request.upload.onprogress = (event) => onShare(event.total > 0 ? event.loaded / event.total : 0);
    request.onerror = () => resolve(UNREACHABLE);
    request.onload = () => {
      if (request.status === 201) return resolve(JSON.parse(request.responseText) as SweepFileView);
      resolve(problemOf(request.status, request.getResponseHeader('content-type'), request.responseText));
    };
    const form = new FormData();
    form.append('file', file);
    request.send(form);
  });
  return { done, stop: () => request.abort() };
}

/** Where a file is dropped or chosen. The whole sheet takes a drop. */
export function DropSheet({ onFile }: { onFile: (file: SweepFileView) => void }) {
  const input = useRef<HTMLInputElement>(null);
  const [sending, setSending] = useState<Sending | null>(null);
  const [problem, setProblem] = useState<Problem | null>(null);
  const [note, setNote] = useState<string | null>(null);
  const [over, setOver] = useState(false);
  const stop = useRef<(() => void) | null>(null);

  async function take(files: FileList | null | undefined) {
    const file = files?.[0];
    if (!file || stop.current) return;
    setProblem(null);
    setNote(
      files.length > 1
        ? `${files.length} files were dropped. ${file.name} is read now; drop the next one after it.`
        : null,
    );
    if (file.size > MAX_BYTES) {
      setNote(
        `${file.name} has ${formatBytes(file.size)}; a sweep file takes at most 100 MB. Export a shorter range or fewer traces.`,
      );
      return;
    }
    setSending({ name: file.name, bytes: file.size, share: 0 });
    const way = send(file, (share) => setSending((now) => now && { ...now, share }));
    stop.current = way.stop;
    const answer = await way.done;
    stop.current = null;
    setSending(null);
    if ('recognition' in answer) onFile(answer);
    else setProblem(answer);
  }

  const latest = useRef(take);
  useEffect(() => {
    latest.current = take;
  });
  useEffect(() => {
    const hasFiles = (event: DragEvent) => event.dataTransfer?.types.includes('Files') ?? false;
    const hover = (event: DragEvent) => {
      if (!hasFiles(event)) return;
      event.preventDefault();
      setOver(true);
    };
    const leave = (event: DragEvent) => {
      if (!event.relatedTarget) setOver(false);
    };
    const drop = (event: DragEvent) => {
      if (!hasFiles(event)) return;
      event.preventDefault();
      setOver(false);
      void latest.current(event.dataTransfer?.files);
    };
    window.addEventListener('dragover', hover);
    window.addEventListener('dragleave', leave);
    window.addEventListener('drop', drop);
    return () => {
      window.removeEventListener('dragover', hover);
      window.removeEventListener('dragleave', leave);
      window.removeEventListener('drop', drop);
      stop.current?.();
    };
  }, []);

  return (
    <Sheet
      header={
        <SheetHeader
          title="Upload a sweep file"
          finding={{ verdict: 'not-covered', children: 'Nothing is read yet. The original is kept as it was sent.' }}
        />
      }
    >
      {problem && <ProblemMessage problem={problem} />}
      {note && <Message tone="inconclusive" lead={note} live="polite" />}
      <div
        className={`mt-4 flex min-h-[236px] max-w-[640px] flex-col items-start border border-dashed px-5 py-5 ${over ? 'border-pen bg-penw' : 'border-edge bg-margin'}`}
      >
        <svg viewBox="0 0 264 56" className="w-full max-w-[420px]" aria-hidden>
          <path d="M0 8h264" className="stroke-ink" strokeWidth="2" />
          <path d="M132 8v26" className="stroke-pen" strokeWidth="1.4" />
          <rect x="128" y="32" width="8" height="8" className="fill-pen" />
          <path
            d="M0 49c8-3 10 2 18 0s10-3 18 0 12 2 20-1 12 3 20 1 12-3 20 0 12 1 20-1 12 3 20 1 12-3 20 0 12 2 20-1 12 2 20 0 12-2 20 1 12-1 20 0 10 2 28-1"
            fill="none"
            className="stroke-ink3"
          />
        </svg>
        <h2 className="t-section mt-4">Drop a sweep file anywhere on this sheet</h2>
        <p className="t-text mt-1 text-ink2">
          Text or CSV from any receiver or analyser, up to 100 MB. What the file does not say is asked before anything
          is kept.
        </p>
        <div className="mt-4 flex flex-wrap items-center gap-3">
          <Button kind="primary" keyName="U" busy={sending !== null} onClick={() => input.current?.click()}>
            Choose a file
          </Button>
          {sending && (
            <>
              <span className="t-detail" role="status">
                {sending.share < 1 ? 'Sending' : 'Reading'} {sending.name}, {formatBytes(sending.bytes)}
              </span>
              <progress
                className="h-1.5 w-40 accent-pen"
                max={1}
                value={sending.share < 1 ? sending.share : undefined}
              />
              <Button
                kind="quiet"
                onClick={() => {
                  stop.current?.();
                  stop.current = null;
                  setSending(null);
                }}
              >
                Stop
              </Button>
            </>
          )}
        </div>
        <input
          ref={input}
          type="file"
          className="sr-only"
          tabIndex={-1}
          aria-label="Sweep file"
          accept=".csv,.txt,.dat,.tsv,.asc,.s2p,text/*"
          onChange={(event) => {
            void take(event.target.files);
            event.target.value = '';
          }}
        />
      </div>
    </Sheet>
  );
}
