import type { Metadata } from 'next';
import { cookies } from 'next/headers';
import { ROOM_COOKIE, roomOf } from '@/components/shell/room';
import { SignInFrame } from '@/components/shell/SignInFrame';
import { aboutLab } from '@/services/aboutLab';
import { ResetForm } from './ResetForm';

export const metadata: Metadata = { title: 'Choose a new password' };

/** Where a reset e-mail leads: `/reset#` and the token, which never reaches a server in an address. */
export default async function ResetPage() {
  const { name } = await aboutLab();
  const room = roomOf((await cookies()).get(ROOM_COOKIE)?.value);
  return (
    <SignInFrame
      title="Choose a new password"
      labName={name}
      room={room}
      foot={`Nobody at ${name} asks for your password.`}
    >
      <ResetForm />
    </SignInFrame>
  );
}
