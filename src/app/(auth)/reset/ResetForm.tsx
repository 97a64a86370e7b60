'use client';

import Link from 'next/link';
import { ButtonLink } from '@/components/ui/Button';
import { Message } from '@/components/ui/Message';
import { PasswordByLink } from '../PasswordByLink';
import { PASSWORD_WRITES } from '../writes';

export function ResetForm() {
  return (
    <PasswordByLink
      kind="reset"
      operation={PASSWORD_WRITES.resetPassword}
      act="Set the new password"
      about={({ name, email }) => (
        <p>
          For {name}, <span className="break-words">{email}</span>. You are then signed out wherever you were signed in.
        </p>
      )}
      spent={<Link href="/forgotten-password">Ask for a new link</Link>}
      done={
        <>
          <Message tone="under" lead="Your new password is set.">
            Every session of yours has ended.
          </Message>
          <p className="mt-4">
            <ButtonLink kind="primary" size="tall" href="/sign-in" keyName="Enter">
              Sign in
            </ButtonLink>
          </p>
        </>
      }
    />
  );
}
