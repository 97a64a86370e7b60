'use client';

import { useRef, useState, type FormEvent } from 'react';
import { ProblemMessage } from '@/components/forms/ProblemMessage';
import type { Submittable } from '@/components/forms/send';
import { useSubmit } from '@/components/forms/useSubmit';
import { Button, ButtonLink } from '@/components/ui/Button';
import { Field } from '@/components/ui/Field';

const SIGN_IN: Submittable = { method: 'POST', path: '/api/session' };

interface SignInBody {
  email: string;
  password: string;
}

/** E-mail and password. The fields belong to the browser, so that what was typed before this code arrived stays. */
export function SignInForm({ next }: { next: string }) {
  const { submit, busy, problem, fieldErrors } = useSubmit<SignInBody>(SIGN_IN);
  const [shown, setShown] = useState(false);
  const [leaving, setLeaving] = useState(false);
  const form = useRef<HTMLFormElement>(null);

  async function signIn(event: FormEvent<HTMLFormElement>) {
    event.preventDefault();
    const given = new FormData(event.currentTarget);
    const answer = await submit({ email: String(given.get('email')), password: String(given.get('password')) });
    if (answer.ok) {
      setLeaving(true);
      // A full load: nothing of the page before survives into the session.
      window.location.assign(next);
      return;
    }
    const wrong = answer.problem.errors.some(({ pointer }) => pointer === '/email') ? 'email' : 'password';
    const field = form.current?.elements.namedItem(wrong);
    if (field instanceof HTMLInputElement) field.select();
  }

  return (
    // Until this code has loaded, Enter posts: a password never stands in an address.
    <form ref={form} method="post" action="/sign-in" onSubmit={signIn} noValidate className="flex flex-col gap-3.5">
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
      <Field
        tall
        label="Password"
        name="password"
        type={shown ? 'text' : 'password'}
        autoComplete="current-password"
        autoCapitalize="none"
        spellCheck={false}
        error={fieldErrors.password && `The password ${fieldErrors.password}.`}
        end={
          <button type="button" className="font-sans text-pen" onClick={() => setShown(!shown)}>
            {shown ? 'Hide' : 'Show'}
            <span className="sr-only"> the password</span>
          </button>
        }
      />
      {problem && problem.errors.length === 0 && <ProblemMessage problem={problem} />}
      <div className="mt-1 flex items-center gap-2">
        <Button kind="primary" size="tall" type="submit" keyName="Enter" busy={busy || leaving}>
          Sign in
        </Button>
        <ButtonLink kind="quiet" href="/forgotten-password">
          Forgotten password
        </ButtonLink>
      </div>
    </form>
  );
}
