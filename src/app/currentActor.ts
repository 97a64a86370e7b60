import { cache } from 'react';
import { headers } from 'next/headers';
import type { Actor } from '@/auth/actor';
import { Unauthenticated } from '@/errors';
import { actorOf } from '@/services/sessions';

/** Who asks for this page, read once per request; null for nobody. Our own server has written the address. */
export const currentActor = cache(async (): Promise<Actor | null> => {
  const request = await headers();
  const address = request.get('x-forwarded-for')?.split(',')[0]?.trim() || '127.0.0.1';
  try {
    return await actorOf(request, address);
  } catch (error) {
    // A bearer token that does not hold; pages are for browsers, which send none.
    if (error instanceof Unauthenticated) return null;
    throw error;
  }
});
