'use client';

import { useTransition } from 'react';
import { useRouter } from 'next/navigation';
import { ProblemMessage } from '@/components/forms/ProblemMessage';
import { useSubmit } from '@/components/forms/useSubmit';
import { Button } from '@/components/ui/Button';
import { showToast } from '@/components/ui/Toast';
import { WRITES } from '../writes';

/** Sends a new invitation; the link before it ends. */
export function InviteAgain({ id, name, again }: { id: string; name: string; again: boolean }) {
  const router = useRouter();
  const { submit, busy, problem } = useSubmit(WRITES.inviteAgain);
  const [refreshing, refresh] = useTransition();

  async function invite() {
    const answer = await submit(undefined, { params: { id } });
    if (!answer.ok) return;
    showToast({ text: `A new invitation for ${name} is queued` });
    refresh(() => router.refresh());
  }

  return (
    <>
      <Button kind="primary" onClick={invite} busy={busy || refreshing}>
        {again ? 'Invite again' : 'Send an invitation'}
      </Button>
      <ProblemMessage problem={problem} />
    </>
  );
}
