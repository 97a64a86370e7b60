'use client';

import { useState, type FormEvent } from 'react';
import { useRouter } from 'next/navigation';
import { ProblemMessage } from '@/components/forms/ProblemMessage';
import { useSubmit } from '@/components/forms/useSubmit';
import { PASSWORD_WRITES } from '@/app/(auth)/writes';
import { InPlace } from '@/app/(lab)/jobs/InPlace';
import { useKey } from '@/components/shell/keys';
import { Button } from '@/components/ui/Button';
import { Field } from '@/components/ui/Field';
import { showToast } from '@/components/ui/Toast';

/** One's own password behind one button: the old one, then the new one. */
export function ChangePassword({ email }: { email: string }) {
  return (
    <div className="mt-2">
      <InPlace
        acts={[
          { id: 'password', word: 'Change the password', form: (close) => <Form email={email} onClose={close} /> },
        ]}
      />
    </div>
  );
}

function Form({ email, onClose }: { email: string; onClose: () => void }) {
  const router = useRouter();
  const { submit, busy, problem, fieldErrors } = useSubmit<{ current: string; password: string }>(
    PASSWORD_WRITES.changeOwnPassword,
  );
  const [shown, setShown] = useState(false);
  useKey('Escape', onClose);

  async function change(event: FormEvent<HTMLFormElement>) {
    event.preventDefault();
    const given = new FormData(event.currentTarget);
    const answer = await submit({ current: String(given.get('current')), password: String(given.get('password')) });
    if (!answer.ok) return;
    showToast({ text: 'Your new password is set; your other sessions have ended' });
    router.refresh();
    onClose();
  }

  const type = shown ? 'text' : 'password';
  return (
    <form onSubmit={change} noValidate className="grid max-w-[24rem] gap-3 py-3" aria-label="Change the password">
      <input
        type="email"
        name="username"
        autoComplete="username"
        value={email}
        readOnly
        tabIndex={-1}
        aria-hidden
        className="sr-only"
      />
      <Field
        label="Password you have now"
        name="current"
        type={type}
        autoComplete="current-password"
        autoCapitalize="none"
        spellCheck={false}
        autoFocus
        error={fieldErrors.current && `The password ${fieldErrors.current}.`}
      />
      <Field
        label="New password"
        name="password"
        type={type}
        autoComplete="new-password"
        autoCapitalize="none"
        spellCheck={false}
        hint="At least 12 characters; several unrelated words are easiest."
        error={fieldErrors.password && `The password ${fieldErrors.password}.`}
        end={
          <button type="button" className="font-sans text-pen" onClick={() => setShown(!shown)}>
            {shown ? 'Hide' : 'Show'}
            <span className="sr-only"> both passwords</span>
          </button>
        }
      />
      {problem && problem.errors.length === 0 && <ProblemMessage problem={problem} />}
      <div className="flex flex-wrap gap-2">
        <Button kind="primary" type="submit" busy={busy}>
          Set the new password
        </Button>
        <Button kind="quiet" onClick={onClose}>
          Leave as it is
        </Button>
      </div>
    </form>
  );
}
