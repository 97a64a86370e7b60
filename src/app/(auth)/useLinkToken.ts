'use client';

import { useEffect, useState, useSyncExternalStore } from 'react';
import type { Problem } from '@/components/forms/problem';
import { send } from '@/components/forms/send';
import { PASSWORD_WRITES } from './writes';

export interface LinkOf {
  name: string;
  email: string;
  role: string;
  organisation: string;
  expiresAt: string;
}

export type LinkState =
  | { at: 'reading' }
  | { at: 'open'; token: string; link: LinkOf }
  | { at: 'spent' }
  | { at: 'failed'; problem: Problem };

const onHash = (changed: () => void) => {
  window.addEventListener('hashchange', changed);
  return () => window.removeEventListener('hashchange', changed);
};

/** What the link in this window's address is; its token stands behind #, so only this code ever sees it there. */
export function useLinkToken(kind: 'reset' | 'invitation'): LinkState {
  const token = useSyncExternalStore<string | null>(
    onHash,
    () => window.location.hash.slice(1),
    () => null,
  );
  const [read, setRead] = useState<{ token: string; state: LinkState } | null>(null);

  useEffect(() => {
    if (token === null) return;
    let current = true;
    const answered = (state: LinkState) => current && setRead({ token, state });
    // A token that cannot be one is not worth asking about.
    const asked = /^[\w-]{43}$/.test(token) ? send<LinkOf>(PASSWORD_WRITES.readLink, { kind, token }, {}) : null;
    void Promise.resolve(asked).then((answer) => {
      if (answer?.ok) answered({ at: 'open', token, link: answer.reply });
      else if (!answer || answer.problem.status === 409) answered({ at: 'spent' });
      else answered({ at: 'failed', problem: answer.problem });
    });
    return () => {
      current = false;
    };
  }, [kind, token]);

  return read && read.token === token ? read.state : { at: 'reading' };
}

/** Takes the token out of the address and of the history, once it is of no use. */
export function forgetToken(): void {
  window.history.replaceState(null, '', window.location.pathname);
}
