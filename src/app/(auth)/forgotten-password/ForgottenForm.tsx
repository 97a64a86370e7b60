'use client';

import { useState, type FormEvent } from 'react';
import { ProblemMessage } from '@/components/forms/ProblemMessage';
import { useSubmit } from '@/components/forms/useSubmit';
import { Button, ButtonLink } from '@/components/ui/Button';
import { Field } from '@/components/ui/Field';
import { Message } from '@/components/ui/Message';
import { PASSWORD_WRITES } from '../writes';

/** Asks for the e-mail with the link; what is said afterwards is the same for every address. */
export function ForgottenForm({ labName }: { labName: string }) {
  const { submit, busy, problem, fieldErrors } = useSubmit<{ email: string }>(PASSWORD_WRITES.requestPasswordReset);
  const [asked, setAsked] = useState<string | null>(null);

  async function ask(event: FormEvent<HTMLFormElement>) {
    event.preventDefault();
    const email = String(new FormData(event.currentTarget).get('email')).trim();
    setAsked(null);
    const answer = await submit({ email });
    if (answer.ok) setAsked(email);
  }

  return (
    <form method="post" action="/forgotten-password" onSubmit={ask} noValidate className="flex flex-col gap-3.5">
      <Field
        tall
        label="Work e-mail"
        name="email"
        type="email"
        autoComplete="username"
        autoCapitalize="none"
        spellCheck={false}
        autoFocus
        error={fieldErrors.email && `The e-mail ${fieldErrors.email}.`}
      />
      {problem && problem.errors.length === 0 && <ProblemMessage problem={problem} />}
      {asked && (
        <Message tone="under" lead="Asked for." live="polite">
          If {labName} knows {asked}, a link is on its way there. It works once, for 30 minutes; asking again ends it.
        </Message>
      )}
      <div className="mt-1 flex flex-wrap items-center gap-2">
        <Button kind="primary" size="tall" type="submit" keyName="Enter" busy={busy}>
          {asked ? 'Send it again' : 'Send me a link'}
        </Button>
        <ButtonLink kind="quiet" href="/sign-in">
          Back to sign-in
        </ButtonLink>
      </div>
    </form>
  );
}
