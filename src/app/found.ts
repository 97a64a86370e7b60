import { notFound } from 'next/navigation';
import { Forbidden, NotFound } from '@/errors';

/** What a service answers; a record that is not there, or not for this reader, becomes the not-found page. */
export async function found<T>(answer: Promise<T>): Promise<T> {
  try {
    return await answer;
  } catch (error) {
    if (error instanceof NotFound || error instanceof Forbidden) notFound();
    throw error;
  }
}
