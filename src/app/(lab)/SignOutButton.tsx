'use client';

import { useState } from 'react';

/** Ends this session and leaves for the sign-in page by a full load, so that nothing signed-in stays in memory. */
export function SignOutButton() {
  const [busy, setBusy] = useState(false);
  const [failed, setFailed] = useState(false);
  async function signOut() {
    if (busy) return;
    setBusy(true);
    const answer = await fetch('/api/session', { method: 'DELETE' }).catch(() => null);
    if (answer && (answer.ok || answer.status === 401)) {
      // A full load on purpose; the router would keep what was signed in.
      // eslint-disable-next-line @next/next/no-location-assign-relative-destination
      window.location.assign('/sign-in');
      return;
    }
    setBusy(false);
    setFailed(true);
  }
  return (
    <button type="button" onClick={signOut} aria-busy={busy}>
      {failed ? 'Not signed out; try again' : 'Sign out'}
    </button>
  );
}
