import type { Metadata } from 'next';
import Link from 'next/link';
import { cookies } from 'next/headers';
import { ROOM_COOKIE, roomOf } from '@/components/shell/room';
import { SignInFrame } from '@/components/shell/SignInFrame';
import { aboutLab } from '@/services/aboutLab';

export const metadata: Metadata = { title: 'Forgotten password' };

/** Passwords are not reset by e-mail yet: a manager of the lab sets a new one. */
export default async function ForgottenPasswordPage() {
  const { name } = await aboutLab();
  const room = roomOf((await cookies()).get(ROOM_COOKIE)?.value);
  return (
    <SignInFrame
      title="Forgotten password"
      labName={name}
      room={room}
      foot={
        <>
          For the manager, on the lab’s server:{' '}
          <code className="font-mono text-ink">npm run stillfield -- user-password E-MAIL</code>
        </>
      }
    >
      <p className="t-text">
        Ask a manager of {name}: they set a new password and hand it to you. You are then signed out wherever you were
        signed in.
      </p>
      <p className="mt-3">
        <Link href="/sign-in">Back to sign-in</Link>
      </p>
    </SignInFrame>
  );
}
