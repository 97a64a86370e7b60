'use client';

import { PasswordByLink } from '../PasswordByLink';
import { PASSWORD_WRITES } from '../writes';

export function InvitationForm({ labName }: { labName: string }) {
  return (
    <PasswordByLink
      kind="invitation"
      operation={PASSWORD_WRITES.acceptInvitation}
      act="Set it and sign in"
      about={({ name, email, role, organisation }) => (
        <p>
          {name}, {labName} has entered you as {role}
          {role === 'designer' ? ` of ${organisation}` : ''}. Your sign-in is{' '}
          <span className="break-words">{email}</span>.
        </p>
      )}
      spent={`Ask a manager of ${labName} for a new one. If you have chosen a password already, sign in with it.`}
    />
  );
}
