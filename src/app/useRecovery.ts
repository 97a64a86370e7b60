'use client';

import { useCallback, useEffect, useRef, useState } from 'react';

/** Before each question, in milliseconds; the last one again and again. A person who waits is asked for within seconds. */
const WAITS_MS = [1000, 1000, 2000, 3000, 5000, 8000];
/** One page is not loaded again more often than this, whatever comes and goes. */
const BETWEEN_LOADS_MS = 5000;
const LAST_LOAD = 'loaded again at';

export interface Recovery {
  /** null while nobody knows yet. */
  gone: boolean | null;
  /** How often it was asked, and when last. */
  asked: number;
  askedAt: Date | null;
  since: Date | null;
  askNow: () => void;
}

/**
 * Asks the server whether its database answers, and loads the page again as soon as it does. `known`: the page failed
 * because the database was gone, so that nothing need be asked to say so.
 */
export function useRecovery(known: boolean): Recovery {
  const [state, setState] = useState<Omit<Recovery, 'askNow'>>({
    gone: known || null,
    asked: 0,
    askedAt: null,
    since: null,
  });
  const ask = useRef<() => void>(() => {});

  useEffect(() => {
    let ended = false;
    let asking = false;
    let asked = 0;
    let wasGone = known;
    let timer: ReturnType<typeof setTimeout> | undefined;
    const later = (milliseconds: number, next: () => void) => {
      clearTimeout(timer);
      timer = setTimeout(next, milliseconds * (0.85 + Math.random() * 0.3));
    };
    const question = async () => {
      if (asking || ended) return;
      asking = true;
      const gone = !(await answers());
      asking = false;
      if (ended) return;
      asked += 1;
      const askedAt = new Date();
      setState((before) => ({ gone: gone || wasGone, asked, askedAt, since: before.since ?? askedAt }));
      if (!gone && !wasGone) return;
      wasGone = true;
      if (!gone) return later(sinceLastLoad(), loadAgain);
      later(WAITS_MS[Math.min(asked, WAITS_MS.length - 1)]!, () => void question());
    };
    const now = () => {
      clearTimeout(timer);
      void question();
    };
    ask.current = now;
    const awake = () => document.visibilityState === 'visible' && now();
    window.addEventListener('online', now);
    document.addEventListener('visibilitychange', awake);
    later(known ? WAITS_MS[0]! : 0, () => void question());
    return () => {
      ended = true;
      clearTimeout(timer);
      window.removeEventListener('online', now);
      document.removeEventListener('visibilitychange', awake);
    };
  }, [known]);

  const askNow = useCallback(() => ask.current(), []);
  return { ...state, askNow };
}

async function answers(): Promise<boolean> {
  try {
    return (await fetch('/api/ready', { cache: 'no-store', signal: AbortSignal.timeout(8000) })).ok;
  } catch {
    return false;
  }
}

/** What is still to be waited before loading again. */
function sinceLastLoad(): number {
  const last = Number(sessionStorage.getItem(LAST_LOAD) ?? 0);
  return Math.max(0, last + BETWEEN_LOADS_MS - Date.now());
}

function loadAgain(): void {
  sessionStorage.setItem(LAST_LOAD, String(Date.now()));
  window.location.reload();
}
