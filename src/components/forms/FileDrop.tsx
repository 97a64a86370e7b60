'use client';

import { useEffect, useRef, useState, type ReactNode } from 'react';
import { Button } from '@/components/ui/Button';
import { Message } from '@/components/ui/Message';
import { formatBytes } from '@/format/quantities';
import type { SweepFileView } from '@/schemas/sweepFile';
import { ProblemMessage } from './ProblemMessage';
import type { Problem } from './problem';
import { send } from './send';

interface Props {
  /** `Drop a factor table anywhere on this sheet` */
  heading: string;
  children: ReactNode;
  /** Larger ones are not sent. */
  mostBytes: number;
  onFile: (file: SweepFileView) => void;
}

const HOLD = { method: 'POST', path: '/api/sweep-files' } as const;

/** One small file, dropped anywhere or chosen; it is held on the server and recognised there. */
export function FileDrop({ heading, children, mostBytes, onFile }: Props) {
  const input = useRef<HTMLInputElement>(null);
  const [sending, setSending] = useState<string | null>(null);
  const [problem, setProblem] = useState<Problem | null>(null);
  const [note, setNote] = useState<string | null>(null);
  const [over, setOver] = useState(false);

  async function take(files: FileList | null | undefined) {
    const file = files?.[0];
    if (!file || sending !== null) return;
    setProblem(null);
    setNote(
      files.length > 1
        ? `${files.length} files were dropped. ${file.name} is read now; drop the next one after it.`
        : null,
    );
    if (file.size > mostBytes) {
      setNote(`${file.name} has ${formatBytes(file.size)}; at most ${formatBytes(mostBytes)} are read here.`);
      return;
    }
    setSending(file.name);
    const form = new FormData();
    form.append('file', file);
    const outcome = await send<SweepFileView>(HOLD, form, {});
    setSending(null);
    if (outcome.ok) onFile(outcome.reply);
    else setProblem(outcome.problem);
  }

  const latest = useRef(take);
  useEffect(() => {
    latest.current = take;
  });
  useEffect(() => {
    const stop = new AbortController();
    const listen = { signal: stop.signal };
    const carriesFiles = (event: DragEvent) => {
      if (!event.dataTransfer?.types.includes('Files')) return false;
      event.preventDefault();
      return true;
    };
    window.addEventListener('dragover', (event) => carriesFiles(event) && setOver(true), listen);
    window.addEventListener('dragleave', (event) => !event.relatedTarget && setOver(false), listen);
    window.addEventListener(
      'drop',
      (event) => {
        if (!carriesFiles(event)) return;
        setOver(false);
        void latest.current(event.dataTransfer?.files);
      },
      listen,
    );
    return () => stop.abort();
  }, []);

  return (
    <>
      {problem && <ProblemMessage problem={problem} />}
      {note && <Message tone="inconclusive" lead={note} live="polite" />}
      <div
        className={`mt-4 max-w-[640px] border border-dashed px-5 py-5 ${over ? 'border-pen bg-penw' : 'border-edge bg-margin'}`}
      >
        <h2 className="t-section">{heading}</h2>
        <div className="t-text mt-1 text-ink2">{children}</div>
        <div className="mt-4 flex flex-wrap items-center gap-3">
          <Button kind="primary" keyName="U" busy={sending !== null} onClick={() => input.current?.click()}>
            Choose a file
          </Button>
          {sending !== null && (
            <span className="t-detail" role="status">
              Reading {sending}
            </span>
          )}
        </div>
        <input
          ref={input}
          type="file"
          className="sr-only"
          tabIndex={-1}
          aria-label={heading}
          accept=".csv,.txt,.dat,.tsv,.asc,.s2p,text/*"
          onChange={(event) => {
            void take(event.target.files);
            event.target.value = '';
          }}
        />
      </div>
    </>
  );
}
