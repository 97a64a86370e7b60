import { notFound } from 'next/navigation';
import { found } from '@/app/found';

export type Search = Promise<Record<string, string | string[] | undefined>>;

/** One value of the query; of a repeated one the first. */
export async function asked(search: Search, name: string): Promise<string | undefined> {
  const value = (await search)[name];
  return (Array.isArray(value) ? value[0] : value) || undefined;
}

/** A page of a list. A cursor that belongs to no list is an address with nothing at it. */
export function listed<T>(answer: Promise<T>): Promise<T> {
  return found(
    answer.catch((error: unknown) => {
      if ((error as { kind?: string } | null)?.kind === 'invalid') notFound();
      throw error;
    }),
  );
}
