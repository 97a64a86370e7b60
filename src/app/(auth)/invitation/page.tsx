import type { Metadata } from 'next';
import Link from 'next/link';
import { cookies } from 'next/headers';
import { ROOM_COOKIE, roomOf } from '@/components/shell/room';
import { SignInFrame } from '@/components/shell/SignInFrame';
import { aboutLab } from '@/services/aboutLab';
import { InvitationForm } from './InvitationForm';

export const metadata: Metadata = { title: 'Accept the invitation' };

/** Where an invitation leads: `/invitation#` and the token; the first password is set and signs in. */
export default async function InvitationPage() {
  const { name } = await aboutLab();
  const room = roomOf((await cookies()).get(ROOM_COOKIE)?.value);
  return (
    <SignInFrame
      title="Accept the invitation"
      labName={name}
      room={room}
      foot={
        <>
          Signed in here before? <Link href="/sign-in">Sign in</Link>
        </>
      }
    >
      <InvitationForm labName={name} />
    </SignInFrame>
  );
}
