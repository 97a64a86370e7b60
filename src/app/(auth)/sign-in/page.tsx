import type { Metadata } from 'next';
import { cookies } from 'next/headers';
import { redirect } from 'next/navigation';
import { currentActor } from '@/app/currentActor';
import { ROOM_COOKIE, roomOf } from '@/components/shell/room';
import { SignInFrame } from '@/components/shell/SignInFrame';
import { aboutLab } from '@/services/aboutLab';
import { lettersShown } from '@/services/mailbox';
import { DemoLetters } from '../DemoLetters';
import { nextPath } from './nextPath';
import { SignInForm } from './SignInForm';

export const metadata: Metadata = { title: 'Sign in' };

interface Props {
  searchParams: Promise<Record<string, string | string[] | undefined>>;
}

export default async function SignInPage({ searchParams }: Props) {
  const next = nextPath((await searchParams).next);
  if (await currentActor()) redirect(next);
  const { name } = await aboutLab();
  const room = roomOf((await cookies()).get(ROOM_COOKIE)?.value);
  const foot = lettersShown() ? <DemoLetters /> : 'New here? The lab enters you and sends you an invitation.';
  return (
    <SignInFrame title="Sign in" labName={name} room={room} foot={foot}>
      <SignInForm next={next} />
    </SignInFrame>
  );
}
