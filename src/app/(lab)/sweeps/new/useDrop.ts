'use client';

import { useRouter, useSearchParams } from 'next/navigation';
import { useCallback, useEffect, useRef, useState } from 'react';
import type { SweepFileView } from '@/schemas/sweepFile';
import { takeCarried } from '../droppedFiles';
import { draftFrom, withSweep } from './draft';
import type { Draft } from './draftTypes';
import { addressOf, goTo, here, openHere } from './dropAddress';
import { entryFor, isReady, MAX_BYTES, standingOf, tooLarge, type DropEntry } from './dropEntry';
import { forget, recalled, remember } from './dropMemory';
import { keepEntry } from './keepEntry';
import { sameAsLast } from './sameAsLast';
import type { UploadLists } from './uploadLists';
import { UploadQueue } from './uploadQueue';

/** An address names them all. */
export const MOST_FILES = 60;

/**
 * The files of a drop, each on its own: sent, recognised, answered, kept. The address names those that the lab holds, so
 * that reload, back and forward show them; what was said of them stays in the tab.
 */
export function useDrop(held: readonly SweepFileView[], lists: UploadLists, stateId: string | null) {
  const router = useRouter();
  const search = useSearchParams();
  const named = search.getAll('file');
  const fresh = (file: SweepFileView, key = file.id): DropEntry => ({
    ...entryFor(file.name, file.bytes),
    key,
    file,
    draft: draftFrom(file, lists, stateId),
  });
  const [entries, setEntries] = useState<DropEntry[]>(() => held.map((file) => fresh(file)));
  const [gone, setGone] = useState<ReadonlySet<string>>(new Set());
  const [left, setLeft] = useState(0);
  const now = useRef(entries);
  const sources = useRef(new Map<string, File>());
  const queue = useRef<UploadQueue>(null);

  const change = useCallback((next: (before: DropEntry[]) => DropEntry[]) => {
    now.current = next(now.current);
    setEntries(now.current);
    for (const entry of now.current) remember(entry);
  }, []);
  const patch = useCallback(
    (key: string, part: Partial<DropEntry>) =>
      change((before) => before.map((entry) => (entry.key === key ? { ...entry, ...part } : entry))),
    [change],
  );

  /** What of the entries the address shows: those it names, and those that are not held yet. */
  const shownOf = (ids: readonly string[]) => now.current.filter(({ file }) => !file || ids.includes(file.id));
  const go = (ids: readonly string[], open: string | null, how: 'push' | 'replace') =>
    goTo({ ids, open, stateId }, how);

  const onHeld = (key: string, file: SweepFileView) => {
    if (!now.current.some((entry) => entry.key === key)) return;
    sources.current.delete(key);
    const before = here();
    patch(key, { file, draft: draftFrom(file, lists, stateId), share: null, problem: null });
    const order = now.current.flatMap((entry) =>
      entry.file && [...before, file.id].includes(entry.file.id) ? [entry.file.id] : [],
    );
    go(order, openHere(), before.length === 0 ? 'push' : 'replace');
  };
  const latest = useRef(onHeld);
  useEffect(() => {
    latest.current = onHeld;
  });
  const take = useCallback(
    (files: readonly File[]) => {
      const room = Math.max(0, MOST_FILES - now.current.length);
      setLeft(Math.max(0, files.length - room));
      const taken = files.slice(0, room);
      const added = taken.map((file) => {
        const entry = entryFor(file.name, file.size);
        return file.size > MAX_BYTES ? { ...entry, problem: tooLarge(file.size) } : entry;
      });
      // A new copy of a file that was refused takes its place.
      const replaced = (entry: DropEntry) =>
        standingOf(entry) === 'refused' && taken.some(({ name }) => name === entry.name);
      const dropped = now.current.filter(replaced).flatMap(({ file }) => (file ? [file.id] : []));
      change((before) => [...before.filter((entry) => !replaced(entry)), ...added]);
      const ids = here().filter((id) => !dropped.includes(id));
      if (here().length > 0) go(ids, null, 'replace');
      const sent = added.flatMap((entry, i) => (entry.problem ? [] : [{ key: entry.key, file: taken[i]! }]));
      for (const { key, file } of sent) sources.current.set(key, file);
      queue.current?.add(sent);
    },
    // The address and the lists are read when it is called.
    // eslint-disable-next-line react-hooks/exhaustive-deps
    [change],
  );

  useEffect(() => {
    const sending = new UploadQueue({
      onProgress: (key, part) => patch(key, part),
      onHeld: (key, file) => latest.current(key, file),
    });
    queue.current = sending;
    change((before) => before.map((entry) => (entry.touched || entry.kept ? entry : recalled(entry))));
    // What an earlier queue of this page had not finished.
    sending.add(
      now.current.flatMap(({ key, file, problem }) => {
        const source = sources.current.get(key);
        return source && !file && (!problem || problem.waiting) ? [{ key, file: source }] : [];
      }),
    );
    const carried = takeCarried();
    if (carried.length > 0) take(carried);
    return () => {
      sending.close();
      queue.current = null;
    };
  }, [change, patch, take]);

  // Files that the address names and nobody has read yet: a link, or forward after they were let go.
  const missing = named.filter((id) => !gone.has(id) && !entries.some(({ file }) => file?.id === id)).join();
  useEffect(() => {
    if (missing === '') return;
    const stop = new AbortController();
    for (const id of missing.split(',')) {
      fetch(`/api/sweep-files/${encodeURIComponent(id)}`, { signal: stop.signal })
        .then(async (answer) => {
          if (answer.ok) {
            const entry = recalled(fresh((await answer.json()) as SweepFileView));
            change((before) => (before.some(({ file }) => file?.id === id) ? before : [...before, entry]));
          } else if ([400, 404].includes(answer.status)) setGone((before) => new Set([...before, id]));
        })
        // No network: the sheet to drop them again is what is shown.
        .catch(() => undefined);
    }
    return () => stop.abort();
    // eslint-disable-next-line react-hooks/exhaustive-deps
  }, [missing]);

  const shown = entries.filter(({ file }) => !file || named.includes(file.id));
  const asked = search.get('open');
  const open =
    shown.find(({ file }) => file !== null && file.id === asked) ??
    (shown.length === 1 && shown[0]!.file && !asked ? shown[0]! : null);

  const say = (key: string, next: (before: Draft) => Draft) =>
    change((before) =>
      before.map((entry) =>
        entry.key === key && entry.draft
          ? { ...entry, draft: next(entry.draft), touched: Date.now(), problem: null }
          : entry,
      ),
    );

  /** The file that something was said of last, other than one. */
  const lastBut = (key?: string) =>
    shown.reduce<DropEntry | null>(
      (newest, entry) => (entry.key !== key && entry.touched > (newest?.touched ?? 0) ? entry : newest),
      null,
    );
  /** What was said of one file, for these; they do not become the last one by it. */
  const sayAs = (last: DropEntry, keys: readonly string[]) => {
    if (!last.file || !last.draft) return;
    const from = { draft: last.draft, file: last.file };
    change((before) =>
      before.map((entry) => {
        if (!keys.includes(entry.key) || entry.key === last.key || !entry.file || !entry.draft) return entry;
        const draft = sameAsLast({ draft: entry.draft, file: entry.file }, from, lists.samples);
        return { ...entry, draft, problem: null };
      }),
    );
  };

  /** One of several sweeps was chosen: the file is described by that one's own preamble. */
  const chooseSweep = async (key: string, sweepIndex: number) => {
    say(key, (draft) => ({ ...draft, sweepIndex }));
    const id = now.current.find((entry) => entry.key === key)?.file?.id;
    try {
      const answer = await fetch(`/api/sweep-files/${id}?sweep=${sweepIndex}`);
      if (!answer.ok) return;
      const file = (await answer.json()) as SweepFileView;
      const entry = now.current.find((one) => one.key === key);
      if (entry?.draft?.sweepIndex === sweepIndex)
        patch(key, { file, draft: withSweep(entry.draft, sweepIndex, file) });
    } catch {
      // Without it the file stays as it was described, with what differs left open.
    }
  };

  /** Keeps each that is ready, one after the other; one that fails leaves the others. Answers those that were kept. */
  const flying = useRef(false);
  const keep = async (keys: readonly string[]) => {
    const kept: NonNullable<DropEntry['kept']>[] = [];
    if (flying.current) return kept;
    flying.current = true;
    const ready = now.current.filter((entry) => keys.includes(entry.key) && isReady(entry));
    for (const { key } of ready) patch(key, { keeping: true, problem: null });
    for (const { key } of ready) {
      const entry = now.current.find((one) => one.key === key)!;
      const outcome = await keepEntry(entry, () => undefined);
      if (outcome?.ok) {
        const { id, number } = outcome.reply;
        kept.push({ id, number });
        patch(key, { keeping: false, kept: { id, number } });
      } else patch(key, { keeping: false, problem: outcome?.problem ?? null });
    }
    flying.current = false;
    return kept;
  };

  const discard = (key: string) => {
    const entry = now.current.find((one) => one.key === key);
    queue.current?.stop(key);
    sources.current.delete(key);
    if (entry?.file) forget(entry.file.id);
    change((before) => before.filter((one) => one.key !== key));
    const ids = here().filter((id) => id !== entry?.file?.id);
    if (ids.length === 0 && shownOf(ids).length === 0) router.replace(addressOf({ ids: [], open: null, stateId }));
    else go(ids, null, 'replace');
  };

  return {
    shown,
    open,
    lastBut,
    /** Named by the address, but held no longer. */
    gone: named.filter((id) => gone.has(id)).length,
    /** Dropped beyond what one drop takes. */
    left,
    take,
    say,
    sayAs,
    chooseSweep,
    /** Up to the broken line, on purpose; that alone says nothing of the file. */
    keepPartial: (key: string) =>
      change((before) =>
        before.map((entry) =>
          entry.key === key && entry.draft ? { ...entry, draft: { ...entry.draft, keepPartial: true } } : entry,
        ),
      ),
    keep,
    discard,
    sendAgain: (key: string) => {
      const file = sources.current.get(key);
      if (!file) return;
      patch(key, { problem: null });
      queue.current?.add([{ key, file }]);
    },
    canSendAgain: (key: string) => sources.current.has(key),
    /** For another sweep of a file that was kept already. */
    again: (key: string) =>
      change((before) =>
        before.map((entry) =>
          entry.key === key && entry.draft
            ? { ...entry, kept: null, draft: { ...entry.draft, sweepIndex: '' } }
            : entry,
        ),
      ),
    openEntry: (entry: DropEntry) => entry.file && go(here(), entry.file.id, 'push'),
    closeEntry: () => go(here(), null, 'push'),
  };
}

export type Drop = ReturnType<typeof useDrop>;
