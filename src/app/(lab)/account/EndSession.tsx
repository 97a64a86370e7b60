'use client';

import { useRouter } from 'next/navigation';
import { useState, useTransition } from 'react';
import { send } from '@/components/forms/send';
import { Button } from '@/components/ui/Button';
import { showToast } from '@/components/ui/Toast';

/** Ends another session of this person; the list then comes anew from the server. */
export function EndSession({ id, name }: { id: string; name: string }) {
  const router = useRouter();
  const [sending, setSending] = useState(false);
  const [refused, setRefused] = useState<string | null>(null);
  const [refreshing, refresh] = useTransition();

  async function end() {
    setSending(true);
    setRefused(null);
    const answer = await send({ method: 'DELETE', path: '/api/sessions/{id}' }, undefined, { params: { id } });
    setSending(false);
    // One that is over already is what was asked for.
    if (!answer.ok && answer.problem.status !== 404) return setRefused(answer.problem.title);
    showToast({ text: `${name} is signed out` });
    refresh(() => router.refresh());
  }

  return (
    <>
      {refused && (
        <span role="status" className="mr-2 text-madder">
          {refused}
        </span>
      )}
      <Button size="table" onClick={end} busy={sending || refreshing}>
        End<span className="sr-only"> the session of {name}</span>
      </Button>
    </>
  );
}

/** Ends this session and leaves by a full load, so that nothing signed-in stays in memory. */
export function SignOut() {
  const [busy, setBusy] = useState(false);
  const [refused, setRefused] = useState<string | null>(null);

  async function signOut() {
    setBusy(true);
    const answer = await send({ method: 'DELETE', path: '/api/session' }, undefined, {});
    // eslint-disable-next-line @next/next/no-location-assign-relative-destination -- the full load is the point
    if (answer.ok || answer.problem.status === 401) return window.location.assign('/sign-in');
    setBusy(false);
    setRefused(answer.problem.title);
  }

  return (
    <>
      {refused && (
        <span role="status" className="self-center text-madder">
          {refused}
        </span>
      )}
      <Button onClick={signOut} busy={busy}>
        Sign out
      </Button>
    </>
  );
}
