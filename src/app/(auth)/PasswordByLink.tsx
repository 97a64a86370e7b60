'use client';

import { useRef, useState, type FormEvent, type ReactNode } from 'react';
import { ProblemMessage } from '@/components/forms/ProblemMessage';
import type { Submittable } from '@/components/forms/send';
import { useSubmit } from '@/components/forms/useSubmit';
import { Button, ButtonLink } from '@/components/ui/Button';
import { Field } from '@/components/ui/Field';
import { Message } from '@/components/ui/Message';
import { forgetToken, type LinkOf, useLinkToken } from './useLinkToken';

interface Props {
  kind: 'reset' | 'invitation';
  operation: Submittable;
  /** `Set the new password` */
  act: string;
  /** Above the field, once it is known whose link it is. */
  about: (link: LinkOf) => ReactNode;
  /** Where to go when the link opens nothing. */
  spent: ReactNode;
  /** Shown when it is done; without it the reader is taken to the first sheet, signed in. */
  done?: ReactNode;
}

/** A password chosen with an e-mailed link: whose it is, one field, one act. */
export function PasswordByLink({ kind, operation, act, about, spent, done }: Props) {
  const state = useLinkToken(kind);
  const { submit, busy, problem, fieldErrors } = useSubmit<{ token: string; password: string }>(operation);
  const [shown, setShown] = useState(false);
  const [finished, setFinished] = useState(false);
  const form = useRef<HTMLFormElement>(null);

  async function set(event: FormEvent<HTMLFormElement>) {
    event.preventDefault();
    if (state.at !== 'open') return;
    const password = String(new FormData(event.currentTarget).get('password'));
    const answer = await submit({ token: state.token, password });
    if (answer.ok) {
      setFinished(true);
      if (!done) return window.location.replace('/');
      return forgetToken();
    }
    const field = form.current?.elements.namedItem('password');
    if (field instanceof HTMLInputElement) field.select();
  }

  if (finished && done) return <div role="status">{done}</div>;
  if (state.at === 'reading' && !finished) return <p className="t-text">Reading the link.</p>;
  if (state.at === 'failed') return <ProblemMessage problem={state.problem} />;
  if (state.at === 'spent' || (problem?.status === 409 && !finished)) {
    return (
      <Message tone="over" lead="This link opens nothing." live="polite">
        It was used, was replaced by a later one, has run out, or is not whole. {spent}
      </Message>
    );
  }
  if (state.at !== 'open') return <p className="t-text">Signing you in.</p>;
  return (
    <form ref={form} method="post" onSubmit={set} noValidate className="flex flex-col gap-3.5">
      <div className="t-text">{about(state.link)}</div>
      {/* Tells a password manager whose password this is. */}
      <input
        type="email"
        name="username"
        autoComplete="username"
        value={state.link.email}
        readOnly
        tabIndex={-1}
        aria-hidden
        className="sr-only"
      />
      <Field
        tall
        label="New password"
        name="password"
        type={shown ? 'text' : 'password'}
        autoComplete="new-password"
        autoCapitalize="none"
        spellCheck={false}
        autoFocus
        hint="At least 12 characters; several unrelated words are easiest."
        error={fieldErrors.password && `The password ${fieldErrors.password}.`}
        end={
          <button type="button" className="font-sans text-pen" onClick={() => setShown(!shown)}>
            {shown ? 'Hide' : 'Show'}
            <span className="sr-only"> the password</span>
          </button>
        }
      />
      {problem && problem.errors.length === 0 && <ProblemMessage problem={problem} />}
      <div className="mt-1 flex flex-wrap items-center gap-2">
        <Button kind="primary" size="tall" type="submit" keyName="Enter" busy={busy || finished}>
          {act}
        </Button>
        <ButtonLink kind="quiet" href="/sign-in">
          Leave it
        </ButtonLink>
      </div>
    </form>
  );
}
