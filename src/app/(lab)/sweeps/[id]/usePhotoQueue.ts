'use client';

import { useCallback, useEffect, useRef, useState } from 'react';
import { waitingFor, type Problem } from '@/components/forms/problem';
import { sendFile } from '@/components/forms/sendFile';
import type { PhotoView } from '@/schemas/setup';
import { SETUP_WRITES } from './setUpWrites';

export interface Chosen {
  /** Names it here, and is its Idempotency-Key: however often it is sent, it is kept once. */
  key: string;
  file: File;
  /** A blob address of the picture on this device. */
  preview: string;
  caption: string;
  state: 'chosen' | 'sending' | 'failed';
  share: number;
  problem: Problem | null;
}

/** Photographs chosen on this device, sent one after another, each with its own progress and its own repeat. */
export function usePhotoQueue(sweepId: string, onKept: (photo: PhotoView) => void) {
  const [queue, setQueue] = useState<readonly Chosen[]>([]);
  const [busy, setBusy] = useState(false);
  const stop = useRef<AbortController>(null);
  const held = useRef<readonly Chosen[]>([]);

  useEffect(() => {
    held.current = queue;
  }, [queue]);
  useEffect(
    () => () => {
      stop.current?.abort();
      for (const { preview } of held.current) URL.revokeObjectURL(preview);
    },
    [],
  );

  const change = useCallback((key: string, more: Partial<Chosen>) => {
    setQueue((before) => before.map((item) => (item.key === key ? { ...item, ...more } : item)));
  }, []);
  const choose = useCallback((files: FileList | null) => {
    const more = [...(files ?? [])].map((file) => ({
      key: crypto.randomUUID(),
      file,
      preview: URL.createObjectURL(file),
      caption: '',
      state: 'chosen' as const,
      share: 0,
      problem: null,
    }));
    setQueue((before) => [...before, ...more]);
  }, []);
  const remove = useCallback((key: string) => {
    setQueue((before) => {
      const gone = before.find((item) => item.key === key);
      if (gone) URL.revokeObjectURL(gone.preview);
      return before.filter((item) => item.key !== key);
    });
  }, []);

  async function sendAll() {
    if (busy) return;
    setBusy(true);
    const stopping = new AbortController();
    stop.current = stopping;
    // One at a time: a slow line carries one well and three badly.
    for (const { key, file, caption } of queue) {
      if (stopping.signal.aborted) break;
      change(key, { state: 'sending', share: 0, problem: null });
      const form = new FormData();
      // Fields come before the file, so that they are known when it has been read.
      form.set('caption', caption);
      form.set('file', file);
      const answer = await sendFile<PhotoView>(SETUP_WRITES.addPhoto, form, {
        params: { id: sweepId },
        idempotencyKey: key,
        signal: stopping.signal,
        onShare: (share) => change(key, { share, problem: null }),
        onWait: (problem) => change(key, { problem: waitingFor(problem) }),
      });
      if (answer.ok) {
        remove(key);
        onKept(answer.reply);
      } else change(key, { state: stopping.signal.aborted ? 'chosen' : 'failed', problem: answer.problem });
    }
    setBusy(false);
  }

  return { queue, busy, choose, change, remove, sendAll, halt: () => stop.current?.abort() };
}
