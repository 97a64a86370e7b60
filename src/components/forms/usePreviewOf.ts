'use client';

import { useEffect, useState } from 'react';
import type { Problem } from './problem';
import { send } from './send';

const WAIT_MS = 300;

/** Asks what a body would come to, a moment after its last change; only the newest answer counts. The last one stays shown meanwhile. */
export function usePreviewOf<Reply>(path: string, body: unknown) {
  const asked = body === null ? null : JSON.stringify(body);
  const [answer, setAnswer] = useState<{ asked: string; reply: Reply | null; problem: Problem | null } | null>(null);
  useEffect(() => {
    if (asked === null) return;
    const stop = new AbortController();
    const timer = setTimeout(async () => {
      const outcome = await send<Reply>({ method: 'POST', path }, JSON.parse(asked), { signal: stop.signal });
      if (stop.signal.aborted) return;
      if (outcome.ok) setAnswer({ asked, reply: outcome.reply, problem: null });
      else setAnswer((before) => ({ asked, reply: before?.reply ?? null, problem: outcome.problem }));
    }, WAIT_MS);
    return () => {
      clearTimeout(timer);
      stop.abort();
    };
  }, [path, asked]);
  const current = asked !== null && answer?.asked === asked;
  return {
    reply: answer?.reply ?? null,
    problem: current ? answer.problem : null,
    busy: asked !== null && !current,
    current,
  };
}
