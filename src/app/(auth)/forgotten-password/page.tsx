import type { Metadata } from 'next';
import Link from 'next/link';
import { cookies } from 'next/headers';
import { ROOM_COOKIE, roomOf } from '@/components/shell/room';
import { SignInFrame } from '@/components/shell/SignInFrame';
import { aboutLab } from '@/services/aboutLab';
import { lettersShown, whereMailGoes } from '@/services/mailbox';
import { DemoLetters } from '../DemoLetters';
import { ForgottenForm } from './ForgottenForm';

export const metadata: Metadata = { title: 'Forgotten password' };

/** Sends a link to a new password; while the lab has no mail server it says how a manager sets one. */
export default async function ForgottenPasswordPage() {
  const { name } = await aboutLab();
  const room = roomOf((await cookies()).get(ROOM_COOKIE)?.value);
  const sends = whereMailGoes() !== 'nowhere';
  const command = (
    <>
      For the manager, on the lab’s server:{' '}
      <code className="font-mono text-ink">npm run stillfield -- user-password E-MAIL</code>
    </>
  );
  const spoken = 'No e-mail at hand? A manager of the lab can set a new password for you.';
  return (
    <SignInFrame
      title="Forgotten password"
      labName={name}
      room={room}
      foot={!sends ? command : lettersShown() ? <DemoLetters /> : spoken}
    >
      {sends ? (
        <ForgottenForm labName={name} />
      ) : (
        <>
          <p className="t-text">
            {name} sends no e-mail yet. Ask a manager: they set a new password and hand it to you. You are then signed
            out wherever you were signed in.
          </p>
          <p className="mt-3">
            <Link href="/sign-in">Back to sign-in</Link>
          </p>
        </>
      )}
    </SignInFrame>
  );
}
