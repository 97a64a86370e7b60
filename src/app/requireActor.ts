import { headers } from 'next/headers';
import { redirect } from 'next/navigation';
import type { Actor } from '@/auth/actor';
import { currentActor } from './currentActor';

/** Who is signed in; anybody else is sent to the sign-in page and comes back here afterwards. */
export async function requireActor(): Promise<Actor> {
  const actor = await currentActor();
  if (actor) return actor;
  const path = (await headers()).get('x-stillfield-path');
  redirect(path ? `/sign-in?next=${encodeURIComponent(path)}` : '/sign-in');
}
